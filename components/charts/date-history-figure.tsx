'use client';

import { useMemo } from 'react';
import {
  daysMoved,
  dateHistoryLayout,
  type HistoryLayout,
  type HistoryRow,
} from '@/components/charts/date-history-layout';
import { BracketMark, Hill, PlannedMark, PointMark, toneOf, type Tone } from '@/components/charts/figure-marks';
import { half, labelStep, monthTicks, px, yearLabels, type TimeScale } from '@/components/charts/figure-scale';
import { milestoneWords } from '@/components/charts/milestone-words';
import { useElementWidth } from '@/components/charts/use-element-width';
import { joinClasses } from '@/components/ui/join-classes';
import type { IsoDate, MilestoneForecast } from '@/lib/engine/types';
import { formatDate, formatDaysMoved, formatPercent, formatShortMonth } from '@/lib/format';

export interface PublishedDate {
  number: number;
  publishedOn: IsoDate;
  dataCutoff: IsoDate;
  milestone: MilestoneForecast;
  /** What moved it, in words. */
  reason?: string | null;
  withdrawn?: boolean;
}

export interface DateHistoryFigureProps {
  /** Oldest first: it reads downwards. */
  publications: readonly PublishedDate[];
  plannedOn?: IsoDate | null;
}

const NARROW_BELOW = 760;
const FIRST_COLUMN = 184;
const LAST_COLUMN = 320;

function rowHeightFor(publications: readonly PublishedDate[]): number {
  const lines = Math.max(1, ...publications.map((one) => Math.ceil((one.reason ?? '').length / 44)));
  return Math.max(90, 24 + 22 + 18 + 18 * lines + 8);
}

function HistoryAxis({ scale, width }: { scale: TimeScale; width: number }) {
  const step = labelStep(scale, 36);
  const ticks = monthTicks(scale).filter((tick) => (tick.month - 1) % step === 0 && tick.x + 24 < width);
  return (
    <svg aria-hidden="true" width={width} height={44} viewBox={`0 0 ${width} 44`} className="figure-sheet">
      {yearLabels(scale).map((label) => (
        <g key={label.year}>
          {label.rule && <path d={`M${half(label.x)} 2V44`} className="hairline" />}
          <text x={px(label.x + (label.rule ? 6 : 0))} y={17} className="year">
            {label.year}
          </text>
        </g>
      ))}
      {ticks.map((tick) => (
        <g key={tick.x}>
          <path d={`M${half(tick.x)} 44v-5`} className="tickline" />
          <text x={px(tick.x + 3)} y={36} className="soft">
            {formatShortMonth(`${tick.year}-${String(tick.month).padStart(2, '0')}`)}
          </text>
        </g>
      ))}
    </svg>
  );
}

interface HistoryStripProps {
  row: HistoryRow;
  layout: HistoryLayout;
  tone: Tone;
  width: number;
  height: number;
  first: boolean;
  joined: boolean;
}

function HistoryStrip({ row, layout, tone, width, height, first, joined }: HistoryStripProps) {
  const { lineY, plannedX, scale } = layout;
  return (
    <svg aria-hidden="true" width={width} height={height} viewBox={`0 0 ${width} ${height}`} className="figure-sheet">
      {yearLabels(scale).map(
        (label) => label.rule && <path key={label.year} d={`M${half(label.x)} 0V${height}`} className="hairline" />,
      )}
      {plannedX !== null && <path d={`M${half(plannedX)} ${first ? 16 : 0}V${height}`} className="planline" />}
      {plannedX !== null && first && <PlannedMark x={half(plannedX)} y={10} />}
      <path d={`M0 ${half(lineY + 0.5)}H${width}`} className="hairline" />
      <g className={`tone-${tone}`}>
        {row.outline && <Hill outline={row.outline} core={row.core} />}
        {row.bracket && <BracketMark tone={tone} bracket={row.bracket} y={lineY} />}
        {joined && row.joint && <path d={row.joint} className="medianline" />}
        {row.markX !== null && <PointMark tone={tone} x={row.markX} y={lineY} />}
      </g>
    </svg>
  );
}

function HistoryWords({ one, before }: { one: PublishedDate; before: PublishedDate | undefined }) {
  const { range, under } = milestoneWords(one.milestone);
  const moved = daysMoved(before?.milestone, one.milestone);
  return (
    <>
      <p className={joinClasses('font-600', one.withdrawn && 'line-through')}>{range}</p>
      <p className="text-13 text-ink-soft">
        {under}
        {moved !== null && (
          <>
            {under && ', '}
            <span className="font-600 text-ink">{formatDaysMoved(moved)}</span>
          </>
        )}
        {one.withdrawn && <span className="font-600 text-stop"> withdrawn</span>}
      </p>
      {one.reason && <p className="text-13 text-ink-soft">{one.reason}</p>}
    </>
  );
}

/** How one milestone's date moved from publication to publication: rows of one height, medians joined, reasons in words. */
export function DateHistoryFigure({ publications, plannedOn = null }: DateHistoryFigureProps) {
  const [box, width] = useElementWidth<HTMLDivElement>(1120);
  const narrow = width < NARROW_BELOW;
  const height = narrow ? 70 : rowHeightFor(publications);
  const stripWidth = narrow ? width : width - FIRST_COLUMN - LAST_COLUMN;
  const layout = useMemo(
    () => dateHistoryLayout(publications, plannedOn, stripWidth, height),
    [publications, plannedOn, stripWidth, height],
  );
  const tone = toneOf(publications[0]?.milestone.kind ?? 'all-of');
  const strip = (place: number) => {
    const row = layout.rows[place];
    return (
      row && (
        <HistoryStrip
          row={row}
          layout={layout}
          tone={tone}
          width={stripWidth}
          height={height}
          first={place === 0}
          joined={!narrow}
        />
      )
    );
  };
  const heading = (one: PublishedDate) => (
    <>
      <span className="font-600">{formatDate(one.publishedOn)}</span>{' '}
      <span className={narrow ? 'text-13 text-ink-soft' : 'block text-13 text-ink-soft'}>
        No. {one.number}, data to {formatDate(one.dataCutoff)}
      </span>
    </>
  );

  if (narrow) {
    return (
      <div ref={box}>
        <HistoryAxis scale={layout.scale} width={stripWidth} />
        <ol className="border-t border-ink">
          {publications.map((one, place) => (
            <li key={one.number} className="border-t border-rule py-2 first:border-t-0">
              <p>{heading(one)}</p>
              {strip(place)}
              <HistoryWords one={one} before={publications[place - 1]} />
            </li>
          ))}
        </ol>
      </div>
    );
  }
  return (
    <div ref={box}>
      <table className="w-full table-fixed border-collapse">
        <caption className="sr-only">How the date moved from publication to publication</caption>
        <colgroup>
          <col style={{ width: FIRST_COLUMN }} />
          <col style={{ width: stripWidth }} />
          <col style={{ width: LAST_COLUMN }} />
        </colgroup>
        <thead className="border-b border-ink text-left align-bottom text-13 text-ink-soft">
          <tr>
            <th scope="col" className="pb-1">
              Published
            </th>
            <th scope="col" className="p-0">
              <span className="sr-only">On the calendar</span>
              <HistoryAxis scale={layout.scale} width={stripWidth} />
            </th>
            <th scope="col" className="pb-1 pl-7">
              Range, {formatPercent(0.8)}, and what moved it
            </th>
          </tr>
        </thead>
        <tbody>
          {publications.map((one, place) => (
            <tr key={one.number} className="border-b border-rule align-top">
              <th scope="row" className="text-left font-400" style={{ paddingTop: layout.lineY - 12 }}>
                {heading(one)}
              </th>
              <td className="p-0">{strip(place)}</td>
              <td className="pt-6 pl-7">
                <HistoryWords one={one} before={publications[place - 1]} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
