import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandEdge, bandSlices, countAt, tintOf, type BandData, type EdgePoint } from '@/components/charts/figure-bands';
import { endOfDay, isoOfDay } from '@/components/charts/figure-scale';
import { QUANTILE_LEVELS } from '@/lib/engine/types';
import { CUTOFF, fixtureForecast, TARGETS } from './figure-fixture';

const forecast = fixtureForecast();
const start = { day: endOfDay(CUTOFF), count: 86 };
const events: BandData = {
  kind: 'events',
  start,
  monthly: forecast.monthly,
  milestones: forecast.milestones,
  ceiling: TARGETS.FA,
};

/** The day on which a curve comes to a count, between its points. */
function dayAt(edge: readonly EdgePoint[], count: number): number {
  const after = edge.findIndex((point) => point.count >= count);
  const right = edge[after];
  const left = edge[after - 1];
  if (!left || !right) throw new Error(`never comes to ${count}`);
  return left.day + ((count - left.count) / (right.count - left.count)) * (right.day - left.day);
}

describe('P(N(t) >= k) = P(T_k <= t)', () => {
  const pairs = [
    ['0.1', '0.9'],
    ['0.25', '0.75'],
    ['0.5', '0.5'],
    ['0.9', '0.1'],
  ] as const;

  it.each(pairs)(
    'the months alone bring the %s edge to each count at about the %s quantile of its date',
    (level, complement) => {
      const months = bandEdge(level, { ...events, milestones: [], ceiling: 600 });
      for (const code of ['IA', 'FA'] as const) {
        const on = forecast.milestones.find((milestone) => milestone.code === code)?.quantiles[complement];
        expect(Math.abs(dayAt(months, TARGETS[code]) - endOfDay(on ?? ''))).toBeLessThan(5);
      }
    },
  );

  it.each(pairs)('anchored, the %s edge passes exactly through the count at the %s quantile', (level, complement) => {
    const edge = bandEdge(level, events);
    for (const code of ['IA', 'FA'] as const) {
      const on = forecast.milestones.find((milestone) => milestone.code === code)?.quantiles[complement];
      expect(edge).toContainEqual({ day: endOfDay(on ?? ''), count: TARGETS[code] });
    }
  });

  it('would not hold for the wrong end: the low edge does not meet the count at the early date', () => {
    const early = forecast.milestones.find((milestone) => milestone.code === 'IA')?.quantiles['0.1'];
    expect(countAt(bandEdge('0.1', events), endOfDay(early ?? ''))).toBeLessThan(TARGETS.IA - 10);
  });
});

describe('an edge', () => {
  it('starts at the cut-off with what was counted', () => {
    expect(bandEdge('0.5', events)[0]).toEqual(start);
  });

  it('ends at the last count line', () => {
    const edge = bandEdge('0.9', events);
    expect(edge[edge.length - 1]?.count).toBe(TARGETS.FA);
    expect(edge.filter((point) => point.count === TARGETS.FA)).toHaveLength(1);
  });

  it('runs to the last month where its line is not reached', () => {
    const milestones = forecast.milestones.map((milestone) => ({
      ...milestone,
      quantiles: { ...milestone.quantiles, '0.9': null },
    }));
    const short = { ...events, milestones, monthly: forecast.monthly.slice(0, 8) };
    const edge = bandEdge('0.1', short);
    expect(edge[edge.length - 1]?.day).toBe(endOfDay(forecast.monthly[7]?.monthEnd ?? ''));
  });

  it('begins no lower than a count that was reached before the cut-off but not yet reported', () => {
    const milestones = forecast.milestones.map((milestone) =>
      milestone.code === 'IA'
        ? { ...milestone, quantiles: { ...milestone.quantiles, '0.5': '2027-03-20' } }
        : milestone,
    );
    expect(bandEdge('0.5', { ...events, milestones })[0]).toEqual({ day: start.day, count: TARGETS.IA });
  });

  it('never falls and never passes the ceiling, whatever the months say', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 900 }), { minLength: 1, maxLength: 20 }),
        fc.integer({ min: 1, max: 700 }),
        fc.constantFrom(...QUANTILE_LEVELS),
        (counts, days, level) => {
          const monthly = counts.map((count, place) => ({
            monthEnd: isoOfDay(start.day + 30 * place + 29),
            randomised: { mean: 0, quantiles: Object.fromEntries(QUANTILE_LEVELS.map((one) => [one, 0])) as never },
            events: { mean: 0, quantiles: Object.fromEntries(QUANTILE_LEVELS.map((one) => [one, count])) as never },
          }));
          const on = isoOfDay(start.day + days);
          const milestones = forecast.milestones
            .filter((milestone) => milestone.code === 'IA')
            .map((milestone) => ({
              ...milestone,
              quantiles: Object.fromEntries(QUANTILE_LEVELS.map((one) => [one, on])) as typeof milestone.quantiles,
            }));
          const edge = bandEdge(level, { ...events, monthly, milestones });
          edge.slice(1).forEach((point, place) => {
            expect(point.count).toBeGreaterThanOrEqual(edge[place]?.count ?? Infinity);
            expect(point.day).toBeGreaterThanOrEqual(edge[place]?.day ?? Infinity);
          });
          expect(Math.max(...edge.map((point) => point.count))).toBeLessThanOrEqual(events.ceiling);
        },
      ),
    );
  });
});

describe('the ground between two edges', () => {
  const lower = bandEdge('0.1', events);
  const upper = bandEdge('0.9', events);
  const slices = bandSlices(lower, upper);

  it('has no gaps and lies between them', () => {
    slices.slice(1).forEach((slice, place) => expect(slice.from).toBe(slices[place]?.to));
    for (const slice of slices) {
      expect(slice.lower[0]).toBeLessThanOrEqual(slice.upper[0]);
      expect(slice.lower[1]).toBeLessThanOrEqual(slice.upper[1]);
    }
  });

  it('runs on under the last line until the low edge meets it', () => {
    expect(slices[slices.length - 1]?.to).toBe(lower[lower.length - 1]?.day);
  });

  it('thins as it widens', () => {
    expect(tintOf(10)).toBe(1);
    expect(tintOf(60)).toBeLessThan(tintOf(30));
    expect(tintOf(60)).toBeGreaterThan(0.5);
  });
});
