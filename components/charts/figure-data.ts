import type { IsoDate, MilestoneForecast, MonthlyRow } from '@/lib/engine/types';

/** What had been counted by the end of a day; days or month-ends, in order of time. */
export interface ObservedPoint {
  on: IsoDate;
  randomised: number;
  events?: number | null;
}

export interface PlanPoint {
  on: IsoDate;
  count: number;
}

/** What the protocol planned, drawn dashed. */
export interface PlanCurves {
  randomised?: readonly PlanPoint[];
  events?: readonly PlanPoint[];
}

/** A forecast that this one is held against: outlined in dashes, with its name beside its dates. */
export interface EarlierForecast {
  label: string;
  monthly: readonly MonthlyRow[];
  milestones: readonly MilestoneForecast[];
}

export interface FigureData {
  cutoff: IsoDate;
  observed: readonly ObservedPoint[];
  monthly: readonly MonthlyRow[];
  milestones: readonly MilestoneForecast[];
  /** Footnote marks by milestone code. */
  cautionMarks?: Readonly<Record<string, string>>;
  plan?: PlanCurves;
  earlier?: EarlierForecast;
}

export function nameOf(milestone: Pick<MilestoneForecast, 'code' | 'name'>): string {
  return milestone.name ?? milestone.code;
}

export function hasEvents(data: FigureData): boolean {
  return (
    data.monthly.some((row) => row.events !== undefined) ||
    data.observed.some((point) => typeof point.events === 'number') ||
    data.milestones.some((milestone) => milestone.kind === 'events')
  );
}

/** The count of a kind by the cut-off, as far as it was observed. */
export function observedCount(data: FigureData, kind: 'randomised' | 'events'): number {
  const last = data.observed[data.observed.length - 1];
  return last?.[kind] ?? 0;
}
