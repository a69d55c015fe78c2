import { describe, expect, it } from 'vitest';
import {
  CHUNK_DRAWS,
  chunkCount,
  ForecastCancelled,
  prepareForecast,
  runForecast,
  serialiseForecast,
  simulateChunk,
  summariseForecast,
  transferables,
} from '@/lib/engine/forecast';
import { QUANTILE_LEVELS } from '@/lib/engine/types';
import { exampleStudy } from './example-study';

const options = { studySha256: 'a'.repeat(64) };

describe('one answer', () => {
  const study = exampleStudy((draft) => {
    draft.simulation.draws = 1100;
  });
  const alone = serialiseForecast(runForecast(study, options));

  it('same study, seed and draws: the same bytes, from threads of their own and in any order', () => {
    const count = chunkCount(1100);
    const perThread = [prepareForecast(study), prepareForecast(structuredClone(study))];
    const chunks = Array.from({ length: count }, (_, chunk) =>
      structuredClone(simulateChunk(perThread[chunk % 2] as (typeof perThread)[0], chunk)),
    );
    const prepared = prepareForecast(study);
    expect(serialiseForecast(summariseForecast(prepared, chunks, options))).toBe(alone);
    expect(serialiseForecast(summariseForecast(prepared, [...chunks].reverse(), options))).toBe(alone);
  });

  it('another seed: another answer', () => {
    const other = structuredClone(study);
    other.simulation.seed = 2;
    expect(serialiseForecast(runForecast(other, options))).not.toBe(alone);
  });

  it('cuts draws into chunks of 250, the last one short, and refuses a chunk that is not there', () => {
    expect([1, 250, 251, 1100].map(chunkCount)).toEqual([1, 1, 2, 5]);
    const prepared = prepareForecast(study);
    expect(simulateChunk(prepared, 0).draws).toBe(CHUNK_DRAWS);
    expect(simulateChunk(prepared, 4).draws).toBe(100);
    expect(() => simulateChunk(prepared, 5)).toThrow(RangeError);
    expect(() => simulateChunk(prepared, -1)).toThrow(RangeError);
    expect(() => summariseForecast(prepared, [], options)).toThrow(RangeError);
  });

  it('hands its buffers over', () => {
    const chunk = simulateChunk(prepareForecast(study), 0);
    const moved = structuredClone(chunk, { transfer: transferables(chunk) });
    expect(chunk.milestoneMoments.length).toBe(0);
    expect(moved.milestoneMoments.length).toBe(5 * CHUNK_DRAWS);
  });

  it('reports progress and stops when told to', () => {
    const done: number[] = [];
    runForecast(study, { ...options, onProgress: (draws) => done.push(draws) });
    expect(done).toEqual([250, 500, 750, 1000, 1100]);
    expect(() => runForecast(study, { ...options, cancelled: () => true })).toThrow(ForecastCancelled);
  });
});

describe('the forecast file', () => {
  const study = exampleStudy();
  const forecast = runForecast(study, options);
  const text = serialiseForecast(forecast);

  it('has the keys of the contract in their order, two spaces of indent and one newline at the end', () => {
    const file = JSON.parse(text) as Record<string, unknown>;
    expect(Object.keys(file)).toEqual([
      'format',
      'engineVersion',
      'studySha256',
      'seed',
      'draws',
      'dataCutoff',
      'observed',
      'fit',
      'milestones',
      'monthly',
      'cautions',
    ]);
    expect(text).toBe(`${JSON.stringify(file, null, 2)}\n`);
    expect(Object.keys((file.milestones as object[])[0] as object)).toEqual([
      'code',
      'name',
      'kind',
      'count',
      'plannedOn',
      'reachedOn',
      'probabilityReached',
      'probabilityByPlanned',
      'quantiles',
      'monteCarloErrorDays',
      'density',
    ]);
    const shuffled = { ...forecast, fit: forecast.fit, format: forecast.format };
    expect(
      serialiseForecast(Object.fromEntries(Object.entries(shuffled).reverse()) as unknown as typeof forecast),
    ).toBe(text);
  });

  it('has ordered quantiles, and density shares that add up to the probability of being reached', () => {
    for (const { quantiles, density, probabilityReached } of forecast.milestones) {
      const dates = QUANTILE_LEVELS.map((level) => quantiles[level] ?? '9999');
      expect(dates).toEqual([...dates].sort());
      expect(density.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(probabilityReached, 12);
      for (const { from } of density) expect(new Date(from).getUTCDay()).toBe(1);
    }
  });

  it('an all-of milestone is never before any of its parts', () => {
    const chunk = simulateChunk(prepareForecast(study), 0);
    const momentOf = (place: number, draw: number): number =>
      chunk.milestoneMoments[place * chunk.draws + draw] as number;
    for (let draw = 0; draw < chunk.draws; draw += 1) {
      expect(momentOf(4, draw)).toBe(Math.max(momentOf(1, draw), momentOf(3, draw)));
      expect(momentOf(3, draw)).toBeCloseTo(momentOf(2, draw) + 365.25, 9);
    }
  });

  it('monthly counts start after the cut-off, never fall, and end where 97.5 % of draws have everything', () => {
    expect(forecast.monthly[0]?.monthEnd).toBe('2027-04-30');
    forecast.monthly.forEach((row, place) => {
      const before = forecast.monthly[place - 1];
      if (!before) return;
      for (const level of QUANTILE_LEVELS) {
        expect(row.randomised.quantiles[level]).toBeGreaterThanOrEqual(before.randomised.quantiles[level]);
        expect(row.events?.quantiles[level]).toBeGreaterThanOrEqual(before.events?.quantiles[level] ?? 0);
      }
    });
    const last = forecast.monthly[forecast.monthly.length - 1];
    const everything = forecast.milestones.find(({ code }) => code === 'PA')?.quantiles['0.975'];
    expect(last?.monthEnd.slice(0, 7)).toBe(everything?.slice(0, 7));
    expect(last?.randomised.mean).toBeGreaterThan(1190);
  });

  it('monthly counts agree with the milestones’ dates: as many draws have the target as have reached it', () => {
    const prepared = prepareForecast(study);
    const chunk = simulateChunk(prepared, 1);
    prepared.monthEnds.forEach((end, month) => {
      for (let draw = 0; draw < chunk.draws; draw += 1) {
        const moment = chunk.milestoneMoments[2 * chunk.draws + draw] as number;
        expect(chunk.randomisedAtMonthEnds[month * chunk.draws + draw] === 1200).toBe(moment <= end);
        const interim = chunk.milestoneMoments[draw] as number;
        expect((chunk.eventsAtMonthEnds[month * chunk.draws + draw] as number) >= 288).toBe(interim <= end);
      }
    });
  });

  it('common chance: another event model leaves every randomisation where it was', () => {
    const other = exampleStudy((draft) => {
      if (draft.events) draft.events.model.family = 'exponential';
    });
    const mine = simulateChunk(prepareForecast(study), 0);
    const theirs = simulateChunk(prepareForecast(other), 0);
    expect(theirs.randomisedAtMonthEnds).toEqual(mine.randomisedAtMonthEnds);
    expect(theirs.eventsAtMonthEnds).not.toEqual(mine.eventsAtMonthEnds);
  });
});
