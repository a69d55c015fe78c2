'use client';

import { PointMark } from '@/components/charts/figure-marks';
import { half, labelStep, monthTicks, px } from '@/components/charts/figure-scale';
import { sitePlanLayout, type SiteMonth, type SitePlanPoint } from '@/components/charts/site-plan-layout';
import { useElementWidth } from '@/components/charts/use-element-width';
import { formatCount, formatMonth, formatShortMonth } from '@/lib/format';

export interface SitePlanFigureProps {
  months: readonly SiteMonth[];
  plan: readonly SitePlanPoint[];
  cap?: number | null;
}

/** A site's own enrolment against its plan: nothing of any other site. */
export function SitePlanFigure({ months, plan, cap = null }: SitePlanFigureProps) {
  const [box, width] = useElementWidth<HTMLDivElement>(252);
  const layout = sitePlanLayout(months, plan, cap, width);
  const { scale, base, last, planEnd, capY } = layout;
  const step = labelStep(scale, 40);
  const planned = plan[plan.length - 1];
  const unlogged = months.filter((one) => one.cumulative === null);
  const lastMonth = [...months].reverse().find((one) => one.cumulative !== null);
  const description = [
    lastMonth
      ? `Randomised at this site: ${formatCount(lastMonth.cumulative ?? 0)} by ${formatMonth(lastMonth.month)}.`
      : 'Nothing logged yet.',
    planned ? `Planned by ${formatMonth(planned.month)}: about ${formatCount(planned.cumulative)}.` : '',
    cap === null ? '' : `Cap: ${formatCount(cap)}.`,
    unlogged.length > 0 ? `Not logged: ${unlogged.map((one) => formatMonth(one.month)).join(', ')}.` : '',
  ];
  const labelAbove = last !== null && last.y > 46;
  return (
    <div ref={box}>
      <svg
        role="img"
        aria-label={description.filter(Boolean).join(' ')}
        width={width}
        height={layout.height}
        viewBox={`0 0 ${width} ${layout.height}`}
        className="figure-sheet"
      >
        {layout.ticks.map((tick) => (
          <g key={tick.text}>
            <path d={`M26 ${half(tick.y + 0.5)}H${width}`} className="hairline" />
            <text x={20} y={px(tick.y + 4)} textAnchor="end" className="soft">
              {tick.text}
            </text>
          </g>
        ))}
        {capY !== null && cap !== null && (
          <>
            <path d={`M26 ${half(capY + 0.5)}H${width}`} className="inkline" />
            <text x={20} y={px(capY + 4)} textAnchor="end" className="strong">
              {formatCount(cap)}
            </text>
            <text x={30} y={px(capY - 5)} className="soft">
              cap
            </text>
          </>
        )}
        {layout.plan && <path d={layout.plan} className="planline" />}
        {planEnd && (
          <text
            x={px(planEnd.x - 2)}
            y={px(Math.min(base - 6, planEnd.y + 18))}
            textAnchor="end"
            className="soft rimmed"
          >
            plan
          </text>
        )}
        <g className="tone-randomised">
          <path d={layout.logged} className="observed" />
          {layout.gaps && (
            <path d={layout.gaps} className="edge-95" style={{ strokeWidth: 1.5, strokeDasharray: '1 3' }} />
          )}
          {last && <PointMark tone="randomised" x={last.x} y={last.y} size={4} />}
          {last && (
            <text
              x={px(last.x - 8)}
              y={px(labelAbove ? last.y - 8 : last.y + 18)}
              textAnchor="end"
              className="strong toned rimmed"
            >
              {formatCount(last.count)} randomised
            </text>
          )}
        </g>
        {monthTicks(scale)
          .filter((tick) => (tick.month - 1) % step === 0 && tick.x + 20 < width)
          .map((tick) => (
            <g key={tick.x}>
              <path d={`M${half(tick.x)} ${base}v5`} className="tickline" />
              <text x={px(tick.x)} y={base + 18} className="soft">
                {step === 12 ? tick.year : formatShortMonth(`${tick.year}-${String(tick.month).padStart(2, '0')}`)}
              </text>
            </g>
          ))}
      </svg>
    </div>
  );
}
