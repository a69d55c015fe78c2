import type { IsoDate } from '@/lib/engine/types';
import type { FigureData } from '@/components/charts/figure-data';
import { endOfDay, isoOfDay, monthStart } from '@/components/charts/figure-scale';

export interface ReadCount {
  median: number;
  /** The 80 % band; null for what was observed. */
  band: [number, number] | null;
}

/** What the caption line reads out at one month-end. */
export interface Reading {
  monthEnd: IsoDate;
  day: number;
  observed: boolean;
  randomised: ReadCount;
  events: ReadCount | null;
}

function observedReadings({ observed, cutoff }: FigureData): Reading[] {
  const first = observed[0];
  if (!first) return [];
  const end = endOfDay(cutoff);
  const readings: Reading[] = [];
  for (let day = monthStart(endOfDay(first.on) - 1, 1); day <= end; day = monthStart(day, 1)) {
    const held = observed.filter((point) => endOfDay(point.on) <= day);
    const last = held[held.length - 1];
    readings.push({
      monthEnd: isoOfDay(day - 1),
      day,
      observed: true,
      randomised: { median: last?.randomised ?? 0, band: null },
      events: typeof last?.events === 'number' ? { median: last.events, band: null } : null,
    });
  }
  return readings;
}

/** Every month-end that can be read, observed ones first. */
export function readingsOf(data: FigureData): Reading[] {
  const forecast = data.monthly.map((row): Reading => ({
    monthEnd: row.monthEnd,
    day: endOfDay(row.monthEnd),
    observed: false,
    randomised: {
      median: row.randomised.quantiles['0.5'],
      band: [row.randomised.quantiles['0.1'], row.randomised.quantiles['0.9']],
    },
    events: row.events
      ? { median: row.events.quantiles['0.5'], band: [row.events.quantiles['0.1'], row.events.quantiles['0.9']] }
      : null,
  }));
  return [...observedReadings(data), ...forecast];
}

/** Where reading starts: the month of the next planned date, or of the next median; else the first month forecast. */
export function firstReading(data: FigureData, readings: readonly Reading[]): number {
  const cutoff = endOfDay(data.cutoff);
  const coming = data.milestones.filter((milestone) => !milestone.reachedOn);
  const days = (pick: (milestone: (typeof coming)[number]) => string | null | undefined): number[] =>
    coming.flatMap((milestone) => {
      const on = pick(milestone);
      return on && endOfDay(on) > cutoff ? [endOfDay(on)] : [];
    });
  const planned = days((milestone) => milestone.plannedOn);
  const wished = planned.length > 0 ? planned : days((milestone) => milestone.quantiles['0.5']);
  const day = wished.length > 0 ? Math.min(...wished) : cutoff + 1;
  const found = readings.findIndex((reading) => reading.day >= day);
  return found === -1 ? Math.max(0, readings.length - 1) : found;
}

export function nearestReading(readings: readonly Reading[], day: number): number {
  let best = 0;
  readings.forEach((reading, place) => {
    if (Math.abs(reading.day - day) < Math.abs((readings[best]?.day ?? Infinity) - day)) best = place;
  });
  return best;
}

/** Arrows move by a month, the Page keys by a year, Home and End to the ends; any other key is not for the figure. */
export function movedReading(key: string, at: number, count: number): number | null {
  const last = count - 1;
  const wished = {
    ArrowRight: at + 1,
    ArrowUp: at + 1,
    ArrowLeft: at - 1,
    ArrowDown: at - 1,
    PageUp: at + 12,
    PageDown: at - 12,
    Home: 0,
    End: last,
  }[key];
  return wished === undefined ? null : Math.min(last, Math.max(0, wished));
}
