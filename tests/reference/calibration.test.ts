import { describe, expect, it } from 'vitest';
import { DAYS_PER_MONTH, toDayNumber, toIsoDate } from '@/lib/engine/calendar';
import { prepareForecast, simulateChunk } from '@/lib/engine/forecast';
import { createGammaVariate } from '@/lib/engine/gamma-variate';
import { createGenerator } from '@/lib/engine/generator';
import type { Study, Subject } from '@/lib/engine/types';

/*
 * Calibration by simulation (Talts et al. 2018, arXiv:1804.06788): truths drawn from the priors, data drawn from the truths by a
 * plain simulator of this file's own, a forecast from the data. If every part of the inference is right, the rank of what then
 * happened among the draws is uniform. A mistake in exposure, posterior, residual life, dropout or the calendar bends the ranks.
 */

const CUTOFF = '2027-03-31';
const PLAN = { mean: 0.4, cv: 0.8, median: 10, medianEvents: 4, dropout: 0.03, dropoutEvents: 4 };

interface Replicate {
  study: Study;
  /** What then happened, at each month-end after the cut-off. */
  randomised: (day: number) => number;
  events: (day: number) => number;
}

function replicate(number: number): Replicate {
  const generator = createGenerator(77);
  generator.startAt(0, number, 0);
  const gamma = createGammaVariate(generator);
  // Box & Muller.
  const normal = (): number => Math.sqrt(2 * generator.exponential()) * Math.cos(2 * Math.PI * generator.uniform());
  const mean = PLAN.mean * Math.exp(normal());
  const alpha = PLAN.cv ** -2 * Math.exp(normal());
  const median = PLAN.median * Math.exp(normal() / Math.sqrt(PLAN.medianEvents));
  const kappa = Math.exp(0.5 * normal());
  const eta = gamma(PLAN.dropoutEvents, PLAN.dropoutEvents / PLAN.dropout);

  const end = toDayNumber(CUTOFF) + 1;
  const horizon = 400;
  const entries: { site: number; at: number; event: number; lost: number }[] = [];
  const starts = Array.from({ length: 14 }, (_, site) => (site < 10 ? -400 + 35 * site : 15 * (site - 9)));
  starts.forEach((start, site) => {
    const rate = gamma(alpha, alpha / mean) / DAYS_PER_MONTH;
    for (let at = start; rate > 0;) {
      at += generator.exponential() / rate;
      if (at > horizon) break;
      const months = median * (generator.exponential() / Math.LN2) ** (1 / kappa);
      const lost = at + (DAYS_PER_MONTH * generator.exponential()) / eta;
      entries.push({ site, at, event: at + DAYS_PER_MONTH * months, lost });
    }
  });
  const present = entries.filter(({ at }) => at <= 0);
  const dayOf = (moment: number): number => end - 1 + Math.ceil(moment);
  const subjects: Subject[] = present.map(({ site, at, event, lost }, place) => {
    const over = Math.min(event, lost);
    const status = over > 0 ? 'at-risk' : event <= lost ? 'event' : 'withdrawn';
    return {
      id: String(place),
      site: String(site),
      randomisedOn: toIsoDate(dayOf(at)),
      status,
      statusOn: status === 'at-risk' ? CUTOFF : toIsoDate(dayOf(over)),
    };
  });
  const study: Study = {
    format: 'kalends-study/1',
    study: { code: 'CAL', title: 'Calibration' },
    dataCutoff: CUTOFF,
    enrolment: {
      target: 5000,
      rate: { meanPerMonth: PLAN.mean, cv: PLAN.cv, basis: 'data' },
      sites: starts.map((start, site) => {
        const day = toIsoDate(end + start);
        return start < 0
          ? {
              code: String(site),
              country: 'PL',
              activatedOn: day,
              randomised: subjects.filter((subject) => subject.site === String(site)).length,
            }
          : { code: String(site), country: 'PL', planned: { earliest: day, likely: day, latest: day } };
      }),
    },
    events: {
      model: { family: 'weibull', medianMonths: PLAN.median, shape: 1, basis: 'data', priorEvents: PLAN.medianEvents },
      dropout: { perMonth: PLAN.dropout, basis: 'data', priorEvents: PLAN.dropoutEvents },
      subjects,
    },
    milestones: [{ code: 'M', kind: 'randomised', count: 5000 }],
    simulation: { draws: 250, seed: number, horizonMonths: 12 },
  };
  return {
    study,
    randomised: (day) => entries.filter(({ at }) => at <= day).length,
    events: (day) => entries.filter(({ event, lost }) => event <= lost && event <= day).length,
  };
}

/** Rank of the truth among the draws, as a number from 0 to 1; ties are broken at random. */
function rankOf(truth: number, draws: Int32Array, uniform: number): number {
  const less = draws.filter((draw) => draw < truth).length;
  const equal = draws.filter((draw) => draw === truth).length;
  return (less + uniform * (equal + 1)) / (draws.length + 1);
}

interface Ranks {
  chiSquared: number;
  centre: number;
}

/** Ranks of randomised and events, 3 and 9 months after the cut-off, over many replicates. */
function ranksOf(replicates: number, change: (study: Study) => void): Map<string, Ranks> {
  const ranks = new Map<string, number[]>();
  const breaker = createGenerator(5);
  breaker.startAt(0, 0, 0);
  for (let number = 0; number < replicates; number += 1) {
    const { study, randomised, events } = replicate(number);
    change(study);
    const prepared = prepareForecast(study);
    const chunk = simulateChunk(prepared, 0);
    for (const month of [2, 8]) {
      const day = prepared.monthEnds[month] as number;
      const add = (name: string, truth: number, counts: Int32Array): void => {
        const draws = counts.slice(month * chunk.draws, (month + 1) * chunk.draws);
        const key = `${name}, month ${month + 1}`;
        ranks.set(key, [...(ranks.get(key) ?? []), rankOf(truth, draws, breaker.uniform())]);
      };
      add('randomised', randomised(day), chunk.randomisedAtMonthEnds);
      add('events', events(day), chunk.eventsAtMonthEnds);
    }
  }
  return new Map([...ranks].map(([name, list]) => [name, describeRanks(list)]));
}

function describeRanks(list: readonly number[]): Ranks {
  const bins = new Float64Array(10);
  for (const rank of list) bins[Math.floor(rank * 10)] = (bins[Math.floor(rank * 10)] as number) + 1;
  const expected = list.length / 10;
  return {
    chiSquared: bins.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0),
    centre: list.reduce((sum, rank) => sum + rank, 0) / list.length,
  };
}

/** 99.9 % point of chi-squared with 9 degrees of freedom. */
const BENT = 27.88;

describe('forecasts made from the priors’ own truths', () => {
  it('what then happened has uniform ranks', () => {
    const replicates = 240;
    const ranks = ranksOf(replicates, () => {});
    expect(ranks.size).toBe(4);
    for (const [name, { chiSquared, centre }] of ranks) {
      expect(chiSquared, name).toBeLessThan(BENT);
      expect(Math.abs(centre - 0.5), name).toBeLessThan(3.3 / Math.sqrt(12 * replicates));
    }
  });

  it('control: the plan taken as known bends the ranks of both', () => {
    const ranks = ranksOf(100, ({ enrolment, events }) => {
      enrolment.rate.basis = 'plan';
      if (events) events.model.basis = 'plan';
    });
    for (const [name, { chiSquared }] of ranks) expect(chiSquared, name).toBeGreaterThan(BENT);
  });
});
