import type { MilestoneForecast, Study } from '../engine/types';
import type { FirstMilestone, Run, RunContext, RunFailure, RunStatus } from './schema';

/** A run as the list's query reads it: without the files, which are large. */
export interface RunRecord {
  id: string;
  number: number;
  status: RunStatus;
  cutoff_on: string;
  plan_version: number;
  data_cut: number | null;
  draws: number;
  draws_done: number;
  seed: string | number;
  study_sha256: string;
  engine_version: string | null;
  failure: RunFailure | null;
  requested_at: Date | string;
  requested_by: string;
  started_at: Date | string | null;
  finished_at: Date | string | null;
  publication: number | null;
  first_milestone: MilestoneForecast | null;
}

const instantOf = (value: Date | string): string => new Date(value).toISOString();

export function serialiseRun(row: RunRecord): Run {
  return {
    number: row.number,
    status: row.status,
    cutoffOn: row.cutoff_on,
    planVersion: row.plan_version,
    dataCut: row.data_cut,
    draws: row.draws,
    drawsDone: row.draws_done,
    seed: Number(row.seed),
    studySha256: row.study_sha256,
    engineVersion: row.engine_version,
    failure: row.failure,
    requestedAt: instantOf(row.requested_at),
    requestedBy: row.requested_by,
    startedAt: row.started_at && instantOf(row.started_at),
    finishedAt: row.finished_at && instantOf(row.finished_at),
    publication: row.publication,
    first: row.first_milestone && firstOf(row.first_milestone),
  };
}

function firstOf({ code, name, reachedOn, probabilityReached, quantiles }: MilestoneForecast): FirstMilestone {
  return {
    code,
    name: name ?? code,
    reachedOn,
    probabilityReached,
    low: quantiles['0.1'],
    median: quantiles['0.5'],
    high: quantiles['0.9'],
  };
}

/** What the plan had assumed, beside which the fit is shown. */
export function serialisePlanned({ enrolment, events }: Study): RunContext['plan'] {
  return {
    meanPerMonth: enrolment.rate.meanPerMonth,
    cv: enrolment.rate.cv,
    basis: enrolment.rate.basis,
    events: events
      ? {
          family: events.model.family,
          medianMonths: events.model.medianMonths,
          shape: events.model.shape ?? null,
          priorEvents: events.model.priorEvents,
          basis: events.model.basis,
          dropoutPerMonth: events.dropout.perMonth,
        }
      : null,
  };
}
