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

/** A value of any kind in one short line. */
export function valueWords(value: unknown): string {
  if (value === null || value === undefined) return 'empty';
  if (typeof value === 'object') {
    const text = JSON.stringify(value);
    return text.length > 120 ? `${text.slice(0, 117)}…` : text;
  }
  return String(value);
}
