import { describe, expect, it } from 'vitest';
import type { FigureData } from '@/components/charts/figure-data';
import { coreOf, hillOf, hillScale, peakOf } from '@/components/charts/figure-hill';
import { overlaps, textWidth, type Box } from '@/components/charts/figure-labels';
import { figureLayout } from '@/components/charts/figure-layout';
import { countTicks, endOfDay, labelStep, timeScale, yearLabels } from '@/components/charts/figure-scale';
import type { MilestoneForecast } from '@/lib/engine/types';
import { CUTOFF, fixtureForecast, TARGETS } from './figure-fixture';

const data: FigureData = fixtureForecast();
const layout = figureLayout(data, 1008);

/** The corners of a path of straight lines. */
function corners(path: string): { x: number; y: number }[] {
  return [...path.matchAll(/[ML]([\d.]+) ([\d.]+)/g)].map(([, x, y]) => ({ x: Number(x), y: Number(y) }));
}

function changed(change: Partial<Record<string, Partial<MilestoneForecast>>>): FigureData {
  return { ...data, milestones: data.milestones.map((milestone) => ({ ...milestone, ...change[milestone.code] })) };
}

describe('the 80 % edges of the band', () => {
  it.each([
    ['LPI', 'patients'],
    ['IA', 'events'],
    ['FA', 'events'],
  ] as const)('meet the count line of %s where its bracket ends', (code, panelName) => {
    const panel = layout[panelName];
    const milestone = panel?.milestones.find((one) => one.code === code);
    const [low = '', high = ''] = panel?.edges80 ?? [];
    const meets = (path: string, x: number): boolean =>
      corners(path).some((corner) => Math.abs(corner.x - x) < 0.06 && Math.abs(corner.y - (milestone?.y ?? 0)) < 0.06);
    expect(milestone?.bracket).toBeTruthy();
    expect(meets(low, milestone?.bracket?.to ?? 0)).toBe(true);
    expect(meets(high, milestone?.bracket?.from ?? 0)).toBe(true);
    expect(meets(low, milestone?.bracket?.from ?? 0)).toBe(false);
  });

  it('stay under the last count line', () => {
    const panel = layout.events;
    const all = [...(panel?.edges80 ?? []), ...(panel?.edges95 ?? []), panel?.median ?? ''].flatMap(corners);
    expect(Math.min(...all.map((corner) => corner.y))).toBeCloseTo(panel?.top ?? 0, 1);
  });
});

describe('the frame', () => {
  it('is drawn for the width it gets: nothing lies outside it', () => {
    for (const width of [320, 358, 640, 1008, 1120]) {
      const { frame, patients, events, strips } = figureLayout(data, width);
      for (const milestone of [...patients.milestones, ...(events?.milestones ?? []), ...strips]) {
        expect(milestone.bracket?.to ?? 0).toBeLessThanOrEqual(width);
        const label = milestone.label;
        if (label?.anchor === 'start') {
          expect(label.x + textWidth(label.lines[0] ?? '', true)).toBeLessThanOrEqual(width);
        }
      }
      expect(frame.scale.right).toBeLessThanOrEqual(width);
    }
  });

  it('leaves the dates to the table on a phone', () => {
    const phone = figureLayout(data, 358);
    expect(phone.frame.size).toBe('small');
    expect(phone.events?.milestones.every((milestone) => milestone.label === null)).toBe(true);
    expect(phone.events?.milestones.every((milestone) => milestone.name !== null)).toBe(true);
  });

  it('has no events panel for a study with an enrolment target only', () => {
    const only: FigureData = {
      ...data,
      observed: data.observed.map(({ on, randomised }) => ({ on, randomised })),
      monthly: data.monthly.map(({ monthEnd, randomised }) => ({ monthEnd, randomised })),
      milestones: data.milestones.filter((milestone) => milestone.kind === 'randomised'),
    };
    const alone = figureLayout(only, 1008);
    expect(alone.events).toBeNull();
    expect(alone.frame.axisY).toBe(alone.patients.base);
  });

  it('draws no cut-off where nothing was observed', () => {
    const plan = figureLayout({ ...data, observed: [] }, 372, true);
    expect(plan.frame.cutoffX).toBeNull();
    expect(plan.cutoffLabels).toEqual([]);
    expect(plan.patients.observed).toBe('');
  });

  it('puts the cut-off at the end of its day', () => {
    expect(layout.frame.cutoffX).toBeCloseTo(layout.frame.scale.x(endOfDay(CUTOFF)), 6);
  });
});

describe('a milestone', () => {
  it('keeps its bracket open where its late end never comes, and says how often', () => {
    const never = changed({
      FA: { probabilityReached: 0.88, quantiles: { ...quantilesOf('FA'), '0.9': null, '0.95': null, '0.975': null } },
    });
    const final = figureLayout(never, 1008).events?.milestones.find((one) => one.code === 'FA');
    expect(final?.bracket?.open).toBe(true);
    expect(final?.label?.lines).toEqual([expect.stringMatching(/ or later$/), 'not reached in 12\u00a0% of draws']);
  });

  it('has no bracket and no mark where it is hardly ever reached', () => {
    const none = Object.fromEntries(
      Object.keys(quantilesOf('FA')).map((level) => [level, null]),
    ) as MilestoneForecast['quantiles'];
    const final = figureLayout(
      changed({ FA: { probabilityReached: 0.04, quantiles: none, density: [] } }),
      1008,
    ).events?.milestones.find((one) => one.code === 'FA');
    expect(final).toMatchObject({ bracket: null, markX: null, hill: null });
    expect(final?.label?.lines[0]).toBe('not reached in 96\u00a0% of draws');
  });

  it('once reached has a day and no distribution', () => {
    const reached = changed({ LPI: { reachedOn: '2027-02-14' } });
    const done = figureLayout(reached, 1008).patients.milestones[0];
    expect(done).toMatchObject({ reached: true, bracket: null, hill: null });
    expect(done?.label?.lines).toEqual(['reached 14 Feb 2027']);
  });

  it('lifts the planned diamond off the median', () => {
    const median = quantilesOf('IA')['0.5'];
    const over = figureLayout(changed({ IA: { plannedOn: median } }), 1008).events?.milestones.find(
      (one) => one.code === 'IA',
    );
    expect(over?.diamond?.y).toBe((over?.y ?? 0) - 12);
    const apart = layout.events?.milestones.find((one) => one.code === 'LPI') ?? layout.patients.milestones[0];
    expect(apart?.diamond?.y).toBe(apart?.y);
  });

  it('leaves names and dates to the table over four lines a panel', () => {
    const final = data.milestones.find((milestone) => milestone.code === 'FA');
    if (!final) throw new Error('no final analysis');
    const many = [300, 350, 400, 440, 480].map((count) => ({ ...final, code: `E${count}`, count }));
    const crowded = figureLayout({ ...data, milestones: many }, 1008);
    expect(crowded.events?.milestones).toHaveLength(5);
    expect(crowded.events?.milestones.every((one) => one.name === null && one.label === null)).toBe(true);
  });

  it('never writes one date over another', () => {
    const interim = data.milestones.find((milestone) => milestone.code === 'IA');
    if (!interim) throw new Error('no interim analysis');
    const close = [288, 290, 292, 480].map((count) => ({ ...interim, code: `E${count}`, count }));
    const labels =
      figureLayout({ ...data, milestones: close }, 1008).events?.milestones.flatMap((one) =>
        one.label ? [one.label] : [],
      ) ?? [];
    expect(labels.length).toBeGreaterThanOrEqual(2);
    const boxes: Box[] = labels.map((label) => {
      const width = Math.max(...label.lines.map((line, place) => textWidth(line, place === 0)));
      return {
        x: label.anchor === 'start' ? label.x : label.x - width,
        y: label.y - 13,
        width,
        height: 17 * label.lines.length,
      };
    });
    boxes.forEach((box, place) => boxes.slice(place + 1).forEach((other) => expect(overlaps(box, other)).toBe(false)));
  });
});

describe('a hill', () => {
  const milestone = data.milestones.find((one) => one.code === 'IA');
  const hill = milestone ? hillOf(milestone) : [];
  const area = (points: typeof hill): number =>
    points.slice(1).reduce((sum, point, place) => {
      const left = points[place];
      return left ? sum + ((point.density + left.density) / 2) * (point.day - left.day) : sum;
    }, 0);

  it('has the area of the draws that get there', () => expect(area(hill)).toBeCloseTo(1, 2));

  it('has about 80 % of it in its core', () => {
    expect(milestone && area(coreOf(hill, milestone))).toBeGreaterThan(0.76);
    expect(milestone && area(coreOf(hill, milestone))).toBeLessThan(0.84);
  });

  it('shares one scale with the others, lowered at most by half for the steepest', () => {
    const even = hillScale([0.01, 0.02], 2200, 46);
    expect(even(0.01)).toBe(even(0.02));
    const steep = hillScale([0.002, 0.1], 2200, 46);
    expect(steep(0.002)).toBe(1100);
    expect(steep(0.1) * 0.1).toBeCloseTo(46, 6);
    expect(peakOf([])).toBe(0);
  });
});

describe('scales', () => {
  it.each([
    [1200, [0, 400, 800, 1200]],
    [480, [0, 200, 400]],
    [96, [0, 25, 50, 75]],
    [3, [0, 1, 2, 3]],
  ])('part %d counts by round steps', (ceiling, ticks) => expect(countTicks(ceiling)).toEqual(ticks));

  it('label months as densely as they fit', () => {
    const span = (years: number) =>
      timeScale(endOfDay('2026-01-31'), endOfDay('2026-01-31') + years * 365.25, 50, 1004);
    expect([1, 4, 8, 20].map((years) => labelStep(span(years)))).toEqual([1, 3, 6, 12]);
  });

  it('say each year once', () => {
    const labels = yearLabels(timeScale(endOfDay('2026-01-31'), endOfDay('2029-06-30'), 50, 1004));
    expect(labels.map((label) => label.year)).toEqual([2026, 2027, 2028, 2029]);
    expect(labels[0]?.rule).toBe(false);
  });
});

function quantilesOf(code: keyof typeof TARGETS): MilestoneForecast['quantiles'] {
  const found = data.milestones.find((milestone) => milestone.code === code);
  if (!found) throw new Error(code);
  return found.quantiles;
}
