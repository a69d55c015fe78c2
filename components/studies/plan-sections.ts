import {
  EMPTY_ENROLMENT,
  enrolmentField,
  type EnrolmentTyped,
  enrolmentTyped,
  enrolmentValue,
} from '@/components/studies/enrolment-typed';
import { eventsField, type EventsTyped, eventsTyped, eventsValue } from '@/components/studies/events-typed';
import {
  milestonesField,
  type MilestonesTyped,
  milestonesTyped,
  milestonesValue,
} from '@/components/studies/milestones-typed';
import type { SectionCodec } from '@/components/studies/use-plan-section';
import { numberTyped } from '@/components/ui/number-typed';
import { formatPercent } from '@/lib/format';
import type { Plan } from '@/lib/studies/schema';

/* The four sections as forms. Values were checked when they were saved, so their types are the plan's. */

export const ENROLMENT: SectionCodec<EnrolmentTyped> = {
  section: 'enrolment',
  typedOf: (value) => (value ? enrolmentTyped(value as Plan['enrolment']) : EMPTY_ENROLMENT),
  valueOf: (typed, saved) => enrolmentValue(typed, saved as Plan['enrolment'] | null),
  fieldOf: enrolmentField,
  wordsOf: (path) =>
    path === 'rampUp.fraction' ? `Give a share between 0 and ${formatPercent(1)}, for example 50.` : undefined,
};

const EVENTS_WORDS: Record<string, string> = {
  'dropout.perMonth': 'Give a percentage a month from 0 up, for example 0.8.',
  'model.cureFraction': 'Give a percentage from 0 to under 100, for example 10.',
};

export const EVENTS: SectionCodec<EventsTyped> = {
  section: 'events',
  typedOf: (value, isSaved) => eventsTyped(value as Plan['events'], isSaved),
  valueOf: (typed, saved) => eventsValue(typed, saved as Plan['events']),
  fieldOf: eventsField,
  wordsOf: (path) => EVENTS_WORDS[path],
};

export const MILESTONES: SectionCodec<MilestonesTyped> = {
  section: 'milestones',
  typedOf: (value) => milestonesTyped(value as Plan['milestones'] | null),
  valueOf: milestonesValue,
  fieldOf: milestonesField,
};

export interface SimulationTyped {
  draws: string;
  seed: string;
  horizonMonths: string;
}

export const SIMULATION: SectionCodec<SimulationTyped> = {
  section: 'simulation',
  typedOf: (value) => {
    const { draws, seed, horizonMonths } = (value as Plan['simulation'] | null) ?? {
      draws: 10_000,
      seed: 1,
      horizonMonths: 120,
    };
    return { draws: String(draws), seed: String(seed), horizonMonths: String(horizonMonths) };
  },
  valueOf: ({ draws, seed, horizonMonths }) => ({
    draws: numberTyped(draws),
    seed: numberTyped(seed),
    horizonMonths: numberTyped(horizonMonths),
  }),
  fieldOf: (path) => path,
};
