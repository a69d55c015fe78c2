'use client';

import { BracketMark, PlannedMark, PointMark, toneOf } from '@/components/charts/figure-marks';
import { textWidth } from '@/components/charts/figure-labels';
import {
  endOfDay,
  half,
  monthTicks,
  px,
  startOfDay,
  timeScale,
  yearLabels,
  type TimeScale,
} from '@/components/charts/figure-scale';
import { milestoneWords } from '@/components/charts/milestone-words';
import type { StripAxis, StripMilestone } from '@/components/charts/strip-axis';
import { useElementWidth } from '@/components/charts/use-element-width';
import type { IsoDate } from '@/lib/engine/types';
import { formatDate } from '@/lib/format';

/** Under this width a row's words stand on a line of their own over its bracket. */
const STACKED_BELOW = 460;

function rowMeasures(width: number): { stacked: boolean; row: number; first: number } {
  return width < STACKED_BELOW ? { stacked: true, row: 50, first: 32 } : { stacked: false, row: 38, first: 16 };
}

function stripScale(axis: StripAxis, width: number): TimeScale {
  return timeScale(startOfDay(axis.from), startOfDay(axis.to), 0, width);
}

/** The axis over the rows, with today. */
export function StripAxisHead({ axis, today }: { axis: StripAxis; today: IsoDate }) {
  const [box, width] = useElementWidth<HTMLDivElement>(620);
  const scale = stripScale(axis, width);
  const monthWide = scale.pixelsPerDay * 30.4375;
  const todayX = scale.x(endOfDay(today));
  const words = `today, ${formatDate(today).replace(/ \d{4}$/, '')}`;
  const leftwards = todayX + textWidth(words) + 6 > width;
  return (
    <div ref={box}>
      <span className="sr-only">On the calendar</span>
      <svg aria-hidden="true" width={width} height={50} viewBox={`0 0 ${width} 50`} className="figure-sheet">
        {yearLabels(scale).map((label) => (
          <g key={label.year}>
            {label.rule && <path d={`M${half(label.x)} 4V50`} className="hairline" />}
            <text x={px(label.x + (label.rule ? 6 : 0))} y={18} className="year">
              {label.year}
            </text>
          </g>
        ))}
        {monthTicks(scale)
          .filter((tick) => monthWide >= 5 || tick.month % 3 === 1)
          .map((tick) => (
            <path key={tick.x} d={`M${half(tick.x)} 50v-${tick.month % 3 === 1 ? 7 : 3}`} className="tickline" />
          ))}
        <path d={`M${half(todayX)} 24V50`} className="inkline" />
        <text
          x={px(todayX + (leftwards ? -6 : 6))}
          y={38}
          textAnchor={leftwards ? 'end' : 'start'}
          className="soft rimmed"
        >
          {words}
        </text>
      </svg>
    </div>
  );
}

function StripRow({
  milestone,
  y,
  scale,
  stacked,
}: {
  milestone: StripMilestone;
  y: number;
  scale: TimeScale;
  stacked: boolean;
}) {
  const { forecast, name, plannedOn, kind } = milestone;
  const tone = toneOf(kind);
  const at = (on: IsoDate): number => Math.min(scale.right, Math.max(scale.left, scale.x(endOfDay(on))));
  const plannedX = plannedOn ? at(plannedOn) : null;
  const low = forecast?.reachedOn ? null : (forecast?.quantiles['0.1'] ?? null);
  const high = forecast?.quantiles['0.9'] ?? null;
  const bracket =
    low === null ? null : { from: at(low), to: high === null ? scale.right : at(high), open: high === null };
  const markOn = forecast?.reachedOn ?? forecast?.quantiles['0.5'] ?? null;
  const markX = markOn === null ? null : at(markOn);
  const words = forecast
    ? milestoneWords(forecast).range
    : plannedOn
      ? `planned ${formatDate(plannedOn)}`
      : 'no date planned';
  const width = textWidth(name, true) + 6 + textWidth(words);
  const starts = [bracket?.from, markX, plannedX].filter((x): x is number => typeof x === 'number');
  const ends = [bracket?.to, markX, plannedX].filter((x): x is number => typeof x === 'number');
  const right = Math.max(0, ...ends) + 10;
  const left = Math.min(scale.right, ...starts) - 10;
  const rightwards = right + width <= scale.right || left - width < 0;
  const lifted = plannedX !== null && markX !== null && Math.abs(plannedX - markX) < 9;
  return (
    <g className={`tone-${tone}`}>
      {plannedX !== null && bracket && plannedX < bracket.from && (
        <path d={`M${px(plannedX)} ${y}H${px(bracket.from)}`} className="planline" />
      )}
      {bracket && <BracketMark tone={tone} bracket={bracket} y={y} drop={4} />}
      {plannedX !== null && <PlannedMark x={plannedX} y={lifted ? y - 10 : y - 1} size={5} />}
      {markX !== null && <PointMark tone={tone} x={markX} y={y - 1} />}
      <text
        x={px(stacked ? 0 : rightwards ? Math.min(right, Math.max(0, scale.right - width)) : left)}
        y={stacked ? y - 17 : y + 4.5}
        textAnchor={stacked || rightwards ? 'start' : 'end'}
        className="rimmed"
      >
        <tspan className="strong">{name}</tspan>
        <tspan dx="6" className={forecast ? undefined : 'soft'}>
          {words}
        </tspan>
      </text>
    </g>
  );
}

interface BracketStripProps {
  axis: StripAxis;
  today: IsoDate;
  milestones: readonly StripMilestone[];
}

/**
 * One study's milestones on the common axis: each an 80 % bracket, its median and its planned day. It stands in a cell
 * with `relative`, so that the years' rules and today's run unbroken from row to row.
 */
export function BracketStrip({ axis, today, milestones }: BracketStripProps) {
  const [box, width] = useElementWidth<HTMLDivElement>(620);
  const scale = stripScale(axis, width);
  const { stacked, row, first } = rowMeasures(width);
  const height = Math.max(1, milestones.length) * row + 6;
  const todayX = scale.x(endOfDay(today));
  const words = milestones.map(({ name, forecast, plannedOn }) => {
    const dates = forecast
      ? milestoneWords(forecast).range
      : plannedOn
        ? `planned ${formatDate(plannedOn)}`
        : 'no date planned';
    return `${name}: ${dates}`;
  });
  return (
    <div ref={box}>
      <div aria-hidden="true" className="pointer-events-none absolute inset-y-0" style={{ width }}>
        {yearLabels(scale).map(
          (label) =>
            label.rule && (
              <span
                key={label.year}
                className="absolute inset-y-0 w-px bg-rule"
                style={{ left: Math.round(label.x) }}
              />
            ),
        )}
        <span className="absolute inset-y-0 w-px bg-ink" style={{ left: Math.round(todayX) }} />
      </div>
      <svg
        role="img"
        aria-label={`${words.join('; ')}.`}
        width={width}
        height={height}
        viewBox={`0 0 ${width} ${height}`}
        className="figure-sheet relative"
      >
        {milestones.map((milestone, place) => (
          <StripRow
            key={milestone.code}
            milestone={milestone}
            y={first + row * place}
            scale={scale}
            stacked={stacked}
          />
        ))}
      </svg>
    </div>
  );
}
