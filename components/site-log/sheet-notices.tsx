'use client';

import type { Correcting } from '@/components/site-log/ledger';
import { countsInWords } from '@/components/site-log/sheet-figures';
import type { MonthSheetState } from '@/components/site-log/use-month-sheet';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatInstant, formatLongMonth, formatQuantity } from '@/lib/format';
import { LOG_FIELD_NAMES, LOG_FIELDS } from '@/lib/site-log/schema';

/** Figures that this device kept over a reload. */
export function DraftNotice({ state }: { state: MonthSheetState }) {
  if (!state.restoredAt) return null;
  return (
    <Notice
      live
      tone="caution"
      title="Kept on this device, not sent"
      className="mb-3"
      action={
        <Button variant="second" size="small" onClick={state.discard}>
          Discard them
        </Button>
      }
    >
      Figures that you typed at {formatInstant(state.restoredAt)} UTC are back in their cells. Save them, or discard
      them.
    </Notice>
  );
}

/** What a pasted block did, and what of it was not taken. */
export function PasteNotice({ state }: { state: MonthSheetState }) {
  const outcome = state.pasted?.outcome;
  if (!outcome) return null;
  const lost = outcome.refused.length;
  return (
    <div role="status" className="border-t border-rule py-2 text-13">
      <p>
        <b>
          Pasted {outcome.rows} × {outcome.columns} cells.
        </b>{' '}
        {formatQuantity(outcome.cells.length, 'cell')} filled, nothing sent yet.{lost > 0 && ' Not taken:'}
      </p>
      {outcome.refused.map((sentence) => (
        <p key={sentence} className="text-stop">
          {sentence}
        </p>
      ))}
    </div>
  );
}

/** Two people, one cell: both values, and a way to each. */
export function ConflictNotice({
  state,
  onCorrect,
}: {
  state: MonthSheetState;
  onCorrect: (correcting: Correcting) => void;
}) {
  if (!state.conflict) return null;
  const { month, current, mine } = state.conflict;
  const clashing = LOG_FIELDS.filter(
    (field) => mine[field] !== undefined && current[field] !== null && mine[field] !== current[field],
  );
  return (
    <Notice
      live
      tone="caution"
      className="my-3"
      title={`Someone else saved ${formatLongMonth(month)} while you were typing.`}
      action={
        <>
          <Button
            size="small"
            onClick={() => {
              state.closeConflict(month);
              onCorrect({ month, wished: Object.fromEntries(clashing.map((field) => [field, mine[field]!])) });
            }}
          >
            Correct to {clashing.length === 1 ? mine[clashing[0]!] : 'mine'}
          </Button>
          <Button variant="second" size="small" onClick={() => state.closeConflict(month)}>
            Take {clashing.length === 1 ? current[clashing[0]!] : 'theirs'}
          </Button>
        </>
      }
    >
      <Table dense caption={`Both values of ${formatLongMonth(month)}`}>
        <TableHead>
          <Row>
            <HeadCell>Figure</HeadCell>
            <HeadCell num>
              {current.loggedBy}
              {current.loggedAt && `, ${formatInstant(current.loggedAt)} UTC`}
            </HeadCell>
            <HeadCell num>You</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {clashing.map((field) => (
            <Row key={field}>
              <RowHead>{LOG_FIELD_NAMES[field]}</RowHead>
              <Cell num>{current[field]}</Cell>
              <Cell num className="font-600">
                {mine[field]}
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <p className="mt-2 text-13">Saved: {countsInWords(current)}.</p>
    </Notice>
  );
}
