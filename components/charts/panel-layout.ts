import type { MilestoneForecast } from '@/lib/engine/types';
import {
  bandEdge,
  bandSlices,
  tintOf,
  type BandData,
  type CountKind,
  type EdgePoint,
} from '@/components/charts/figure-bands';
import { observedCount, type FigureData } from '@/components/charts/figure-data';
import type { Frame } from '@/components/charts/figure-frame';
import { textWidth } from '@/components/charts/figure-labels';
import { countTicks, endOfDay, isoOfDay, monthStart, polyline, px, stepLine } from '@/components/charts/figure-scale';
import { milestoneLayout, type MilestoneContext, type MilestoneLayout } from '@/components/charts/milestone-layout';
import { formatCount } from '@/lib/format';

export interface TintedSlice {
  d: string;
  opacity: number;
}

export interface PanelLayout {
  kind: CountKind;
  top: number;
  base: number;
  ceiling: number;
  y: (count: number) => number;
  countLabels: { y: number; text: string; bold: boolean }[];
  band80: TintedSlice[];
  band50: TintedSlice[];
  edges80: string[];
  edges95: string[];
  median: string;
  medianEdge: EdgePoint[];
  observed: string;
  quarterMarks: { x: number; y: number }[];
  plan: string;
  earlierEdges: string[];
  milestones: MilestoneLayout[];
  now: { x: number; y: number; text: string; anchor: 'start' | 'end' } | null;
}

/** Over this many count lines in one panel, names and dates go to the table. */
export const MOST_WRITTEN = 4;

/** The last count line; where every one is reached, what the bands come to. */
export function ceilingOf(data: FigureData, kind: CountKind): number {
  const own = data.milestones.filter((milestone) => milestone.kind === kind);
  const counts = own.map((milestone) => milestone.count ?? 0);
  const known = Math.max(...counts, observedCount(data, kind));
  if (own.some((milestone) => !milestone.reachedOn)) return Math.max(1, known);
  const rows = data.monthly.map((row) => row[kind]?.quantiles['0.975'] ?? 0);
  const planned = (data.plan?.[kind] ?? []).map((point) => point.count);
  return Math.max(1, known, ...rows, ...planned);
}

function countLabels(
  ceiling: number,
  counts: readonly number[],
  y: (count: number) => number,
): PanelLayout['countLabels'] {
  const labels: PanelLayout['countLabels'] = [];
  const free = (at: number): boolean => labels.every((label) => Math.abs(label.y - at) >= 14);
  for (const count of [...new Set(counts)].sort((a, b) => b - a)) {
    if (free(y(count))) labels.push({ y: y(count), text: formatCount(count), bold: true });
  }
  for (const count of countTicks(ceiling)) {
    if (free(y(count))) labels.push({ y: y(count), text: formatCount(count), bold: false });
  }
  return labels;
}

function tinted(lower: EdgePoint[], upper: EdgePoint[], frame: Frame, y: (count: number) => number): TintedSlice[] {
  return bandSlices(lower, upper)
    .filter((slice) => slice.from < frame.scale.to)
    .map((slice) => {
      // Whole pixels sideways, so that neighbouring slices neither part nor lie over one another.
      const [left, right] = [
        Math.round(frame.scale.x(slice.from)),
        Math.round(frame.scale.x(Math.min(slice.to, frame.scale.to))),
      ];
      const [lowFrom, lowTo] = slice.lower.map(y) as [number, number];
      const [highFrom, highTo] = slice.upper.map(y) as [number, number];
      return {
        d: `M${left} ${px(lowFrom)}L${right} ${px(lowTo)}V${px(highTo)}L${left} ${px(highFrom)}Z`,
        opacity: tintOf((lowFrom - highFrom + lowTo - highTo) / 2),
      };
    });
}

function observedShape(data: FigureData, kind: CountKind, frame: Frame, y: (count: number) => number) {
  const points = data.observed.flatMap((point) => {
    const count = point[kind];
    return typeof count === 'number' ? [{ day: endOfDay(point.on), count }] : [];
  });
  const first = points[0];
  if (!first) return { line: '', quarterMarks: [] };
  const origin = { day: monthStart(first.day - 1), count: 0 };
  const end = { day: frame.cutoffDay, count: points[points.length - 1]?.count ?? 0 };
  const all = [origin, ...points.filter((point) => point.day < end.day), end];
  const at = (day: number): number => all.reduce((held, point) => (point.day <= day ? point.count : held), 0);
  const quarterDays: number[] = [];
  for (let day = monthStart(origin.day, 1); day <= end.day; day = monthStart(day, 1)) {
    if (Number(isoOfDay(day).slice(5, 7)) % 3 === 1) quarterDays.push(day);
  }
  if (!quarterDays.includes(end.day)) quarterDays.push(end.day);
  return {
    line: stepLine(all.map((point) => ({ x: frame.scale.x(point.day), y: y(point.count) }))),
    quarterMarks: quarterDays.map((day) => ({ x: frame.scale.x(day), y: y(at(day)) })),
  };
}

export interface PanelContext {
  frame: Frame;
  heightOf: (peak: number) => number;
  taken: MilestoneContext['taken'];
  names: Readonly<Record<string, string>>;
}

export function panelLayout(
  data: FigureData,
  kind: CountKind,
  place: { top: number; base: number },
  context: PanelContext,
): PanelLayout {
  const { frame } = context;
  const { scale } = frame;
  const ceiling = ceilingOf(data, kind);
  const y = (count: number): number => place.base - (Math.min(count, ceiling) / ceiling) * (place.base - place.top);
  const own = data.milestones
    .filter((milestone) => milestone.kind === kind)
    .sort((one, other) => (other.count ?? 0) - (one.count ?? 0));

  const bandData: BandData = {
    kind,
    start: { day: frame.cutoffDay, count: observedCount(data, kind) },
    monthly: data.monthly,
    milestones: own,
    ceiling,
  };
  const toPixels = (edge: EdgePoint[]): string =>
    edge.length < 2
      ? ''
      : polyline(
          edge.filter((point) => point.day <= scale.to).map((point) => ({ x: scale.x(point.day), y: y(point.count) })),
        );
  const edge = (level: Parameters<typeof bandEdge>[0]): EdgePoint[] => bandEdge(level, bandData);
  const [low95, low80, low50, median, high50, high80, high95] = (
    ['0.025', '0.1', '0.25', '0.5', '0.75', '0.9', '0.975'] as const
  ).map(edge) as [EdgePoint[], EdgePoint[], EdgePoint[], EdgePoint[], EdgePoint[], EdgePoint[], EdgePoint[]];

  const planned = (data.plan?.[kind] ?? [])
    .map((point) => ({ day: endOfDay(point.on), count: point.count }))
    .filter((point) => point.day <= scale.to);
  const upTo = planned.findIndex((point) => point.count >= ceiling);
  const plan = (upTo === -1 ? planned : planned.slice(0, upTo + 1)).map((point) => ({
    x: scale.x(point.day),
    y: y(point.count),
  }));

  const { earlier } = data;
  const earlierEdges = earlier
    ? (['0.1', '0.9'] as const).map((level) =>
        toPixels(bandEdge(level, { ...bandData, monthly: earlier.monthly, milestones: earlier.milestones })),
      )
    : [];

  const observed = observedShape(data, kind, frame, y);
  const now = nowLabel(data, kind, frame, y, place.base);
  if (now) {
    const width = textWidth(now.text, true);
    context.taken.push({ x: now.anchor === 'start' ? now.x : now.x - width, y: now.y - 13, width, height: 17 });
  }
  return {
    kind,
    ...place,
    ceiling,
    y,
    countLabels: countLabels(
      ceiling,
      own.map((milestone) => milestone.count ?? 0),
      y,
    ),
    band80: tinted(low80, high80, frame, y),
    band50: tinted(low50, high50, frame, y),
    edges80: [toPixels(low80), toPixels(high80)],
    edges95: [toPixels(low95), toPixels(high95)],
    median: toPixels(median),
    medianEdge: median,
    observed: observed.line,
    quarterMarks: observed.quarterMarks,
    plan: plan.length > 1 ? polyline(plan) : '',
    earlierEdges,
    milestones: own.map((milestone) =>
      milestoneLayout(milestone, y(milestone.count ?? 0), {
        ...context,
        written: own.length <= MOST_WRITTEN,
        marks: data.cautionMarks?.[milestone.code],
        earlier: earlierOf(data, milestone),
      }),
    ),
    now,
  };
}

export function earlierOf(data: FigureData, milestone: MilestoneForecast): MilestoneContext['earlier'] {
  const found = data.earlier?.milestones.find((other) => other.code === milestone.code);
  return data.earlier && found ? { label: data.earlier.label, milestone: found } : undefined;
}

/** What had been counted at the cut-off, beside the end of the observed line: under it where the axis leaves room. */
function nowLabel(
  data: FigureData,
  kind: CountKind,
  frame: Frame,
  y: (count: number) => number,
  base: number,
): PanelLayout['now'] {
  if (frame.cutoffX === null || frame.size === 'small') return null;
  const count = observedCount(data, kind);
  const text = `${formatCount(count)} ${kind === 'randomised' ? 'randomised' : count === 1 ? 'event' : 'events'}`;
  const under = y(count) + 19;
  if (under <= base - 6) return { x: frame.cutoffX + 9, y: under, text, anchor: 'start' };
  return { x: frame.cutoffX - 9, y: y(count) - 10, text, anchor: 'end' };
}
