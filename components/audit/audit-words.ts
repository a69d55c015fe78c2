/** The kinds of act, by the first part of an action's name. */
export const AUDIT_KINDS: Record<string, string> = {
  studies: 'Study',
  plan: 'Plan',
  sites: 'Sites',
  'site-log': 'Site log',
  'data-cuts': 'Data cuts',
  forecasts: 'Forecasts',
  publications: 'Publications',
  alerts: 'Alerts',
  people: 'People',
};

/** `site-log:correct` as `Site log: correct`. */
export function actionWords(action: string): string {
  const [kind = '', verb = ''] = action.split(':');
  return `${AUDIT_KINDS[kind] ?? kind}: ${verb.replaceAll('-', ' ')}`;
}

/** A value of any kind in one short line; of a hash its beginning, as people compare them. */
export function valueWords(value: unknown): string {
  if (value === null || value === undefined) return 'empty';
  const text = typeof value === 'object' ? JSON.stringify(value) : String(value);
  if (/^[0-9a-f]{64}$/.test(text)) return `${text.slice(0, 12)}…`;
  return text.length > 120 ? `${text.slice(0, 117)}…` : text;
}

/** Which record: `site month 107 2026-03`. Identifiers that mean nothing to people are left out. */
export function recordWords({ recordType, recordId }: { recordType: string; recordId: string }): string {
  const kind = recordType.replaceAll(/[_-]/g, ' ');
  return /^[0-9a-f]{8}-[0-9a-f]{4}-/.test(recordId) ? kind : `${kind} ${recordId}`;
}
