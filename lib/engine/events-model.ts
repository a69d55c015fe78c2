import { DAYS_PER_MONTH, toDayNumber } from './calendar';
import { getFamily } from './families';
import { daysOnStudy, eventData, type SurvivalData } from './survival-data';
import { type ParameterSource, planOf, type SurvivalFamily } from './survival-family';
import type { Study, Subject } from './types';

/** Constant hazard of loss to follow-up, per month: known, or Gamma(shape, rate). */
export interface DropoutModel {
  known: number | null;
  shape: number;
  rate: number;
}

/** Subjects who may still have their event: moments in days after the end of the cut-off day. */
export interface SubjectsAtRisk {
  /** Start of the day of randomisation. */
  randomised: Float64Array;
  /** Months from there to the end of the last known event-free day. */
  elapsed: Float64Array;
}

export interface EventsModel {
  family: SurvivalFamily;
  source: ParameterSource;
  data: SurvivalData;
  dropout: DropoutModel;
  cureFraction: number;
  /** Months from randomisation after which no event counts; Infinity: none. */
  followUpMonths: number;
  atRisk: SubjectsAtRisk;
  /** Moments of the observed events (ends of their days), ascending; with aggregate data all at the cut-off. */
  observedEvents: Float64Array;
  observed: { events: number; withdrawn: number; atRisk: number };
  /** Longest follow-up of any subject, months; null: unknown (aggregate data, no subject). */
  longestFollowUp: number | null;
}

/** @returns null where the study has no events part */
export function prepareEvents(study: Study): EventsModel | null {
  const { events } = study;
  if (!events) return null;
  const end = toDayNumber(study.dataCutoff) + 1;
  const subjects = events.subjects ?? [];
  const observed = observedCounts(subjects, events.aggregate);
  const data = eventData(events);
  const plan = planOf(events);
  const family = getFamily(events.model.family);
  const followUpMonths = events.followUpMonths ?? Infinity;
  const observedEvents = events.aggregate
    ? new Float64Array(events.aggregate.events)
    : Float64Array.from(
        subjects.filter(({ status }) => status === 'event'),
        ({ statusOn }) => toDayNumber(statusOn) + 1 - end,
      ).sort();
  return {
    family,
    source: family.source(plan, data),
    data,
    dropout: dropoutModel(events.dropout, observed.withdrawn, data.exposure),
    cureFraction: plan.cureFraction,
    followUpMonths,
    atRisk: events.aggregate
      ? { randomised: new Float64Array(observed.atRisk), elapsed: new Float64Array(observed.atRisk) }
      : subjectsAtRisk(subjects, end, followUpMonths),
    observedEvents,
    observed,
    longestFollowUp: data.hasTimes && data.times.length > 0 ? (data.times[data.times.length - 1] as number) : null,
  };
}

function observedCounts(
  subjects: readonly Subject[],
  aggregate: { events: number; withdrawn: number; atRisk: number } | undefined,
) {
  if (aggregate) return { events: aggregate.events, withdrawn: aggregate.withdrawn, atRisk: aggregate.atRisk };
  const count = (status: Subject['status']): number => subjects.filter((subject) => subject.status === status).length;
  return { events: count('event'), withdrawn: count('withdrawn'), atRisk: count('at-risk') };
}

function subjectsAtRisk(subjects: readonly Subject[], end: number, followUpMonths: number): SubjectsAtRisk {
  const watched = subjects.filter(
    (subject) => subject.status === 'at-risk' && daysOnStudy(subject) / DAYS_PER_MONTH < followUpMonths,
  );
  return {
    randomised: Float64Array.from(watched, ({ randomisedOn }) => toDayNumber(randomisedOn) - end),
    elapsed: Float64Array.from(watched, (subject) => daysOnStudy(subject) / DAYS_PER_MONTH),
  };
}

/**
 * Dropout under basis "data": η ~ Gamma(d0 + withdrawn, d0 / η_planned + T), T the person-months at risk; a planned hazard of
 * 0 has no weight to give. Without anyone withdrawn and without weight the hazard is 0.
 */
function dropoutModel(
  dropout: { perMonth: number; basis: 'plan' | 'data'; priorEvents: number },
  withdrawn: number,
  exposure: number,
): DropoutModel {
  const known = { known: dropout.perMonth, shape: NaN, rate: NaN };
  if (dropout.basis === 'plan') return known;
  const weight = dropout.perMonth > 0 ? dropout.priorEvents : 0;
  const shape = weight + withdrawn;
  if (shape === 0) return { ...known, known: 0 };
  return { known: null, shape, rate: (weight > 0 ? weight / dropout.perMonth : 0) + exposure };
}
