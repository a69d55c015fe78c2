import type { Typed } from '@/components/site-log/sheet-figures';

export interface Draft {
  /** When it was last typed into. */
  at: string;
  typed: Typed;
}

/** One person's figures of one site: another person on the same device never sees them. */
export const draftKey = (personId: string, code: string, site: string): string =>
  `kalends:month-sheet:${personId}:${code}:${site}`;

export function readDraft(key: string): Draft | null {
  try {
    const draft = JSON.parse(localStorage.getItem(key) ?? 'null') as Draft | null;
    return draft && typeof draft.at === 'string' && typeof draft.typed === 'object' ? draft : null;
  } catch {
    return null;
  }
}

/** Storage may be full or forbidden: then the sheet works as before, without its net. */
export function keepDraft(key: string, typed: Typed): void {
  try {
    localStorage.setItem(key, JSON.stringify({ at: new Date().toISOString(), typed } satisfies Draft));
  } catch {
    return;
  }
}

export function dropDraft(key: string): void {
  try {
    localStorage.removeItem(key);
  } catch {
    return;
  }
}
