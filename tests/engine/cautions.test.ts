import { describe, expect, it } from 'vitest';
import { runForecast } from '@/lib/engine/forecast';
import type { Caution, Study } from '@/lib/engine/types';
import { exampleStudy } from './example-study';
import { site, smallStudy, subject, withEvents } from './small-study';

const options = { studySha256: '' };

function cautionsOf(study: Study): Caution[] {
  return runForecast(study, options).cautions;
}

describe('cautions', () => {
  it('overdue sites: named to the team, counted to the sponsor', () => {
    const planned = { earliest: '2026-12-01', likely: '2027-01-01', latest: '2027-04-01' };
    const [caution] = cautionsOf(
      smallStudy((draft) => {
        draft.enrolment.sites.push(
          site('LYON-7', { planned }),
          site('GENT-2', { planned: { ...planned, latest: '2027-03-01' } }),
        );
        draft.enrolment.sites.push(site('BRNO-1', { planned: { ...planned, latest: '2027-04-02' } }));
      }),
    );
    expect(caution?.code).toBe('overdue-sites');
    expect(caution?.text).toContain('LYON-7 and GENT-2');
    expect(caution?.text).not.toContain('BRNO-1');
    expect(caution?.sponsorText).toMatch(/^2 sites have not opened/);
    expect(caution?.sponsorText).not.toMatch(/LYON|GENT/);
  });

  it('unlogged months: named to the team, counted to the sponsor; a site at its cap does not matter', () => {
    const [caution, ...others] = cautionsOf(
      smallStudy((draft) => {
        draft.enrolment.sites = [
          site('LYON-7', { activatedOn: '2026-10-01', randomised: 4, loggedThrough: '2027-02-28' }),
          site('GENT-2', { activatedOn: '2026-10-01', randomised: 4, unlogged: ['2026-12'], cap: 4 }),
        ];
      }),
    );
    expect(caution?.code).toBe('unlogged-months');
    expect(caution?.text).toContain('Site LYON-7 has not logged');
    expect(caution?.sponsorText).toMatch(/^1 site has not logged/);
    expect(others).toEqual([]);
  });

  it('no sponsor’s sentence ever holds a site’s code', () => {
    const study = exampleStudy((draft) => {
      draft.enrolment.sites.forEach((candidate, place) => {
        candidate.code = `SITE-${place}`;
        if (candidate.activatedOn && place % 5 === 0) candidate.loggedThrough = '2027-02-28';
        if (candidate.planned && place % 2 === 0)
          candidate.planned = { earliest: '2027-01-01', likely: '2027-01-02', latest: '2027-01-03' };
      });
      draft.simulation.draws = 250;
    });
    const cautions = cautionsOf(study);
    expect(cautions.map(({ code }) => code)).toEqual(expect.arrayContaining(['overdue-sites', 'unlogged-months']));
    for (const { sponsorText } of cautions) expect(sponsorText).not.toContain('SITE-');
  });

  it('few events, a plan that outweighs them, a far extrapolation: each with the milestones that it touches', () => {
    const cautions = cautionsOf(
      smallStudy((draft) => {
        draft.enrolment.sites = [site('101', { activatedOn: '2027-01-01', randomised: 40 })];
        withEvents(
          draft,
          Array.from({ length: 40 }, (_, place) =>
            subject(String(place), {
              randomisedOn: '2027-01-01',
              ...(place < 3 ? { status: 'event' as const, statusOn: '2027-02-15' } : {}),
            }),
          ),
          [
            { code: 'E60', kind: 'events', count: 60 },
            { code: 'LPI', kind: 'randomised', count: 100 },
            { code: 'BOTH', kind: 'all-of', of: ['LPI', 'E60'] },
          ],
          { basis: 'data', priorEvents: 8, medianMonths: 20 },
        );
      }),
    );
    for (const code of ['few-events', 'prior-outweighs-data', 'extrapolation']) {
      expect(cautions.find((caution) => caution.code === code)?.milestones).toEqual(['E60', 'BOTH']);
    }
  });

  it('an exponential that does not fit', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 60;
      draft.enrolment.sites = [site('101', { activatedOn: '2026-03-01', randomised: 60 })];
      // Events bunched around day 150: the hazard rises steeply.
      withEvents(
        draft,
        Array.from({ length: 60 }, (_, place) =>
          subject(String(place), {
            status: 'event',
            statusOn: `2027-02-${String(10 + (place % 15)).padStart(2, '0')}`,
          }),
        ),
        [{ code: 'E61', kind: 'events', count: 61 }],
        { basis: 'data' },
      );
    });
    expect(cautionsOf(study).map(({ code }) => code)).toContain('poor-fit');
    if (study.events) study.events.model.family = 'weibull';
    expect(cautionsOf(study).map(({ code }) => code)).not.toContain('poor-fit');
  });

  it('more than enrolment or the subjects can give', () => {
    const cautions = cautionsOf(
      smallStudy((draft) => {
        withEvents(
          draft,
          Array.from({ length: 12 }, (_, place) => subject(String(place))),
          [
            { code: 'R101', kind: 'randomised', count: 101 },
            { code: 'E101', kind: 'events', count: 101 },
            { code: 'E50', kind: 'events', count: 50 },
          ],
        );
      }),
    );
    expect(cautions.filter(({ code }) => code === 'out-of-reach').map(({ milestones }) => milestones)).toEqual([
      ['R101'],
      ['E101'],
    ]);
    const notReached = cautions.filter(({ code }) => code === 'not-reached');
    expect(notReached.map(({ milestones }) => milestones)).toEqual([['R101'], ['E101']]);
    expect(notReached[0]?.text).toContain('100\u00a0% of draws');
  });

  it('a sound forecast has none', () => {
    const cautions = cautionsOf(smallStudy());
    expect(cautions).toEqual([]);
  });
});
