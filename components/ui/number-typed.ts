/**
 * What was typed into a number field as a number: thousands may be parted by commas or spaces, a minus may be a real
 * one. Empty is null (not nought); what is no number is NaN, so that a schema refuses it by name.
 */
export function numberTyped(typed: unknown): number | null {
  if (typeof typed === 'number') return typed;
  const text = String(typed ?? '').trim();
  if (text === '') return null;
  const plain = text.replace(/\u2212/g, '-').replace(/(?<=\d)[,\u00a0\u202f ](?=\d{3}(?:\D|$))/g, '');
  return /^[+-]?(?:\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : Number.NaN;
}
