import type { IsoMonth } from '@/lib/engine/types';
import {
  countTicks,
  endOfDay,
  monthStart,
  polyline,
  px,
  timeScale,
  type TimeScale,
} from '@/components/charts/figure-scale';

export interface SiteMonth {
  month: IsoMonth;
  /** Randomised since opening, by the month's end; null where the month is not logged. */
  cumulative: number | null;
}

export interface SitePlanPoint {
  month: IsoMonth;
  cumulative: number;
}

export interface SitePlanLayout {
  height: number;
  base: number;
  scale: TimeScale;
  ticks: { y: number; text: string }[];
  capY: number | null;
  logged: string;
  gaps: string;
  plan: string;
  last: { x: number; y: number; count: number } | null;
  planEnd: { x: number; y: number } | null;
}

const GUTTER = 28;
const TOP = 22;
const BASE = 168;

function endOfMonth(month: IsoMonth): number {
  return monthStart(endOfDay(`${month}-01`), 1);
}

/** A month that is not logged is a gap, never a flat line: its patients are not none, they are unknown. */
export function sitePlanLayout(
  months: readonly SiteMonth[],
  plan: readonly SitePlanPoint[],
  cap: number | null,
  width: number,
): SitePlanLayout {
  const ends = [...months, ...plan].map((one) => endOfMonth(one.month));
  const from = ends.length > 0 ? monthStart(Math.min(...ends) - 1) : 0;
  const scale = timeScale(from, ends.length > 0 ? Math.max(...ends) + 12 : 31, GUTTER + 6, width - 2);
  const highest = Math.max(1, ...months.map((one) => one.cumulative ?? 0), ...plan.map((one) => one.cumulative));
  // A cap far above anything in sight would press the lines to the floor; then it stands in words only.
  const capped = cap !== null && cap <= highest * 4;
  const ceiling = capped ? Math.max(cap, highest) : highest * 1.15;
  const y = (count: number): number => BASE - (count / ceiling) * (BASE - TOP);

  let logged = `M${px(scale.x(from))} ${px(y(0))}`;
  let gaps = '';
  let held = 0;
  let at = from;
  let broken = false;
  for (const { month, cumulative } of months) {
    const end = endOfMonth(month);
    if (cumulative === null) {
      gaps += `M${px(scale.x(at))} ${px(y(held))}H${px(scale.x(end))}`;
      broken = true;
    } else {
      if (broken) logged += `M${px(scale.x(at))} ${px(y(held))}`;
      logged += `H${px(scale.x(end))}V${px(y(cumulative))}`;
      held = cumulative;
      broken = false;
    }
    at = end;
  }
  const lastLogged = [...months].reverse().find((one) => one.cumulative !== null);
  const planPoints = plan.map((one) => ({
    x: scale.x(endOfMonth(one.month)),
    y: y(Math.min(one.cumulative, ceiling)),
  }));
  return {
    height: BASE + 24,
    base: BASE,
    scale,
    ticks: countTicks(ceiling)
      .map((count) => ({ y: y(count), text: String(count) }))
      .filter((tick) => !capped || Math.abs(tick.y - y(cap)) > 13),
    capY: capped ? y(cap) : null,
    logged,
    gaps,
    plan: planPoints.length > 0 ? polyline([{ x: scale.x(from), y: y(0) }, ...planPoints]) : '',
    last:
      lastLogged && lastLogged.cumulative !== null
        ? { x: scale.x(endOfMonth(lastLogged.month)), y: y(lastLogged.cumulative), count: lastLogged.cumulative }
        : null,
    planEnd: planPoints[planPoints.length - 1] ?? null,
  };
}
