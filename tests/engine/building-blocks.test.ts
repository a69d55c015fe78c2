import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { activationMoment } from '@/lib/engine/activation';
import { buildAliasTable, drawCell } from '@/lib/engine/alias-table';
import { createEventCounter, selectRank } from '@/lib/engine/event-counter';
import { createGenerator } from '@/lib/engine/generator';
import { createMomentQueue, popMoment, pushMoment } from '@/lib/engine/moment-queue';
import { choosePlace, createRateTree, setRate } from '@/lib/engine/rate-tree';
import { shareTolerance } from '@/tests/reference/closed-forms';

const RUNS = { seed: 1, numRuns: 300 };
const moments = fc.array(fc.double({ min: -20, max: 50, noNaN: true }), { minLength: 1, maxLength: 60 });

describe('alias table', () => {
  it('draws each cell with its weight', () => {
    const weights = Float64Array.of(0, 5, 1, 0, 2, 0.01);
    const table = buildAliasTable(weights);
    const generator = createGenerator(1);
    generator.startAt(0, 0, 0);
    const draws = 100_000;
    const counts = new Float64Array(weights.length);
    for (let draw = 0; draw < draws; draw += 1) {
      const cell = drawCell(table, generator);
      counts[cell] = (counts[cell] as number) + 1;
    }
    weights.forEach((weight, cell) => {
      const p = weight / 8.01;
      expect(Math.abs((counts[cell] as number) / draws - p)).toBeLessThanOrEqual(
        weight === 0 ? 0 : shareTolerance(p, draws),
      );
    });
  });

  it('keeps the exact probabilities: what each cell keeps and is given adds up to its weight', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 10, noNaN: true }), { minLength: 1, maxLength: 50 }), (list) => {
        const total = list.reduce((sum, weight) => sum + weight, 0);
        fc.pre(total > 1e-3);
        const { keep, alias } = buildAliasTable(Float64Array.from(list));
        const given = new Float64Array(list.length);
        keep.forEach((kept, cell) => {
          given[cell] = (given[cell] as number) + kept;
          given[alias[cell] as number] = (given[alias[cell] as number] as number) + 1 - kept;
        });
        list.forEach((weight, cell) => {
          expect((given[cell] as number) / list.length).toBeCloseTo(weight / total, 10);
        });
      }),
      RUNS,
    );
  });

  it('refuses weights that are all 0', () => {
    expect(() => buildAliasTable(new Float64Array(3))).toThrow(RangeError);
  });
});

describe('rate tree', () => {
  it('the total is exactly 0 again when every rate is, and a place of rate 0 is never chosen', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: 1e-9, max: 5, noNaN: true }), { minLength: 1, maxLength: 40 }),
        fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }),
        (rates, uniform) => {
          const tree = createRateTree(rates.length);
          rates.forEach((rate, place) => setRate(tree, place, rate));
          rates.forEach((_, place) => {
            if (place % 3 === 0 && rates.length > 1) setRate(tree, place, 0);
          });
          if ((tree.sums[1] as number) > 0) {
            const chosen = choosePlace(tree, uniform);
            expect(tree.sums[tree.leaves + chosen]).toBeGreaterThan(0);
          }
          rates.forEach((_, place) => setRate(tree, place, 0));
          expect(tree.sums[1]).toBe(0);
        },
      ),
      RUNS,
    );
  });

  it('chooses in proportion to the rates', () => {
    const tree = createRateTree(3);
    [1, 2, 5].forEach((rate, place) => setRate(tree, place, rate));
    expect([0.1, 0.13, 0.3, 0.38, 0.99].map((uniform) => choosePlace(tree, uniform))).toEqual([0, 1, 1, 2, 2]);
  });
});

describe('queue of moments', () => {
  it('gives entries back in the order of their moments', () => {
    fc.assert(
      fc.property(moments, (list) => {
        const queue = createMomentQueue(list.length);
        list.forEach((moment, entry) => pushMoment(queue, moment, entry));
        const out: number[] = [];
        while (queue.size > 0) out.push(list[popMoment(queue)] as number);
        expect(out).toEqual([...list].sort((a, b) => a - b));
      }),
      RUNS,
    );
  });
});

describe('event counter', () => {
  it('finds what a full sort finds, with observed events among the simulated ones', () => {
    fc.assert(
      fc.property(moments, fc.array(fc.integer({ min: -40, max: 0 }), { maxLength: 30 }), (simulated, days) => {
        const observed = Float64Array.from(days).sort();
        const counter = createEventCounter(observed, { earliest: -20, latest: 50, most: simulated.length });
        counter.load(Float64Array.from(simulated), simulated.length);
        const sorted = [...observed, ...simulated].sort((a, b) => a - b);
        for (let k = 1; k <= sorted.length; k += 1) expect(counter.momentOf(k)).toBe(sorted[k - 1]);
        expect(counter.momentOf(sorted.length + 1)).toBe(Infinity);
        for (const day of [-20, -3, 0, 7, 50]) {
          expect(counter.countAt(day)).toBe(sorted.filter((moment) => moment <= day).length);
        }
      }),
      RUNS,
    );
  });

  it('selects a rank among equal and unequal values', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 1, maxLength: 40 }), fc.nat(), (list, nat) => {
        const rank = (nat % list.length) + 1;
        expect(selectRank(Float64Array.from(list), list.length, rank)).toBe([...list].sort((a, b) => a - b)[rank - 1]);
      }),
      RUNS,
    );
  });
});

describe('activation of a planned site', () => {
  const cases = [
    { earliest: 10, likely: 30, latest: 90 },
    { earliest: -60, likely: -20, latest: 40 },
    { earliest: -10, likely: 30, latest: 60 },
    { earliest: 5, likely: 5, latest: 25 },
    { earliest: 5, likely: 25, latest: 25 },
    { earliest: -1000, likely: -1000, latest: 0.001 },
  ];

  /** P(T > t | T > 0) of the triangular distribution: Kotz & van Dorp 2004, Beyond Beta, ch. 1. */
  function tail({ earliest, likely, latest }: (typeof cases)[number], t: number): number {
    const above = (x: number): number => {
      if (x <= earliest) return 1;
      if (x >= latest) return 0;
      if (x < likely) return 1 - (x - earliest) ** 2 / ((latest - earliest) * (likely - earliest));
      return (latest - x) ** 2 / ((latest - earliest) * (latest - likely));
    };
    return above(t) / above(0);
  }

  it.each(cases)('inverts triangular($earliest, $likely, $latest) conditioned on being after the cut-off', (window) => {
    for (const uniform of [1e-9, 0.01, 0.2, 0.5, 0.77, 0.99, 1 - 1e-9]) {
      const moment = activationMoment(window, uniform);
      expect(moment).toBeGreaterThanOrEqual(0);
      expect(moment).toBeLessThanOrEqual(window.latest);
      expect(tail(window, moment)).toBeCloseTo(1 - uniform, 8);
    }
  });

  it('a window of one day is that day', () => {
    expect(activationMoment({ earliest: 12, likely: 12, latest: 12 }, 0.4)).toBe(12);
  });
});
