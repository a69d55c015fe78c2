import type { AggregateEvents, SubjectStatus } from '../engine/types';

export type AggregateCounts = AggregateEvents;

export interface CutCounts {
  subjects: number;
  byStatus: Record<SubjectStatus, number>;
}

/** A site whose listing and log disagree on the number randomised by the cut-off. */
export interface SiteDifference {
  site: string;
  listed: number;
  logged: number;
}
