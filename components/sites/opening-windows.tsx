'use client';

import { half, monthStart, monthTicks, px, startOfDay, timeScale } from '@/components/charts/figure-scale';
import { useElementWidth } from '@/components/charts/use-element-width';
import { daysApart } from '@/lib/dates';
import { formatDate, formatQuantity, formatShortMonth } from '@/lib/format';
import type { SiteWindow, SiteWindows } from '@/lib/sites/schema';

const HEIGHT = 26;
const BASE = 21;
const PEAK = 6;

/** One strip per site still to open: a triangle over earliest, likely and latest, and today as an upright line. */
export function OpeningWindows({ windows }: { windows: SiteWindows }) {
  const [box, width] = useElementWidth<HTMLTableCellElement>(560);
  const { items, today } = windows;
  const days = [startOfDay(today), ...items.flatMap((site) => [startOfDay(site.earliest), startOfDay(site.latest)])];
  const scale = timeScale(monthStart(Math.min(...days)), monthStart(Math.max(...days), 1), 0, width);
  const ticks = monthTicks(scale);
  const step = Math.max(1, Math.ceil((ticks.length * 34) / width));
  return (
    <div className="overflow-x-auto">
      <table className="w-full border-collapse">
        <caption className="sr-only">Sites still to open, with earliest, likely and latest day</caption>
        <thead>
          <tr className="border-b border-ink align-bottom text-13 text-ink-soft">
            <th scope="col" className="w-[30%] pb-1.5 text-left">
              Site
            </th>
            <th scope="col" ref={box} className="min-w-40 p-0">
              <span className="sr-only">Window, drawn</span>
              <svg width={width} height={42} aria-hidden="true" className="figure-sheet">
                {ticks.map((tick, place) => (
                  <g key={tick.x}>
                    {(tick.month === 1 || place === 0) && (
                      <text x={px(tick.x)} y={16} className="year">
                        {tick.year}
                      </text>
                    )}
                    <path d={`M${half(tick.x)} 37v5`} className="tickline" />
                    {place % step === 0 && tick.x + 26 < width && (
                      <text x={px(tick.x + 3)} y={34} className="soft">
                        {formatShortMonth(`${tick.year}-${String(tick.month).padStart(2, '0')}`)}
                      </text>
                    )}
                  </g>
                ))}
              </svg>
            </th>
            <th scope="col" className="w-[16%] pb-1.5 pl-2.5 text-left">
              Likely day
            </th>
          </tr>
        </thead>
        <tbody>
          {items.map((site) => (
            <tr key={site.code} className="border-b border-rule">
              <th scope="row" className="py-1 pr-2.5 text-left text-13 font-400">
                <b>{site.code}</b> {site.name}, {site.city}
              </th>
              <td className="p-0 align-middle">
                <WindowStrip site={site} today={today} scale={scale} width={width} />
              </td>
              <td className={site.overdue ? 'pl-2.5 whitespace-nowrap text-caution' : 'pl-2.5 whitespace-nowrap'}>
                {formatDate(site.likely)}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface WindowStripProps {
  site: SiteWindow;
  today: string;
  scale: ReturnType<typeof timeScale>;
  width: number;
}

function WindowStrip({ site, today, scale, width }: WindowStripProps) {
  const [from, top, to, now] = [site.earliest, site.likely, site.latest, today].map((date) =>
    scale.x(startOfDay(date)),
  ) as [number, number, number, number];
  const late = daysApart(site.latest, today);
  const words = `Earliest ${formatDate(site.earliest)}, likely ${formatDate(site.likely)}, latest ${formatDate(site.latest)}.`;
  const overdue = `window closed ${formatQuantity(late, 'day')} ago`;
  const fitsRight = now + 190 < width;
  return (
    <svg
      role="img"
      aria-label={site.overdue ? `${words} The ${overdue}.` : words}
      width={width}
      height={HEIGHT}
      className={site.overdue ? 'figure-sheet text-caution' : 'figure-sheet text-ink'}
    >
      <path d={`M0 ${BASE + 0.5}H${width}`} className="hairline" />
      <path
        d={`M${px(from)} ${BASE}L${px(top)} ${PEAK}L${px(Math.max(to, from + 1))} ${BASE}z`}
        fill="currentColor"
        fillOpacity="var(--band-80)"
        stroke="currentColor"
        strokeWidth="1"
      />
      {site.overdue && (
        <path d={`M${px(to)} ${BASE}H${px(now)}`} stroke="currentColor" strokeWidth="1.5" strokeDasharray="1 3" />
      )}
      <path d={`M${half(now)} 0V${HEIGHT}`} className="inkline" />
      {site.overdue && (
        <text
          x={px(fitsRight ? now + 6 : now - 6)}
          y={16}
          textAnchor={fitsRight ? 'start' : 'end'}
          className="noted rimmed"
        >
          {overdue}
        </text>
      )}
    </svg>
  );
}
