import { numberTyped } from '@/components/ui/number-typed';
import type { AlertCondition, AlertRuleView } from '@/lib/alerts/schema';
import type { StudyRole } from '@/lib/auth/permissions';

/** A rule as it is typed: figures as text, the probability in percent. */
export interface RuleValues {
  milestoneCode: string;
  kind: AlertCondition['kind'];
  withinWeeks: string;
  percent: string;
  days: string;
  roles: StudyRole[];
  personIds: string[];
}

export function emptyRule(milestoneCode: string): RuleValues {
  return {
    milestoneCode,
    kind: 'slips',
    withinWeeks: '8',
    percent: '80',
    days: '14',
    roles: ['sponsor'],
    personIds: [],
  };
}

export function valuesOf({ milestoneCode, condition, recipients }: AlertRuleView): RuleValues {
  const empty = emptyRule(milestoneCode);
  return {
    ...empty,
    kind: condition.kind,
    ...(condition.kind === 'slips' ? { days: String(condition.days) } : {}),
    ...(condition.kind === 'nears'
      ? { withinWeeks: String(condition.withinWeeks), percent: String(Math.round(condition.probability * 100)) }
      : {}),
    roles: recipients.roles,
    personIds: recipients.personIds,
  };
}

/** As the rule's schema reads it; what is no number stays none, for the schema to say so. */
export function bodyOf(values: RuleValues, isActive: boolean): unknown {
  const percent = numberTyped(values.percent);
  const condition = {
    slips: { kind: 'slips', days: numberTyped(values.days) },
    nears: {
      kind: 'nears',
      withinWeeks: numberTyped(values.withinWeeks),
      probability: typeof percent === 'number' ? percent / 100 : percent,
    },
    reached: { kind: 'reached' },
  }[values.kind];
  return {
    milestoneCode: values.milestoneCode,
    condition,
    recipients: { roles: values.roles, personIds: values.personIds },
    isActive,
  };
}
