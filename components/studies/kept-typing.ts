/*
 * Typing that is not saved yet is kept on this device, per person, study and section, and offered back. A device that
 * refuses storage (private windows) only loses that.
 */

export interface KeptTyping {
  typed: unknown;
  /** The version of the section that was being changed. */
  version: number;
  keptAt: string;
}

export function keptKey(personId: string, code: string, section: string): string {
  return `kalends:plan:${personId}:${code}:${section}`;
}

/** Null where nothing is kept, or nothing else than what stands. */
export function readKept(key: string, standing: unknown): KeptTyping | null {
  try {
    const kept: unknown = JSON.parse(window.localStorage.getItem(key) ?? 'null');
    return isKept(kept) && JSON.stringify(kept.typed) !== JSON.stringify(standing) ? kept : null;
  } catch {
    return null;
  }
}

function isKept(kept: unknown): kept is KeptTyping {
  return typeof kept === 'object' && kept !== null && 'typed' in kept && 'version' in kept && 'keptAt' in kept;
}

export function keep(key: string, kept: KeptTyping | null): void {
  try {
    if (kept) window.localStorage.setItem(key, JSON.stringify(kept));
    else window.localStorage.removeItem(key);
  } catch {
    // Storage is full or forbidden: what is typed stays in the page as long as it is open.
  }
}
