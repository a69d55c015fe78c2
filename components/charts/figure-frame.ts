import { hasEvents, type FigureData } from '@/components/charts/figure-data';
import { textWidth } from '@/components/charts/figure-labels';
import { endOfDay, monthStart, timeScale, type TimeScale } from '@/components/charts/figure-scale';
import { milestoneWords } from '@/components/charts/milestone-words';
import { formatCount } from '@/lib/format';

/** How much room a figure has: beside text on a page, or on a phone and as a preview beside a form. */
export type FigureSize = 'full' | 'small';

export interface Measures {
  gutter: number;
  hillRoom: number;
  hillPerUnit: number;
  patients: { top: number; base: number };
  /** From the patients' base line to the events' last count line, and on to their base. */
  eventsGap: number;
  eventsHeight: number;
  stripFirst: number;
  stripNext: number;
  stripLast: number;
  mark: number;
}

const FULL: Measures = {
  gutter: 50,
  hillRoom: 46,
  hillPerUnit: 2200,
  patients: { top: 94, base: 266 },
  eventsGap: 82,
  eventsHeight: 242,
  stripFirst: 48,
  stripNext: 68,
  stripLast: 44,
  mark: 4.5,
};

const SMALL: Measures = {
  gutter: 40,
  hillRoom: 30,
  hillPerUnit: 1250,
  patients: { top: 76, base: 190 },
  eventsGap: 76,
  eventsHeight: 134,
  stripFirst: 42,
  stripNext: 52,
  stripLast: 26,
  mark: 4,
};

export interface Frame {
  size: FigureSize;
  measures: Measures;
  width: number;
  height: number;
  scale: TimeScale;
  patients: { top: number; base: number };
  events: { top: number; base: number } | null;
  strips: { code: string; y: number }[];
  axisY: number;
  cutoffDay: number;
  /** Absent where nothing has been observed: then the whole figure is the plan's. */
  cutoffX: number | null;
}

/** Below this width no dates are written into the figure: they stand in the list and the table beside it. */
export const SMALL_BELOW = 620;

const LONGEST_WITHOUT_END = 60 * 30.4375;

function lastDay(data: FigureData, from: number, room: number, labelled: boolean): number {
  const cutoff = endOfDay(data.cutoff);
  const lastRow = data.monthly[data.monthly.length - 1];
  const rowsEnd = lastRow ? endOfDay(lastRow.monthEnd) : cutoff + 30;
  const openEnd = Math.min(rowsEnd, cutoff + LONGEST_WITHOUT_END);
  const forecasts = [...data.milestones, ...(data.earlier?.milestones ?? [])];
  const ends = forecasts.flatMap((milestone) => {
    const planned = milestone.plannedOn ? [Math.min(endOfDay(milestone.plannedOn), openEnd + 365)] : [];
    if (milestone.reachedOn) return planned;
    const late = milestone.quantiles['0.975'] ?? milestone.quantiles['0.9'];
    return [...planned, late === null ? openEnd : endOfDay(late)];
  });
  const dated = ends.length > 0 ? Math.max(...ends) : rowsEnd;
  const plain = monthStart(dated, 1) + 10;
  if (!labelled) return plain;
  // Where a date is written right of its bracket, the axis runs on until it fits, but never by more than a third.
  const needs = data.milestones.flatMap((milestone) => {
    const before = data.earlier?.milestones.find((other) => other.code === milestone.code)?.quantiles['0.9'] ?? '';
    const on = milestone.reachedOn ?? milestone.quantiles['0.9'];
    if (on === null) return [];
    const end = endOfDay(on > before ? on : before);
    const text =
      textWidth(milestoneWords(milestone).range, true) + 20 + (data.earlier ? 7 * data.earlier.label.length : 0);
    return text >= room ? [] : [from + ((end - from) * room) / (room - text)];
  });
  return Math.min(Math.max(plain, ...needs), from + (plain - from) * 1.33);
}

export function figureFrame(data: FigureData, width: number, compact: boolean): Frame {
  const size: FigureSize = compact || width < SMALL_BELOW ? 'small' : 'full';
  const base = size === 'full' ? FULL : SMALL;
  const counts = data.milestones.map((milestone) => milestone.count ?? 0);
  const gutter = Math.max(base.gutter, 10 + textWidth(formatCount(Math.max(0, ...counts)), true));
  const measures = { ...base, gutter };

  const cutoffDay = endOfDay(data.cutoff);
  const firsts = [
    cutoffDay,
    ...data.observed.slice(0, 1).map((point) => endOfDay(point.on)),
    ...(data.plan?.randomised ?? []).slice(0, 1).map((point) => endOfDay(point.on)),
  ];
  const from = monthStart(Math.min(...firsts) - 1);
  const right = width - 4;
  const labelled = size === 'full' && !compact;
  const scale = timeScale(from, lastDay(data, from, right - gutter, labelled), gutter, right);

  const { patients } = measures;
  const eventsTop = patients.base + measures.eventsGap;
  const events = hasEvents(data) ? { top: eventsTop, base: eventsTop + measures.eventsHeight } : null;
  const panelsEnd = (events ?? patients).base;
  const strips = data.milestones
    .filter((milestone) => milestone.kind === 'follow-up' || milestone.kind === 'all-of')
    .map((milestone, place) => ({
      code: milestone.code,
      y: panelsEnd + measures.stripFirst + place * measures.stripNext,
    }));
  const lastStrip = strips[strips.length - 1];
  const axisY = lastStrip ? lastStrip.y + measures.stripLast : panelsEnd;
  return {
    size,
    measures,
    width,
    height: axisY + 28,
    scale,
    patients,
    events,
    strips,
    axisY,
    cutoffDay,
    cutoffX: data.observed.length > 0 ? scale.x(cutoffDay) : null,
  };
}
