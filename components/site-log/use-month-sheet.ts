import { useEffect, useMemo, useRef, useState } from 'react';
import { type PasteOutcome, placePaste } from '@/components/site-log/paste-block';
import { cellKey, figuresOf, monthsWithTyped, typedFaults, typedMonths } from '@/components/site-log/sheet-figures';
import { useDraft } from '@/components/site-log/use-draft';
import { OfflineError, ProblemError } from '@/lib/http/client';
import { useLogMonth, useMonthSheetQuery, useReplaceMonth } from '@/lib/site-log/hooks';
import { totalsOf } from '@/lib/site-log/rules';
import { LOG_FIELDS, type LogField, type MonthEntry, type MonthSheet } from '@/lib/site-log/schema';

export interface SheetConflict {
  month: string;
  current: MonthEntry;
  mine: Partial<Record<LogField, number>>;
}

/** What the line beside the button says. */
export type SaveOutcome =
  | { kind: 'saved'; entries: MonthEntry[]; at: Date }
  | { kind: 'kept'; months: string[] }
  | { kind: 'stopped'; message: string; entries: MonthEntry[] };

export const RETRY_SECONDS = 20;

interface Opened {
  code: string;
  personId: string;
  initial: MonthSheet;
  onDevice: boolean;
}

/** The sheet's state: what is saved, what is typed, what is wrong with it, and how the last save went. */
export function useMonthSheet({ code, personId, initial, onDevice }: Opened) {
  const siteCode = initial.site.code;
  const { data: sheet } = useMonthSheetQuery(code, siteCode, initial);
  const { typed, setTyped, restoredAt, settleRestored, discard } = useDraft({
    personId,
    code,
    site: siteCode,
    months: initial.months,
    onDevice,
  });
  const logMonth = useLogMonth(code, siteCode);
  const replace = useReplaceMonth(code, siteCode);
  const [opened, setOpened] = useState<readonly string[]>([]);
  const [pasted, setPasted] = useState<{ outcome: PasteOutcome; months: string[] } | null>(null);
  const [settled, setSettled] = useState(false);
  const [refused, setRefused] = useState<Record<string, string>>({});
  const [outcome, setOutcome] = useState<SaveOutcome | null>(null);
  const [conflict, setConflict] = useState<SheetConflict | null>(null);
  const [saving, setSaving] = useState(false);
  const busy = useRef(false);

  const faults = useMemo(
    () => ({ ...(settled ? typedFaults(sheet.months, typed, sheet.site) : {}), ...refused }),
    [settled, sheet, typed, refused],
  );
  const totals = useMemo(() => totalsOf(monthsWithTyped(sheet.months, typed)), [sheet.months, typed]);
  const last = sheet.months.at(-1);
  /** Rows with cells to type into: the last month, months begun, and gaps that were opened. */
  const openMonths = sheet.mayLog
    ? sheet.months
        .filter(
          (entry) =>
            entry.state !== 'reported' &&
            (entry === last ||
              entry.state === 'incomplete' ||
              opened.includes(entry.month) ||
              typed[entry.month] !== undefined),
        )
        .map((entry) => entry.month)
    : [];

  const type = (month: string, field: LogField, text: string): void => {
    setTyped((now) => ({ ...now, [month]: { ...now[month], [field]: text } }));
    setRefused(({ [cellKey(month, field)]: _gone, ...rest }) => rest);
    setSettled(false);
  };

  /** Takes a block of several cells; a single figure is left to the browser, as typing. */
  const paste = (month: string, field: LogField, text: string): boolean => {
    if (!/[\t\n\r;]/.test(text.trim())) return false;
    const placed = placePaste(text, { month, field }, sheet.months);
    setTyped((now) =>
      placed.cells.reduce(
        (next, cell) => ({ ...next, [cell.month]: { ...next[cell.month], [cell.field]: cell.text } }),
        now,
      ),
    );
    setPasted({ outcome: placed, months: [...new Set(placed.cells.map((cell) => cell.month))] });
    setSettled(true);
    return true;
  };

  const fillZeros = (month: string): void => {
    const entry = sheet.months.find((one) => one.month === month);
    const empty = LOG_FIELDS.filter((field) => entry?.[field] === null && !typed[month]?.[field]);
    setTyped((now) => ({
      ...now,
      [month]: { ...now[month], ...Object.fromEntries(empty.map((field) => [field, '0'])) },
    }));
  };

  const clearMonth = (month: string): void => setTyped(({ [month]: _gone, ...rest }) => rest);

  /** Sends one month; true: go on with the next. */
  const sendMonth = async (month: string, saved: MonthEntry[]): Promise<boolean> => {
    const cells = figuresOf(typed[month] ?? {});
    const version = sheet.months.find((entry) => entry.month === month)?.version ?? null;
    try {
      saved.push(
        await logMonth.mutateAsync({
          month,
          version,
          cells,
          source: pasted?.months.includes(month) ? 'paste' : 'screen',
        }),
      );
      clearMonth(month);
      return true;
    } catch (error) {
      if (error instanceof OfflineError) {
        setOutcome({ kind: 'kept', months: typedMonths(typed).filter((one) => one >= month) });
        return false;
      }
      const problem = error instanceof ProblemError ? error.problem : null;
      if (problem?.status === 409 && problem.current) {
        const current = problem.current as MonthEntry;
        setConflict({ month, current, mine: cells });
        replace(current);
      }
      const pointed = (problem?.errors ?? []).filter((fault) => fault.pointer.startsWith('/cells/'));
      setRefused((now) => ({
        ...now,
        ...Object.fromEntries(
          pointed.map((fault) => [cellKey(month, fault.pointer.slice(7) as LogField), fault.detail]),
        ),
      }));
      setOutcome({ kind: 'stopped', message: (error as Error).message, entries: saved });
      return false;
    }
  };

  const save = async (): Promise<void> => {
    const months = typedMonths(typed);
    setSettled(true);
    if (busy.current || months.length === 0 || Object.keys(typedFaults(sheet.months, typed, sheet.site)).length > 0)
      return;
    busy.current = true;
    setSaving(true);
    setConflict(null);
    setRefused({});
    const saved: MonthEntry[] = [];
    let going = true;
    for (const month of months) going = going && (await sendMonth(month, saved));
    if (going) {
      setOutcome({ kind: 'saved', entries: saved, at: new Date() });
      setPasted(null);
      settleRestored();
    }
    busy.current = false;
    setSaving(false);
  };

  useRetry(outcome?.kind === 'kept', save);

  return {
    ...{ sheet, typed, faults, totals, openMonths, pasted, outcome, conflict, saving, restoredAt },
    ...{ type, paste, fillZeros, save, discard },
    openMonth: (month: string) => setOpened((now) => [...now, month]),
    closeConflict: (month: string) => {
      setConflict(null);
      setOutcome(null);
      const current = sheet.months.find((entry) => entry.month === month);
      setTyped((now) => ({
        ...now,
        [month]: Object.fromEntries(
          Object.entries(now[month] ?? {}).filter(([field]) => current?.[field as LogField] === null),
        ),
      }));
    },
  };
}

export type MonthSheetState = ReturnType<typeof useMonthSheet>;

/** Tries again every twenty seconds, and at once when the line is back. */
function useRetry(waiting: boolean, save: () => Promise<void>): void {
  const latest = useRef(save);
  useEffect(() => {
    latest.current = save;
  });
  useEffect(() => {
    if (!waiting) return;
    const again = (): void => void latest.current();
    const timer = setInterval(again, RETRY_SECONDS * 1000);
    window.addEventListener('online', again);
    return () => {
      clearInterval(timer);
      window.removeEventListener('online', again);
    };
  }, [waiting]);
}
