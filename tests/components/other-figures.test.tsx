import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { BracketStrip } from '@/components/charts/bracket-strip';
import { DateHistoryFigure } from '@/components/charts/date-history-figure';
import { dateHistoryLayout, daysMoved } from '@/components/charts/date-history-layout';
import { NumbersTable } from '@/components/charts/numbers-table';
import { SitePlanFigure } from '@/components/charts/site-plan-figure';
import { sitePlanLayout } from '@/components/charts/site-plan-layout';
import { stripAxisOf, type StripMilestone } from '@/components/charts/strip-axis';
import type { MilestoneForecast } from '@/lib/engine/types';
import { fixtureForecast } from './figure-fixture';

const data = fixtureForecast({ draws: 400 });
const interim = data.milestones.find((milestone) => milestone.code === 'IA') as MilestoneForecast;

function shifted(days: number): MilestoneForecast {
  const move = (iso: string | null): string | null =>
    iso && new Date(Date.parse(`${iso}T00:00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
  return {
    ...interim,
    quantiles: Object.fromEntries(
      Object.entries(interim.quantiles).map(([level, on]) => [level, move(on)]),
    ) as MilestoneForecast['quantiles'],
    density: interim.density.map((week) => ({ ...week, from: move(week.from) ?? week.from })),
  };
}

describe('how the date moved', () => {
  const published = [shifted(-23), shifted(-7), interim].map((milestone) => ({ milestone }));

  it('counts the days between medians', () => {
    expect(daysMoved(shifted(-23), shifted(-7))).toBe(16);
    expect(daysMoved(undefined, interim)).toBeNull();
    expect(daysMoved(interim, { ...interim, quantiles: { ...interim.quantiles, '0.5': null } })).toBeNull();
  });

  it('joins medians from row to row: a stroke leaves one row where it enters the next', () => {
    const height = 90;
    const { rows } = dateHistoryLayout(published, '2027-11-30', 600, height);
    const points = rows.map((row) =>
      [...row.joint.matchAll(/[ML]([\d.]+) ([\d.]+)/g)].map(([, x, y]) => ({ x: Number(x), y: Number(y) })),
    );
    for (const place of [0, 1]) {
      const leaving = points[place]?.[points[place].length - 1];
      const entering = points[place + 1]?.[0];
      expect(leaving?.x).toBeCloseTo(entering?.x ?? NaN, 0);
      expect(leaving?.y).toBe(height + 1);
      expect(entering?.y).toBe(0);
    }
  });

  it('says range, median, move and reason in words', () => {
    const html = renderToStaticMarkup(
      <DateHistoryFigure
        plannedOn="2027-11-30"
        publications={published.map(({ milestone }, place) => ({
          number: place + 1,
          publishedOn: `2027-0${place + 2}-03`,
          dataCutoff: `2027-0${place + 1}-28`,
          milestone,
          reason: place === 1 ? 'Fewer events than expected.' : null,
          withdrawn: place === 2,
        }))}
      />,
    );
    expect(html).toContain('16 days later');
    expect(html).toContain('Fewer events than expected.');
    expect(html).toContain('line-through');
    expect(html).not.toMatch(/NaN|undefined/);
  });
});

describe('a site against its plan', () => {
  const months = [
    { month: '2026-09', cumulative: 2 },
    { month: '2026-10', cumulative: 5 },
    { month: '2026-11', cumulative: null },
    { month: '2026-12', cumulative: 8 },
  ];
  const plan = months.map(({ month }, place) => ({ month, cumulative: 2 * (place + 1) }));

  it('leaves a gap where a month is not logged', () => {
    const layout = sitePlanLayout(months, plan, 10, 252);
    const held = /M([\d.]+) ([\d.]+)H([\d.]+)/.exec(layout.gaps);
    expect(layout.gaps.match(/M/g)).toHaveLength(1);
    expect(layout.logged.match(/M/g)).toHaveLength(2);
    expect(layout.logged).toContain(`M${held?.[3]} ${held?.[2]}`);
  });

  it('keeps a cap that is far away out of the scale', () => {
    expect(sitePlanLayout(months, plan, 10, 252).capY).not.toBeNull();
    expect(sitePlanLayout(months, plan, 400, 252).capY).toBeNull();
  });

  it('says the gap aloud', () => {
    const html = renderToStaticMarkup(<SitePlanFigure months={months} plan={plan} cap={10} />);
    expect(html).toContain('Not logged: Nov 2026.');
    expect(renderToStaticMarkup(<SitePlanFigure months={[]} plan={[]} />)).not.toMatch(/NaN|Infinity/);
  });
});

describe('the portfolio’s strip', () => {
  const row: StripMilestone[] = [
    { code: 'IA', name: 'Interim', kind: 'events', plannedOn: '2027-10-31', forecast: interim },
    { code: 'FA', name: 'Final', kind: 'events', plannedOn: '2028-07-31', forecast: null },
  ];

  it('takes every bracket and planned day onto its axis', () => {
    const axis = stripAxisOf([row], '2027-04-05');
    expect(axis.from <= '2026-10-05').toBe(true);
    expect(axis.to > '2028-07-31').toBe(true);
    expect(stripAxisOf([], '2027-04-05').to > '2028-04-05').toBe(true);
  });

  it('says the ranges, and planned days where there is no forecast', () => {
    const html = renderToStaticMarkup(
      <BracketStrip axis={stripAxisOf([row], '2027-04-05')} today="2027-04-05" milestones={row} />,
    );
    expect(html).toMatch(/aria-label="Interim: [^"]* to [^"]*; Final: planned 31 Jul 2028\."/);
  });
});

describe('the numbers under the figure', () => {
  it('are the months’ medians and bands', () => {
    const html = renderToStaticMarkup(<NumbersTable monthly={data.monthly} csvHref="/numbers.csv" />);
    expect(html).toContain('30 Apr 2027');
    expect(html).toContain('Events, cumulative');
    expect(html).toContain(`Show all ${data.monthly.length} months`);
    expect(html.match(/<tr>/g)).toHaveLength(2 + 8);
  });

  it('have no column for events where the study counts none', () => {
    const monthly = data.monthly.map(({ monthEnd, randomised }) => ({ monthEnd, randomised }));
    expect(renderToStaticMarkup(<NumbersTable monthly={monthly} />)).not.toContain('Events');
  });
});
