'use client';

import { useId, useMemo, useState, type KeyboardEvent, type PointerEvent } from 'react';
import { FigureAxis } from '@/components/charts/figure-axis';
import { hasEvents, type FigureData } from '@/components/charts/figure-data';
import { figureLayout } from '@/components/charts/figure-layout';
import { FigureLegend } from '@/components/charts/figure-legend';
import { FigureMilestone, FigureMilestoneWords } from '@/components/charts/figure-milestone';
import { FigurePanel, FigurePanelMilestones, FigurePanelWords } from '@/components/charts/figure-panel';
import { FigureReadingCaption, FigureReadingMark } from '@/components/charts/figure-reading-line';
import { firstReading, movedReading, nearestReading, readingsOf } from '@/components/charts/figure-readings';
import { half, px } from '@/components/charts/figure-scale';
import { milestoneSentence } from '@/components/charts/milestone-words';
import { useElementWidth } from '@/components/charts/use-element-width';
import { formatDate, formatMonth } from '@/lib/format';

export interface ForecastFigureProps extends FigureData {
  /** The preview beside a form: no dates in the figure, no caption line. */
  compact?: boolean;
  /** Width drawn before the container's is known. */
  initialWidth?: number;
}

/**
 * The signature figure: patients and events on one time axis, observed up to the cut-off, bands after it, and every
 * milestone's date lying as a hill on its count line. One tab stop; arrow keys and the pointer read a month out.
 */
export function ForecastFigure({ compact = false, initialWidth, ...data }: ForecastFigureProps) {
  const { cutoff, observed, monthly, milestones, cautionMarks, plan, earlier } = data;
  const [box, width] = useElementWidth<HTMLDivElement>(initialWidth ?? (compact ? 372 : 1008));
  const descriptionId = useId();
  const layout = useMemo(
    () => figureLayout({ cutoff, observed, monthly, milestones, cautionMarks, plan, earlier }, width, compact),
    [cutoff, observed, monthly, milestones, cautionMarks, plan, earlier, width, compact],
  );
  const readings = useMemo(
    () => readingsOf({ cutoff, observed, monthly, milestones }),
    [cutoff, observed, monthly, milestones],
  );
  const [chosen, setChosen] = useState<number | null>(null);
  const at = Math.min(chosen ?? firstReading(data, readings), Math.max(0, readings.length - 1));
  const reading = compact ? undefined : readings[at];
  const { frame, patients, events, strips } = layout;

  const onKeyDown = (event: KeyboardEvent): void => {
    const moved = movedReading(event.key, at, readings.length);
    if (moved === null) return;
    event.preventDefault();
    setChosen(moved);
  };
  const onPointer = (event: PointerEvent<SVGSVGElement>): void => {
    const left = event.currentTarget.getBoundingClientRect().left;
    setChosen(nearestReading(readings, frame.scale.day(event.clientX - left)));
  };

  const what = hasEvents(data) ? 'Patients randomised and events' : 'Patients randomised';
  const description = [
    observed.length > 0
      ? `${what}, observed to ${formatDate(cutoff)} and forecast after it.`
      : `${what}, as the plan alone implies.`,
    ...milestones.map(milestoneSentence),
  ].join(' ');
  const slider = reading && {
    role: 'slider',
    tabIndex: 0,
    'aria-label': 'Month read out of the figure',
    'aria-describedby': descriptionId,
    'aria-valuemin': 0,
    'aria-valuemax': readings.length - 1,
    'aria-valuenow': at,
    'aria-valuetext': `End of ${formatMonth(reading.monthEnd)}`,
    onKeyDown,
  };

  return (
    <figure>
      <p id={descriptionId} className="sr-only">
        {description}
      </p>
      <div ref={box} {...slider} className="touch-pan-y">
        <svg
          aria-hidden="true"
          width={width}
          height={frame.height}
          viewBox={`0 0 ${width} ${frame.height}`}
          className="figure-sheet"
          onPointerMove={reading ? onPointer : undefined}
          onPointerDown={reading ? onPointer : undefined}
        >
          <rect width={width} height={frame.height} fill="transparent" />
          <FigureAxis frame={frame} />
          <FigurePanel panel={patients} frame={frame} />
          {events && <FigurePanel panel={events} frame={frame} />}
          {frame.cutoffX !== null && <path d={`M${half(frame.cutoffX)} 26V${frame.axisY}`} className="inkline" />}
          {layout.cutoffLabels.map((label) => (
            <text key={label.text} x={px(label.x)} y={37} textAnchor={label.anchor} className="soft rimmed">
              {label.text}
            </text>
          ))}
          <FigurePanelMilestones panel={patients} frame={frame} />
          {events && <FigurePanelMilestones panel={events} frame={frame} />}
          {strips.map((strip) => (
            <FigureMilestone key={strip.code} milestone={strip} frame={frame} />
          ))}
          {reading && <FigureReadingMark reading={reading} layout={layout} />}
          <FigurePanelWords panel={patients} />
          {events && <FigurePanelWords panel={events} />}
          {strips.map((strip) => (
            <FigureMilestoneWords key={strip.code} milestone={strip} />
          ))}
        </svg>
      </div>
      {reading && (
        <>
          <FigureReadingCaption
            reading={reading}
            hint={frame.size === 'full' ? '← → reads another month' : 'touch the figure to read a month'}
          />
          <FigureLegend data={data} />
        </>
      )}
    </figure>
  );
}
