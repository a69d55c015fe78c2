import type { IsoDate } from '@/lib/engine/types';

/*
 * Scales of the time figures. A count or a milestone of a date holds at the END of that day, so both stand at the next
 * midnight; a month's tick is that same moment, the end of the month before. Days are counted from 1 January 1970.
 */

const DAY_MS = 86_400_000;

/** Midnight at which the day begins, in days. */
export function startOfDay(iso: IsoDate): number {
  return Date.parse(`${iso}T00:00:00Z`) / DAY_MS;
}

/** Midnight at which the day ends: where its counts and dates stand on the axis. */
export function endOfDay(iso: IsoDate): number {
  return startOfDay(iso) + 1;
}

/** First day of the month in which this moment lies, as a moment. */
export function monthStart(day: number, offset = 0): number {
  const date = new Date(day * DAY_MS);
  return Date.UTC(date.getUTCFullYear(), date.getUTCMonth() + offset, 1) / DAY_MS;
}

export function isoOfDay(day: number): IsoDate {
  return new Date(day * DAY_MS).toISOString().slice(0, 10);
}

export interface TimeScale {
  from: number;
  to: number;
  left: number;
  right: number;
  pixelsPerDay: number;
  x: (day: number) => number;
  day: (x: number) => number;
}

export function timeScale(from: number, to: number, left: number, right: number): TimeScale {
  const pixelsPerDay = (right - left) / Math.max(1, to - from);
  return {
    from,
    to,
    left,
    right,
    pixelsPerDay,
    x: (day) => left + (day - from) * pixelsPerDay,
    day: (x) => from + (x - left) / pixelsPerDay,
  };
}

export interface AxisTick {
  x: number;
  month: number;
  year: number;
}

/** A tick at each month's first midnight within the scale. */
export function monthTicks(scale: TimeScale): AxisTick[] {
  const ticks: AxisTick[] = [];
  let day = monthStart(scale.from);
  if (day < scale.from) day = monthStart(day, 1);
  for (; day <= scale.to; day = monthStart(day, 1)) {
    const date = new Date(day * DAY_MS);
    ticks.push({ x: scale.x(day), month: date.getUTCMonth() + 1, year: date.getUTCFullYear() });
  }
  return ticks;
}

/** How many months lie between labels for none to touch the next: 1, 3, 6, or 12 (years alone). */
export function labelStep(scale: TimeScale, room = 32): 1 | 3 | 6 | 12 {
  const month = scale.pixelsPerDay * 30.4375;
  return ([1, 3, 6] as const).find((step) => step * month >= room) ?? 12;
}

export interface YearLabel {
  x: number;
  year: number;
  /** The first year of the axis has begun before it, and so has no hairline. */
  rule: boolean;
}

/** Years at their first midnight; the one under way at the axis's start stands at its left end where there is room. */
export function yearLabels(scale: TimeScale, room = 46): YearLabel[] {
  const starts = monthTicks(scale).filter((tick) => tick.month === 1);
  const every = Math.max(1, Math.ceil(room / (scale.pixelsPerDay * 365.25)));
  const years = starts
    .filter((tick) => tick.year % every === 0 || starts.length <= 2)
    .map((tick) => ({ x: tick.x, year: tick.year, rule: tick.x > scale.left + 1 }));
  const first = years[0];
  const begun = new Date(scale.from * DAY_MS).getUTCFullYear();
  if ((!first || first.x - scale.left >= room) && first?.year !== begun) {
    years.unshift({ x: scale.left, year: begun, rule: false });
  }
  return years.filter((label) => label.x + 40 <= scale.right + 8);
}

/** Round steps (1, 2, 2.5, 4, 5 times a power of ten) that part 0 to the ceiling into about `wished` pieces. */
export function countTicks(ceiling: number, wished = 4): number[] {
  if (ceiling <= 0) return [0];
  const rough = ceiling / wished;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = Math.max(
    1,
    ([1, 2, 2.5, 4, 5, 10].find((factor) => factor * power >= rough * 0.999 && Number.isInteger(factor * power)) ??
      10) * power,
  );
  const ticks: number[] = [];
  for (let count = 0; count <= ceiling; count += Math.round(step)) ticks.push(count);
  return ticks;
}

/** Crisp hairlines lie on half pixels. */
export function half(value: number): number {
  return Math.round(value - 0.5) + 0.5;
}

/** One decimal is finer than any screen and keeps the markup short. */
export function px(value: number): string {
  return (Math.round(value * 10) / 10).toString();
}

export function polyline(points: readonly { x: number; y: number }[]): string {
  return points.map(({ x, y }, place) => `${place === 0 ? 'M' : 'L'}${px(x)} ${px(y)}`).join('');
}

/** Holds each value until the next point, then steps. */
export function stepLine(points: readonly { x: number; y: number }[]): string {
  return points.map(({ x, y }, place) => (place === 0 ? `M${px(x)} ${px(y)}` : `H${px(x)}V${px(y)}`)).join('');
}
