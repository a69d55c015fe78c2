import type { StudyRole } from '../auth/permissions';

/** When a rule speaks. `nears`: within so many weeks at such a probability; `slips`: median later by so many days than last published. */
export type AlertCondition =
  | { kind: 'nears'; withinWeeks: number; probability: number }
  | { kind: 'slips'; days: number }
  | { kind: 'reached' };

export interface AlertRecipients {
  roles: StudyRole[];
  personIds: string[];
}

/** What was said, as it was said: published figures only. */
export interface AlertContent {
  milestoneCode: string;
  milestoneName: string;
  condition: AlertCondition;
  publicationNumber: number;
  /** The news, as a sentence. */
  headline: string;
}
