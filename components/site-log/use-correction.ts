import { useState } from 'react';
import { figureFault } from '@/components/site-log/sheet-figures';
import { ProblemError } from '@/lib/http/client';
import { useCorrectMonth } from '@/lib/site-log/hooks';
import {
  CORRECTION_REASONS,
  LOG_FIELDS,
  type CorrectionReason,
  type LogField,
  type MonthEntry,
} from '@/lib/site-log/schema';

type CorrectionPart = LogField | 'reasonKind' | 'reason';

interface Corrected {
  code: string;
  site: string;
  entry: MonthEntry;
  /** Figures to start from, where somebody else's save is to be corrected at once. */
  wished?: Partial<Record<LogField, number>>;
  onDone: () => void;
}

/** The state of one correction: the figures as they should be, and why. */
export function useCorrection({ code, site, entry, wished, onDone }: Corrected) {
  const saved = LOG_FIELDS.filter((field) => entry[field] !== null);
  const [texts, setTexts] = useState<Partial<Record<LogField, string>>>(() =>
    Object.fromEntries(saved.map((field) => [field, String(wished?.[field] ?? entry[field])])),
  );
  const [reasonKind, setReasonKind] = useState<CorrectionReason | ''>('');
  const [reason, setReason] = useState('');
  const [faults, setFaults] = useState<Partial<Record<CorrectionPart, string>>>({});
  const [stopped, setStopped] = useState<string | null>(null);
  const correct = useCorrectMonth(code, site);
  const changed = saved.filter((field) => (texts[field] ?? '').trim() !== String(entry[field]));

  const send = async (): Promise<void> => {
    const found: Partial<Record<CorrectionPart, string>> = {};
    for (const field of changed) {
      const fault = texts[field]!.trim() === '' ? null : figureFault(texts[field]!);
      if (fault) found[field] = fault;
    }
    if (!CORRECTION_REASONS.includes(reasonKind as CorrectionReason)) found.reasonKind = 'Choose a reason.';
    if (reason.trim() === '') found.reason = 'Say in a few words why the figure changes.';
    setFaults(found);
    setStopped(changed.length === 0 ? 'Nothing is changed yet. Change a figure, or leave the month as it was.' : null);
    if (changed.length === 0 || Object.keys(found).length > 0 || correct.isPending) return;
    const cells = Object.fromEntries(
      changed.map((field) => [
        field,
        { from: entry[field], to: texts[field]!.trim() === '' ? null : Number(texts[field]) },
      ]),
    );
    try {
      await correct.mutateAsync({
        month: entry.month,
        cells,
        reasonKind: reasonKind as CorrectionReason,
        reason,
        source: 'screen',
      });
      onDone();
    } catch (error) {
      const pointed = error instanceof ProblemError ? (error.problem.errors ?? []) : [];
      setFaults(Object.fromEntries(pointed.map((fault) => [fault.pointer.split('/').at(-1)!, fault.detail])));
      setStopped((error as Error).message);
    }
  };

  return {
    ...{ saved, changed, texts, reasonKind, reason, faults, stopped, send },
    pending: correct.isPending,
    setText: (field: LogField, text: string) => setTexts((now) => ({ ...now, [field]: text })),
    setReasonKind,
    setReason,
  };
}

export type CorrectionState = ReturnType<typeof useCorrection>;
