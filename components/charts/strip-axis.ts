import type { IsoDate, MilestoneForecast, MilestoneKind } from '@/lib/engine/types';
import { endOfDay, isoOfDay, monthStart } from '@/components/charts/figure-scale';

/** One milestone in a row of the calendar; without a forecast only its planned day is drawn. */
export interface StripMilestone {
  code: string;
  name: string;
  kind: MilestoneKind;
  plannedOn: IsoDate | null;
  forecast: MilestoneForecast | null;
}

export interface StripAxis {
  from: IsoDate;
  to: IsoDate;
}

/** One time axis for all rows: from half a year before today to past the latest 80 % end, at most eight years. */
export function stripAxisOf(rows: readonly (readonly StripMilestone[])[], today: IsoDate): StripAxis {
  const now = endOfDay(today);
  const days = rows.flat().flatMap(({ plannedOn, forecast }) => {
    const dates = [
      plannedOn,
      forecast?.reachedOn,
      forecast?.reachedOn ? null : forecast?.quantiles['0.1'],
      forecast?.reachedOn ? null : forecast?.quantiles['0.9'],
    ];
    return dates.flatMap((on) => (on ? [endOfDay(on)] : []));
  });
  const earliest = Math.min(now - 183, ...days.map((day) => Math.max(day, now - 730)));
  const latest = Math.max(now + 365, ...days.map((day) => Math.min(day, now + 6 * 365)));
  return { from: isoOfDay(monthStart(earliest)), to: isoOfDay(monthStart(latest, 2)) };
}
