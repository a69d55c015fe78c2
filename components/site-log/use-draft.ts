import { useEffect, useState } from 'react';
import { draftKey, dropDraft, keepDraft, readDraft } from '@/components/site-log/draft-storage';
import { type Typed, typedMonths } from '@/components/site-log/sheet-figures';
import { LOG_FIELDS, type MonthEntry } from '@/lib/site-log/schema';

interface DraftOf {
  personId: string;
  code: string;
  site: string;
  months: readonly MonthEntry[];
  /** False while the page is still the server's, which knows nothing of this device. */
  onDevice: boolean;
}

/** The typed figures, kept on this device from the first key to the save, and put back after a reload. */
export function useDraft({ personId, code, site, months, onDevice }: DraftOf) {
  const key = draftKey(personId, code, site);
  const [found] = useState(() => (onDevice ? readDraft(key) : null));
  const [typed, setTyped] = useState<Typed>(() => stillOpen(found?.typed ?? {}, months));
  const [restoredAt, setRestoredAt] = useState(() => (typedMonths(typed).length > 0 ? (found?.at ?? null) : null));

  useEffect(() => {
    if (!onDevice) return;
    if (typedMonths(typed).length === 0) dropDraft(key);
    else keepDraft(key, typed);
  }, [key, onDevice, typed]);

  const discard = (): void => {
    setTyped({});
    setRestoredAt(null);
  };
  return { typed, setTyped, restoredAt, settleRestored: () => setRestoredAt(null), discard };
}

/** Cells that were saved meanwhile, here or by somebody else, are no longer the draft's. */
function stillOpen(typed: Typed, months: readonly MonthEntry[]): Typed {
  const kept: Typed = {};
  for (const entry of months) {
    for (const field of LOG_FIELDS) {
      const text = typed[entry.month]?.[field];
      if (typeof text === 'string' && entry[field] === null)
        kept[entry.month] = { ...kept[entry.month], [field]: text };
    }
  }
  return kept;
}
