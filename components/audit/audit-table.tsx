import { Fragment } from 'react';
import { actionWords, recordWords, valueWords } from '@/components/audit/audit-words';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import type { AuditEntryView } from '@/lib/audit/schema';
import { formatCount, formatInstant } from '@/lib/format';

export function AuditTable({ entries }: { entries: AuditEntryView[] }) {
  return (
    <Table caption="The study’s trail" dense>
      <TableHead>
        <Row>
          <HeadCell num>No.</HeadCell>
          <HeadCell>When, UTC</HeadCell>
          <HeadCell>Who</HeadCell>
          <HeadCell>What</HeadCell>
          <HeadCell className="w-[38%]">From, to</HeadCell>
          <HeadCell>Why</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {entries.map((entry) => (
          <Row key={entry.sequence}>
            <RowHead num>
              <span title={`digest ${entry.digest}`}>{entry.sequence}</span>
            </RowHead>
            <Cell className="whitespace-nowrap">{formatInstant(entry.at)}</Cell>
            <Cell>
              {entry.actorName}
              <SubLine>{entry.actorRole}</SubLine>
            </Cell>
            <Cell>
              {actionWords(entry.action)}
              <SubLine>
                {recordWords(entry)}, by {entry.source}
              </SubLine>
            </Cell>
            <Cell>
              <ChangeList changes={entry.changes} />
            </Cell>
            <Cell>{entry.reason}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

/** As many changes as a line or two hold; a list of five thousand sites says how many more. */
const SHOWN = 12;

function ChangeList({ changes }: Pick<AuditEntryView, 'changes'>) {
  const more = changes.length - SHOWN;
  return (
    <p className="[overflow-wrap:anywhere]">
      {changes.slice(0, SHOWN).map((change, place) => (
        <Fragment key={change.field}>
          {place > 0 && '; '}
          {change.field}{' '}
          {change.old !== null && change.old !== undefined && (
            <>
              <s className="text-ink-soft">{valueWords(change.old)}</s>{' '}
            </>
          )}
          <span className="font-600">{valueWords(change.new)}</span>
        </Fragment>
      ))}
      {more > 0 && `; and ${formatCount(more)} more`}
    </p>
  );
}
