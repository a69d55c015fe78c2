import { describe, expect, it } from 'vitest';
import { inOrderOfTime, isStale, nextPlanned, soonestOf, sortStudies, standingOf } from '@/lib/portfolio/rules';
import type { PortfolioMilestone, PortfolioStudy } from '@/lib/portfolio/schema';

interface Given {
  code: string;
  plannedOn?: string;
  median?: string;
  reachedOn?: string;
  chance?: number;
}

function milestone({ code, plannedOn, median, reachedOn, chance }: Given): PortfolioMilestone {
  const on = median ?? null;
  return {
    code,
    name: code,
    kind: 'events',
    plannedOn: plannedOn ?? null,
    forecast: {
      code,
      kind: 'events',
      reachedOn: reachedOn ?? null,
      probabilityReached: 1,
      probabilityByPlanned: chance ?? null,
      quantiles: {
        '0.025': on,
        '0.05': on,
        '0.1': on,
        '0.25': on,
        '0.5': on,
        '0.75': on,
        '0.9': on,
        '0.95': on,
        '0.975': on,
      },
      monteCarloErrorDays: null,
      density: [],
    },
  };
}

const study = (code: string, given: Given[]): PortfolioStudy => {
  const milestones = inOrderOfTime(given.map(milestone));
  const next = nextPlanned(milestones);
  return {
    code,
    title: code,
    sponsorName: 'Tarn',
    organisationName: 'Hazelmoor',
    isDemonstration: false,
    role: 'statistician',
    standing: standingOf(next, given.length > 0),
    next,
    milestones,
    counts: null,
    published: null,
    run: null,
    planSavedOn: null,
    site: null,
  };
};

describe('standing of a study', () => {
  it.each([
    [0.0, 'late'],
    [0.199, 'late'],
    [0.2, 'in-doubt'],
    [0.6, 'in-doubt'],
    [0.601, 'on-plan'],
    [1, 'on-plan'],
  ])('a chance of %d is %s', (probability, standing) => {
    expect(standingOf({ name: 'IA', plannedOn: '2027-10-31', probability }, true)).toBe(standing);
  });

  it('goes by the next planned day that is not reached, however soon other medians are', () => {
    const given = [
      { code: 'LPI', plannedOn: '2027-05-01', median: '2027-04-01', reachedOn: '2027-04-01', chance: 1 },
      { code: 'FA', plannedOn: '2028-08-31', median: '2028-10-01', chance: 0.3 },
      { code: 'IA', plannedOn: '2027-10-31', median: '2028-12-01', chance: 0.01 },
      { code: 'FU', median: '2027-06-01' },
    ];
    const milestones = given.map(milestone);
    expect(nextPlanned(milestones)).toEqual({ name: 'IA', plannedOn: '2027-10-31', probability: 0.01 });
    expect(soonestOf(milestones)?.code).toBe('FU');
    expect(inOrderOfTime(milestones).map((one) => one.code)).toEqual(['LPI', 'FU', 'FA', 'IA']);
    expect(standingOf(nextPlanned([milestones[0]!, milestones[3]!]), true)).toBe('undated');
    expect(standingOf(null, false)).toBe('no-forecast');
  });
});

describe('orders', () => {
  const studies = [
    study('B-2', [{ code: 'IA', plannedOn: '2028-01-01', median: '2027-11-01', chance: 0.9 }]),
    study('A-10', [{ code: 'IA', plannedOn: '2028-01-01', median: '2028-11-01', chance: 0.15 }]),
    study('A-9', [{ code: 'IA', plannedOn: '2027-01-01', median: '2028-01-01', chance: 0.01 }]),
    study('C-1', []),
  ];
  it('late ones first, the least likely before the others', () => {
    expect(sortStudies(studies, 'late').map((one) => one.code)).toEqual(['A-9', 'A-10', 'B-2', 'C-1']);
  });
  it('by the soonest date, without one last', () => {
    expect(sortStudies(studies, 'date').map((one) => one.code)).toEqual(['B-2', 'A-9', 'A-10', 'C-1']);
  });
  it('by code, numbers as numbers', () => {
    expect(sortStudies(studies, 'code').map((one) => one.code)).toEqual(['A-9', 'A-10', 'B-2', 'C-1']);
  });
});

describe('age of data', () => {
  it('is said from the sixty-first day', () => {
    expect(isStale('2027-01-01', '2027-03-02')).toBe(false);
    expect(isStale('2027-01-01', '2027-03-03')).toBe(true);
  });
});
