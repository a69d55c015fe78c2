import { conditionWords } from '@/lib/alerts/rules';
import type { AlertRules, AlertRuleView, SentAlert } from '@/lib/alerts/schema';
import { ROLE_NAMES } from '@/lib/auth/permissions';
import { formatInstant, formatQuantity } from '@/lib/format';

/** `When the interim analysis slips by 14 days or more against the last publication`. */
export function ruleWords({ condition, milestoneName }: Pick<AlertRuleView, 'condition' | 'milestoneName'>): string {
  return `When ${conditionWords(condition, milestoneName)}`;
}

/** `every sponsor viewer, Ines Calder`; a person who reads no publications any more is named as that. */
export function recipientWords(
  { recipients }: Pick<AlertRuleView, 'recipients'>,
  readers: AlertRules['readers'],
): string {
  return [
    ...recipients.roles.map((role) => `every ${ROLE_NAMES[role]}`),
    ...recipients.personIds.map((id) => readers.find((reader) => reader.id === id)?.name ?? 'a person who has left'),
  ].join(', ');
}

/** What has become of one message. */
export function mailWords({ state, attempts, sentAt, lastError }: SentAlert['mails'][number]): string {
  if (state === 'sent') return `sent ${sentAt ? `${formatInstant(sentAt)} UTC` : ''}`.trim();
  if (state === 'bounced') return 'refused by the recipient’s mail server';
  if (state === 'failed')
    return lastError?.startsWith('Not sent:')
      ? lastError.charAt(0).toLowerCase() + lastError.slice(1)
      : `given up after ${formatQuantity(attempts, 'attempt')}`;
  return attempts === 0
    ? 'waiting to be sent'
    : `waiting to be tried again, after ${formatQuantity(attempts, 'attempt')}`;
}
