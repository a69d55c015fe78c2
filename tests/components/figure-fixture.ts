import { endOfDay, isoOfDay, monthStart, startOfDay } from '@/components/charts/figure-scale';
import { QUANTILE_LEVELS, type MilestoneForecast, type MonthlyRow, type QuantileLevel } from '@/lib/engine/types';

/*
 * A small invented forecast whose dates and counts come from the same draws, so that what must agree in a figure does
 * agree in its numbers: patients and events arrive as Poisson streams whose rate each draw takes anew.
 */

function randomSource(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 4294967296;
  };
}

/** Type 7 of Hyndman and Fan over sorted values, infinities included. */
function quantile(sorted: readonly number[], share: number): number {
  const place = (sorted.length - 1) * share;
  const low = sorted[Math.floor(place)] ?? Infinity;
  const high = sorted[Math.ceil(place)] ?? Infinity;
  return low === high ? low : low + (place - Math.floor(place)) * (high - low);
}

function milestone(
  base: Pick<MilestoneForecast, 'code' | 'kind'> & Partial<MilestoneForecast>,
  times: number[],
  cutoff: number,
): MilestoneForecast {
  const sorted = [...times].sort((a, b) => a - b);
  const dateOf = (time: number): string | null =>
    Number.isFinite(time) ? isoOfDay(cutoff - 1 + Math.ceil(time)) : null;
  const weeks = new Map<number, number>();
  for (const time of sorted.filter(Number.isFinite)) {
    const day = cutoff - 1 + Math.ceil(time);
    const monday = day - ((((day - 4) % 7) + 7) % 7);
    weeks.set(monday, (weeks.get(monday) ?? 0) + 1 / times.length);
  }
  const plannedBy = base.plannedOn ? endOfDay(base.plannedOn) - cutoff : null;
  return {
    reachedOn: null,
    probabilityReached: sorted.filter(Number.isFinite).length / times.length,
    probabilityByPlanned: plannedBy === null ? null : sorted.filter((time) => time <= plannedBy).length / times.length,
    monteCarloErrorDays: 1,
    quantiles: Object.fromEntries(
      QUANTILE_LEVELS.map((level) => [level, dateOf(quantile(sorted, Number(level)))]),
    ) as Record<QuantileLevel, string | null>,
    density: [...weeks].map(([monday, share]) => ({ from: isoOfDay(monday), share })),
    ...base,
  };
}

function countForecast(counts: number[]): MonthlyRow['randomised'] {
  const sorted = [...counts].sort((a, b) => a - b);
  return {
    mean: counts.reduce((sum, count) => sum + count, 0) / counts.length,
    quantiles: Object.fromEntries(
      QUANTILE_LEVELS.map((level) => [level, sorted[Math.max(0, Math.ceil(Number(level) * sorted.length) - 1)] ?? 0]),
    ) as Record<QuantileLevel, number>,
  };
}

export interface FixtureOptions {
  draws?: number;
  /** Spread of a draw's rate: the larger, the wider the bands. */
  spread?: number;
  horizonDays?: number;
  eventsPerDay?: number;
}

export const CUTOFF = '2027-03-31';
export const TARGETS = { LPI: 1200, IA: 288, FA: 480 } as const;
const SEEN = { randomised: 658, events: 86 };

export function fixtureForecast({
  draws = 2000,
  spread = 0.12,
  horizonDays = 900,
  eventsPerDay = 0.72,
}: FixtureOptions = {}) {
  const random = randomSource(11);
  const cutoff = startOfDay(CUTOFF) + 1;
  const monthEnds: number[] = [];
  for (let day = monthStart(cutoff, 1); day <= cutoff + horizonDays; day = monthStart(day, 1)) monthEnds.push(day);
  const times: Record<'LPI' | 'IA' | 'FA', number[]> = { LPI: [], IA: [], FA: [] };
  const counts = monthEnds.map(() => ({ randomised: [] as number[], events: [] as number[] }));

  for (let draw = 0; draw < draws; draw += 1) {
    const tilt = Math.exp(spread * (random() + random() + random() + random() - 2) * 1.7);
    const arrive = (seen: number, stop: number, ratePerDay: number): number[] => {
      const days: number[] = [];
      for (let at = 0; seen + days.length < stop;) {
        at += -Math.log(random()) / (ratePerDay * tilt);
        if (at > horizonDays) break;
        days.push(at);
      }
      return days;
    };
    const patients = arrive(SEEN.randomised, TARGETS.LPI, 1.9);
    const events = arrive(SEEN.events, 620, eventsPerDay);
    times.LPI.push(patients[TARGETS.LPI - SEEN.randomised - 1] ?? Infinity);
    times.IA.push(events[TARGETS.IA - SEEN.events - 1] ?? Infinity);
    times.FA.push(events[TARGETS.FA - SEEN.events - 1] ?? Infinity);
    monthEnds.forEach((day, place) => {
      const by = (days: number[]): number => days.filter((at) => at <= day - cutoff).length;
      counts[place]?.randomised.push(SEEN.randomised + by(patients));
      counts[place]?.events.push(SEEN.events + by(events));
    });
  }

  const followUp = times.LPI.map((time) => time + 365.25);
  const last = times.FA.map((time, draw) => Math.max(time, followUp[draw] ?? Infinity));
  const milestones: MilestoneForecast[] = [
    milestone(
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: TARGETS.LPI, plannedOn: '2027-09-30' },
      times.LPI,
      cutoff,
    ),
    milestone(
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: TARGETS.IA, plannedOn: '2027-11-30' },
      times.IA,
      cutoff,
    ),
    milestone(
      { code: 'FA', name: 'Final analysis', kind: 'events', count: TARGETS.FA, plannedOn: '2028-08-31' },
      times.FA,
      cutoff,
    ),
    milestone(
      { code: 'FU', name: 'Follow-up complete', kind: 'follow-up', months: 12, plannedOn: '2028-09-30' },
      followUp,
      cutoff,
    ),
    milestone(
      { code: 'PA', name: 'Primary analysis', kind: 'all-of', of: ['FA', 'FU'], plannedOn: '2028-09-30' },
      last,
      cutoff,
    ),
  ];
  const monthly: MonthlyRow[] = monthEnds.map((day, place) => ({
    monthEnd: isoOfDay(day - 1),
    randomised: countForecast(counts[place]?.randomised ?? []),
    events: countForecast(counts[place]?.events ?? []),
  }));
  const observed = Array.from({ length: 59 }, (_, week) => {
    const share = (week + 1) / 59;
    return {
      on: isoOfDay(cutoff - 1 - 7 * (58 - week)),
      randomised: Math.round(SEEN.randomised * share ** 2),
      events: Math.round(SEEN.events * share ** 2.6),
    };
  });
  const plan = {
    randomised: observed
      .filter((_, place) => place % 4 === 0)
      .map((point, place) => ({ on: isoOfDay(startOfDay(point.on) + 0), count: 6 * place ** 2 }))
      .concat([{ on: '2027-09-30', count: 1200 }]),
    events: observed
      .filter((_, place) => place % 4 === 0)
      .map((point, place) => ({ on: point.on, count: Math.round(0.55 * place ** 2) }))
      .concat([
        { on: '2027-11-30', count: 288 },
        { on: '2028-08-31', count: 480 },
      ]),
  };
  return { cutoff: CUTOFF, observed, monthly, milestones, plan };
}
