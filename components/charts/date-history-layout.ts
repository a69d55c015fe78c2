import type { IsoDate, MilestoneForecast } from '@/lib/engine/types';
import { coreOf, hillOf, hillScale, peakOf, type HillPoint } from '@/components/charts/figure-hill';
import { endOfDay, monthStart, polyline, timeScale, type TimeScale } from '@/components/charts/figure-scale';
import type { Bracket } from '@/components/charts/milestone-layout';

export interface DatedForecast {
  milestone: MilestoneForecast;
}

export interface HistoryRow {
  outline: string;
  core: string;
  bracket: Bracket | null;
  markX: number | null;
  /** The stroke from the median above to the one below, within this row's height. */
  joint: string;
}

export interface HistoryLayout {
  scale: TimeScale;
  lineY: number;
  rows: HistoryRow[];
  plannedX: number | null;
}

const SPACE_UNDER_LINE = 38;

/** One scale and one hill scale for all rows; the medians are joined across rows of one height. */
export function dateHistoryLayout(
  forecasts: readonly DatedForecast[],
  plannedOn: IsoDate | null,
  width: number,
  rowHeight: number,
): HistoryLayout {
  const lineY = rowHeight - SPACE_UNDER_LINE;
  const hills = forecasts.map(({ milestone }) => (milestone.reachedOn ? [] : hillOf(milestone)));
  const dated = (pick: (milestone: MilestoneForecast) => string | null): number[] =>
    forecasts.flatMap(({ milestone }) => {
      const on = milestone.reachedOn ?? pick(milestone);
      return on ? [endOfDay(on)] : [];
    });
  const days = [
    ...dated((milestone) => milestone.quantiles['0.025']),
    ...dated((milestone) => milestone.quantiles['0.975'] ?? milestone.quantiles['0.75'] ?? milestone.quantiles['0.5']),
    ...(plannedOn ? [endOfDay(plannedOn)] : []),
  ];
  const from = monthStart(days.length > 0 ? Math.min(...days) : 0);
  const to = monthStart(days.length > 0 ? Math.max(...days) : 31, 1);
  const scale = timeScale(from, to, 0, width);
  const heightOf = hillScale(hills.map(peakOf), 1800, lineY - 14);

  const path = (hill: readonly HillPoint[], height: number): string => {
    const inside = hill.filter((point) => point.day >= from && point.day <= to);
    const points = inside.map((point) => ({ x: scale.x(point.day), y: lineY - point.density * height }));
    const first = points[0];
    const last = points[points.length - 1];
    return first && last ? polyline([{ x: first.x, y: lineY }, ...points, { x: last.x, y: lineY }]) : '';
  };
  const marks = forecasts.map(({ milestone }) => {
    const on = milestone.reachedOn ?? milestone.quantiles['0.5'];
    return on === null ? null : scale.x(endOfDay(on));
  });

  const rows = forecasts.map(({ milestone }, place): HistoryRow => {
    const hill = hills[place] ?? [];
    const height = heightOf(peakOf(hill));
    const low = milestone.quantiles['0.1'];
    const high = milestone.quantiles['0.9'];
    const markX = marks[place] ?? null;
    const above = marks[place - 1] ?? null;
    const below = marks[place + 1] ?? null;
    const crossing = (upper: number, lower: number): number =>
      upper + ((lower - upper) * (rowHeight - lineY)) / rowHeight;
    const joint =
      markX === null
        ? []
        : [
            ...(above === null ? [] : [{ x: crossing(above, markX), y: 0 }]),
            { x: markX, y: lineY },
            ...(below === null ? [] : [{ x: crossing(markX, below), y: rowHeight + 1 }]),
          ];
    return {
      outline: path(hill, height),
      core: path(coreOf(hill, milestone), height),
      bracket:
        milestone.reachedOn || low === null
          ? null
          : {
              from: scale.x(endOfDay(low)),
              to: high === null ? width : Math.min(width, scale.x(endOfDay(high))),
              open: high === null,
            },
      markX,
      joint: joint.length > 1 ? polyline(joint) : '',
    };
  });
  return { scale, lineY, rows, plannedX: plannedOn ? scale.x(endOfDay(plannedOn)) : null };
}

/** Days by which the median moved against the forecast before it; null where either has none. */
export function daysMoved(earlier: MilestoneForecast | undefined, later: MilestoneForecast): number | null {
  const before = earlier && (earlier.reachedOn ?? earlier.quantiles['0.5']);
  const after = later.reachedOn ?? later.quantiles['0.5'];
  return before && after ? endOfDay(after) - endOfDay(before) : null;
}
