'use client';

import { useState } from 'react';
import { type Correcting, Ledger } from '@/components/site-log/ledger';
import { OpenMonthFields } from '@/components/site-log/open-month-fields';
import { SaveBar } from '@/components/site-log/save-bar';
import { dueWords } from '@/components/site-log/sheet-figures';
import { ConflictNotice, DraftNotice, PasteNotice } from '@/components/site-log/sheet-notices';
import { SitePlan } from '@/components/site-log/site-plan';
import { type MonthSheetState, useMonthSheet } from '@/components/site-log/use-month-sheet';
import { useOnDevice, usePhone } from '@/components/site-log/use-phone';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { type HeadFigure, PageHead, type PathStep } from '@/components/ui/page-head';
import { addMonths } from '@/lib/dates';
import { formatDate, formatLongMonth } from '@/lib/format';
import { dueOn } from '@/lib/site-log/rules';
import type { MonthSheet as Sheet } from '@/lib/site-log/schema';

interface MonthSheetProps {
  code: string;
  personId: string;
  initial: Sheet;
  path: PathStep[];
}

/** Drawn once as the server has it, then anew on the device, which may hold figures that were not sent. */
export function MonthSheet(props: MonthSheetProps) {
  const onDevice = useOnDevice();
  return <SheetPage key={String(onDevice)} {...props} onDevice={onDevice} />;
}

function SheetPage({ code, personId, initial, path, onDevice }: MonthSheetProps & { onDevice: boolean }) {
  const state = useMonthSheet({ code, personId, initial, onDevice });
  const phone = usePhone();
  const [correcting, setCorrecting] = useState<Correcting | null>(null);
  const [chosen, setChosen] = useState<string | null>(null);
  const { site, mayLog, months } = state.sheet;
  const inHand = chosen && state.openMonths.includes(chosen) ? chosen : (state.openMonths.at(-1) ?? null);
  // The save that completes the last open row still says what was saved and when.
  const saved = state.outcome?.kind === 'saved' ? state.outcome.entries.at(-1)?.month : undefined;
  const barMonth = inHand ?? saved;
  const choose = (month: string): void => {
    state.openMonth(month);
    setChosen(month);
  };
  const ledger = <Ledger state={state} code={code} compact={phone} correcting={correcting} onCorrect={setCorrecting} />;
  return (
    <>
      <PageHead
        path={path}
        title={`${site.name}, ${site.city}`}
        figure={figureOf(state, inHand)}
        action={mayLog && !phone && months.length > 0 ? <HowToType /> : undefined}
      />
      {months.length === 0 ? (
        <NothingYet sheet={state.sheet} />
      ) : (
        <div
          data-sheet
          className="md:grid md:grid-cols-12 md:gap-x-8"
          // The month in hand is the one whose cell was last typed into.
          onFocus={({ target }) => target.dataset.cell && setChosen(target.dataset.cell.slice(0, 7))}
        >
          <div className="md:col-span-12 lg:col-span-9">
            <DraftNotice state={state} />
            {phone && inHand && <OpenMonthFields state={state} month={inHand} />}
            {phone && barMonth && <SaveBar state={state} month={barMonth} />}
            <ConflictNotice state={state} onCorrect={setCorrecting} />
            {phone && <PasteNotice state={state} />}
            {phone && <Gaps state={state} inHand={inHand} onChoose={choose} />}
            {phone && <h2 className="mt-8 mb-3">Earlier months</h2>}
            {ledger}
            {!phone && barMonth && <SaveBar state={state} month={barMonth} />}
            {!phone && <PasteNotice state={state} />}
            <Balance state={state} />
          </div>
          <aside className="mt-8 space-y-5 md:col-span-12 lg:col-span-3 lg:mt-0">
            <SitePlan sheet={state.sheet} />
            {mayLog && <WhenTheLineDrops />}
          </aside>
        </div>
      )}
    </>
  );
}

function figureOf({ sheet }: MonthSheetState, inHand: string | null): HeadFigure | undefined {
  if (sheet.months.length === 0) return undefined;
  if (inHand) return { label: 'To log', value: formatLongMonth(inHand), unit: `due ${dueWords(dueOn(inHand))}` };
  const gaps = sheet.months.filter((entry) => entry.state !== 'reported').length;
  const next =
    sheet.runningMonth &&
    `${formatLongMonth(sheet.runningMonth)} can be logged from ${formatDate(`${addMonths(sheet.runningMonth, 1)}-01`)}.`;
  return {
    label: 'Logged',
    value: `${sheet.months.length - gaps} of ${sheet.months.length} months`,
    below: <p className="text-ink-soft">{next}</p>,
  };
}

function NothingYet({ sheet: { site, runningMonth } }: { sheet: Sheet }) {
  if (!site.activatedOn)
    return (
      <EmptyState title="This site is not open yet">
        The trial manager records its activation; the month of that day is the first to log.
      </EmptyState>
    );
  const first = runningMonth ?? site.activatedOn.slice(0, 7);
  return (
    <EmptyState title={`${formatLongMonth(first)} is the first month`}>
      The site opened on {formatDate(site.activatedOn)}. {formatLongMonth(first)} can be logged once it is over, from{' '}
      {formatDate(`${addMonths(first, 1)}-01`)}.
    </EmptyState>
  );
}

function HowToType() {
  return (
    <p className="text-13 text-ink-soft">
      Type across the open row. Tab and Enter move as in a spreadsheet; a pasted block fills the cells. Nothing is sent
      until you save. A month can be logged once it is over.
    </p>
  );
}

/** On a phone the gaps stand above the ledger, each with its own way in. */
function Gaps({
  state,
  inHand,
  onChoose,
}: {
  state: MonthSheetState;
  inHand: string | null;
  onChoose: (month: string) => void;
}) {
  if (!state.sheet.mayLog) return null;
  const gaps = state.sheet.months.filter((entry) => entry.state !== 'reported' && entry.month !== inHand);
  return gaps.map((entry) => (
    <section
      key={entry.month}
      className="-mx-4 mt-5 grid gap-1 border-y border-caution bg-caution-paper px-4 pt-3 pb-4 text-caution"
    >
      <p className="font-600">
        {formatLongMonth(entry.month)} is {entry.state === 'missing' ? 'not logged' : 'incomplete'}.
      </p>
      <p>Not counted as zero.</p>
      <Button variant="second" className="mt-2 border-caution text-caution" onClick={() => onChoose(entry.month)}>
        Log {formatLongMonth(entry.month)}
      </Button>
    </section>
  ));
}

function Balance({ state: { totals } }: { state: MonthSheetState }) {
  const waiting = totals.screened - totals.failed - totals.randomised;
  if (waiting < 0) return null;
  return (
    <p className="text-13 text-ink-soft max-md:mt-3">
      Since opening: {totals.screened} screened = {totals.failed} failed + {totals.randomised} randomised + {waiting}{' '}
      still in screening.
    </p>
  );
}

function WhenTheLineDrops() {
  return (
    <section className="border-t border-rule pt-3">
      <h3>When the line drops</h3>
      <p className="mt-1 text-13 text-ink-soft">
        Figures stay on this device and are sent when you are back. You will see “Kept on this device, not sent” until
        then.
      </p>
    </section>
  );
}
