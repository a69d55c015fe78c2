import type { MilestoneForecast, MonthlyRow, QuantileLevel } from '@/lib/engine/types';
import { endOfDay } from '@/components/charts/figure-scale';

/*
 * Edges of the bands. Because P(N(t) >= k) = P(T_k <= t), the count that holds with probability p at t and the date by
 * which k is reached with probability 1 - p are one curve read two ways: the edge of level p passes through the count k
 * at the (1 - p) quantile of its date. The months' counts give the curve at month-ends, the milestones' dates between.
 */

export type CountKind = 'randomised' | 'events';

export interface EdgePoint {
  day: number;
  count: number;
}

const COMPLEMENT: Record<QuantileLevel, QuantileLevel> = {
  '0.025': '0.975',
  '0.05': '0.95',
  '0.1': '0.9',
  '0.25': '0.75',
  '0.5': '0.5',
  '0.75': '0.25',
  '0.9': '0.1',
  '0.95': '0.05',
  '0.975': '0.025',
};

export interface BandData {
  kind: CountKind;
  /** The cut-off with what had been counted by then. */
  start: EdgePoint;
  monthly: readonly MonthlyRow[];
  milestones: readonly MilestoneForecast[];
  /** The last count line: nothing is drawn above it. */
  ceiling: number;
}

/** The curve of one quantile level: cut-off, month-ends and count lines in order of time, never falling, ending at the ceiling. */
export function bandEdge(level: QuantileLevel, { kind, start, monthly, milestones, ceiling }: BandData): EdgePoint[] {
  const anchors = milestones.flatMap((milestone) => {
    const on = milestone.quantiles[COMPLEMENT[level]];
    if (milestone.kind !== kind || milestone.count === undefined || on === null || milestone.reachedOn) return [];
    return [{ day: endOfDay(on), count: milestone.count }];
  });
  const bounded = monthly.flatMap((row) => {
    const count = row[kind]?.quantiles[level];
    if (count === undefined) return [];
    const day = endOfDay(row.monthEnd);
    if (anchors.some((anchor) => anchor.day === day)) return [];
    const floor = Math.max(0, ...anchors.filter((anchor) => anchor.day < day).map((anchor) => anchor.count));
    const roof = Math.min(Infinity, ...anchors.filter((anchor) => anchor.day > day).map((anchor) => anchor.count));
    return [{ day, count: Math.min(roof, Math.max(floor, count)) }];
  });
  const before = anchors.filter((anchor) => anchor.day <= start.day).map((anchor) => anchor.count);
  const origin = { day: start.day, count: Math.max(start.count, ...before) };
  const points = [...bounded, ...anchors]
    .filter((point) => point.day > start.day)
    .sort((a, b) => a.day - b.day || a.count - b.count);

  const edge: EdgePoint[] = [{ ...origin, count: Math.min(origin.count, ceiling) }];
  for (const point of points) {
    const last = edge[edge.length - 1];
    if (!last || last.count >= ceiling) break;
    const count = Math.max(last.count, point.count);
    if (count > ceiling) {
      const share = (ceiling - last.count) / (count - last.count);
      edge.push({ day: last.day + share * (point.day - last.day), count: ceiling });
    } else edge.push({ day: point.day, count });
  }
  return edge;
}

/** The edge's count at a moment, straight between its points, level after its last. */
export function countAt(edge: readonly EdgePoint[], day: number): number {
  const after = edge.findIndex((point) => point.day >= day);
  if (after === -1) return edge[edge.length - 1]?.count ?? 0;
  const right = edge[after];
  const left = edge[after - 1];
  if (!right) return 0;
  if (!left) return right.count;
  return left.count + ((day - left.day) / (right.day - left.day || 1)) * (right.count - left.count);
}

export interface BandSlice {
  from: number;
  to: number;
  lower: [number, number];
  upper: [number, number];
}

/** The ground between two edges, cut at the points of both, so that its tint can thin as it widens. */
export function bandSlices(lower: readonly EdgePoint[], upper: readonly EdgePoint[]): BandSlice[] {
  const days = [...new Set([...lower, ...upper].map((point) => point.day))].sort((a, b) => a - b);
  return days.slice(1).flatMap((to, place) => {
    const from = days[place] ?? to;
    const slice: BandSlice = {
      from,
      to,
      lower: [countAt(lower, from), countAt(lower, to)],
      upper: [countAt(upper, from), countAt(upper, to)],
    };
    const empty = slice.lower[0] === slice.upper[0] && slice.lower[1] === slice.upper[1];
    return empty ? [] : [slice];
  });
}

/** Up to 18 px a band has its full tint; from there it thins, so that what is less certain looks so. */
export function tintOf(thickness: number): number {
  return Math.min(1, (18 / Math.max(18, thickness)) ** 0.3);
}
