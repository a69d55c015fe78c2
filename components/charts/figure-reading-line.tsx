import { PointMark } from '@/components/charts/figure-marks';
import { px } from '@/components/charts/figure-scale';
import type { FigureLayout } from '@/components/charts/figure-layout';
import type { ReadCount, Reading } from '@/components/charts/figure-readings';
import { Mark } from '@/components/ui/mark';
import { formatCount, formatCountRange, formatPercent, formatMonth } from '@/lib/format';

/** The dotted upright at the month being read, with an open mark on each median. */
export function FigureReadingMark({ reading, layout }: { reading: Reading; layout: FigureLayout }) {
  const { frame, patients, events } = layout;
  const x = frame.scale.x(reading.day);
  if (x > frame.scale.right + 1) return null;
  return (
    <g aria-hidden="true">
      <path d={`M${px(x)} 44V${(events ?? patients).base}`} className="readline" />
      <g className="tone-randomised">
        <PointMark tone="randomised" x={x} y={patients.y(reading.randomised.median)} size={4} open />
      </g>
      {events && reading.events && (
        <g className="tone-events">
          <PointMark tone="events" x={x} y={events.y(reading.events.median)} size={4} open />
        </g>
      )}
    </g>
  );
}

function countWords(count: ReadCount, one: string, many: string): string {
  const noun = count.median === 1 ? one : many;
  const median = `${formatCount(count.median)} ${noun}`;
  return count.band ? `${median}, ${formatPercent(0.8)}: ${formatCountRange(...count.band)}` : `${median}, observed`;
}

/** The caption line: one month, read out. */
export function FigureReadingCaption({ reading, hint }: { reading: Reading; hint: string }) {
  return (
    <div className="mt-2 flex flex-wrap items-baseline gap-x-5 border-y border-rule py-2">
      <p role="status" className="flex min-h-[22px] flex-wrap items-baseline gap-x-5">
        <span className="font-title text-18 leading-[22px]">End of {formatMonth(reading.monthEnd)}</span>
        <span>
          <Mark kind="patients" /> {countWords(reading.randomised, 'randomised', 'randomised')}
        </span>
        {reading.events && (
          <span>
            <Mark kind="events" /> {countWords(reading.events, 'event', 'events')}
          </span>
        )}
      </p>
      <p className="text-13 text-ink-soft screen-only md:ml-auto">{hint}</p>
    </div>
  );
}
