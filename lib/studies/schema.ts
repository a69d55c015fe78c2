import type { Enrolment, EventsPart, Milestone, Study } from '../engine/types';

/** What a plan version holds: the study file's own parts, without the sites and the data. Names are the contract's. */
export interface Plan {
  enrolment: Omit<Enrolment, 'sites' | 'screening'>;
  events: Omit<EventsPart, 'subjects' | 'aggregate'> | null;
  milestones: Milestone[];
  simulation: Study['simulation'];
}

/** A draft is kept section by section, as far as it has been typed. */
export interface PlanDraftSections {
  enrolment?: unknown;
  events?: unknown;
  milestones?: unknown;
  simulation?: unknown;
}

/** Why a plan changes once a run exists. */
export const PLAN_REASONS = ['protocol-amendment', 'site-list', 'assumption'] as const;
export type PlanReason = (typeof PLAN_REASONS)[number];
