import type { FieldFault } from '../errors';

export const RUN_STATUSES = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export type RunStatus = (typeof RUN_STATUSES)[number];

/** A failed run is an outcome of the run: its reason, with the faults of the study file where there are some. */
export interface RunFailure {
  reason: string;
  errors: FieldFault[];
}
