import type { MilestoneForecast } from '@/lib/engine/types';
import { endOfDay, startOfDay } from '@/components/charts/figure-scale';

export interface HillPoint {
  day: number;
  /** Share of all draws per day. */
  density: number;
}

/**
 * The distribution of a date as a hill's outline: the weekly shares, smoothed by their neighbours (1-2-1, which keeps
 * their sum), standing at the middle of their weeks, with the ground at both ends.
 */
export function hillOf(milestone: Pick<MilestoneForecast, 'density'>): HillPoint[] {
  const weeks = milestone.density.filter((week) => week.share > 0);
  const first = weeks[0];
  const last = weeks[weeks.length - 1];
  if (!first || !last) return [];
  const from = startOfDay(first.from);
  const shares = new Array<number>(Math.round((startOfDay(last.from) - from) / 7) + 1).fill(0);
  for (const week of weeks) shares[Math.round((startOfDay(week.from) - from) / 7)] = week.share;
  const share = (place: number): number => shares[place] ?? 0;
  const points: HillPoint[] = [];
  for (let place = -1; place <= shares.length; place += 1) {
    const smooth = (share(place - 1) + 2 * share(place) + share(place + 1)) / 4;
    points.push({ day: from + 7 * place + 3.5, density: smooth / 7 });
  }
  const start = points[0];
  const end = points[points.length - 1];
  if (!start || !end) return [];
  return [{ day: start.day - 7, density: 0 }, ...points, { day: end.day + 7, density: 0 }];
}

export function peakOf(hill: readonly HillPoint[]): number {
  return Math.max(0, ...hill.map((point) => point.density));
}

function densityAt(hill: readonly HillPoint[], day: number): number {
  const after = hill.findIndex((point) => point.day >= day);
  const right = hill[after];
  const left = hill[after - 1];
  if (!right || !left) return 0;
  return left.density + ((day - left.day) / (right.day - left.day)) * (right.density - left.density);
}

/** The part of the hill that stands over the 80 % interval; an end beyond the horizon leaves it open to the hill's foot. */
export function coreOf(hill: readonly HillPoint[], milestone: Pick<MilestoneForecast, 'quantiles'>): HillPoint[] {
  const low = milestone.quantiles['0.1'];
  const high = milestone.quantiles['0.9'];
  const foot = hill[hill.length - 1];
  if (low === null || !foot) return [];
  const from = endOfDay(low);
  const to = high === null ? foot.day : endOfDay(high);
  const inside = hill.filter((point) => point.day > from && point.day < to);
  return [{ day: from, density: densityAt(hill, from) }, ...inside, { day: to, density: densityAt(hill, to) }];
}

/**
 * Pixels of height per unit of density: the same for every hill of a figure, so that their areas are equal. Where the
 * steepest would be taller than its room all are lowered, to half at most; one that is steeper still is lowered alone.
 */
export function hillScale(peaks: readonly number[], perUnit: number, room: number): (peak: number) => number {
  const steepest = Math.max(0, ...peaks) * perUnit;
  const common = perUnit * (steepest > room ? Math.max(0.5, room / steepest) : 1);
  return (peak) => (peak * common > room ? room / peak : common);
}
