import { describe, expect, it } from 'vitest';
import {
  cautionMarksOf,
  firstSentence,
  inSentence,
  medianMoved,
  milestoneWords,
  movedWords,
  publishedForecast,
  quotation,
  shareReachedBy,
  waitsFor,
} from '@/lib/publications/rules';
import { publishBody, publishedForecastSchema } from '@/lib/publications/schema';
import {
  fixtureContent,
  fixtureForecastFile,
  fixtureMilestone,
  fixtureStudyFile,
  FORBIDDEN,
  reached,
  shifted,
} from '@/tests/domain/publications-fixture';

const STUDY = { code: 'KLD-900', title: 'Ostrelin in adults with gout', sponsorName: 'Tarn Medicines' };
const studyFile = fixtureStudyFile('KLD-900');
const published = () =>
  publishedForecast(STUDY, { number: 8, forecast: fixtureForecastFile(studyFile), studyFile }, []);

describe('what of a run is published', () => {
  it('holds no site, no subject and nothing of the fit', () => {
    const text = JSON.stringify(published());
    for (const word of FORBIDDEN) expect(text).not.toContain(word);
    expect(JSON.stringify(fixtureForecastFile(studyFile))).toContain(FORBIDDEN[0]);
  });

  it('is what its schema allows, and the schema refuses anything more', () => {
    expect(publishedForecastSchema.safeParse(published()).success).toBe(true);
    expect(publishedForecastSchema.safeParse({ ...published(), fit: {} }).success).toBe(false);
    const [first, ...rest] = published().milestones;
    const more = { ...published(), milestones: [{ ...first, site: '101' }, ...rest] };
    expect(publishedForecastSchema.safeParse(more).success).toBe(false);
  });

  it('counts from the run’s own subjects, month by month, and ends at what was observed', () => {
    expect(published().observedMonthly).toEqual([
      { monthEnd: '2027-01-31', randomised: 1, events: 0 },
      { monthEnd: '2027-02-28', randomised: 1, events: 1 },
      { monthEnd: '2027-03-31', randomised: 3, events: 2 },
    ]);
  });

  it('without subjects takes patients from the sites’ months and events from the log, never above what was observed', () => {
    const { subjects: _, ...events } = studyFile.events!;
    const file = {
      ...studyFile,
      events: { ...events, aggregate: { events: 2, withdrawn: 0, atRisk: 1, personMonths: 9 } },
    };
    const logged = [
      { monthEnd: '2027-01-31', randomised: 9, events: 1 },
      { monthEnd: '2027-02-28', randomised: 9, events: 7 },
    ];
    const run = { number: 8, forecast: fixtureForecastFile(studyFile), studyFile: file };
    expect(publishedForecast(STUDY, run, logged).observedMonthly).toEqual([
      { monthEnd: '2027-01-31', randomised: 1, events: 1 },
      { monthEnd: '2027-02-28', randomised: 1, events: 2 },
      { monthEnd: '2027-03-31', randomised: 3, events: 2 },
    ]);
  });

  it('carries the sponsor’s wording; a caution without milestones touches all of them', () => {
    expect(published().cautions.map(({ text }) => text)).toEqual([
      'One site is overdue to open. The forecast opens it after the cut-off.',
      'Only 2 events have been seen so far; the dates rest on the plan.',
    ]);
    expect(cautionMarksOf(published())).toEqual({ LPI: '†\u00a0‡', IA: '‡', FA: '‡', FU: '‡', PA: '‡' });
  });
});

describe('a note', () => {
  const body = (note: unknown) => publishBody.safeParse({ runNumber: 1, note, confirm: true });
  it('has 1 to 2,000 characters, spaces at its ends not counted', () => {
    expect(body('x'.repeat(2000)).success).toBe(true);
    expect(body('x'.repeat(2001)).success).toBe(false);
    expect(body('   ').success).toBe(false);
    expect(body(undefined).success).toBe(false);
  });
  it('nothing is published without the confirmation', () => {
    expect(publishBody.safeParse({ runNumber: 1, note: 'x', confirm: false }).success).toBe(false);
    expect(publishBody.safeParse({ runNumber: 1, note: 'x' }).success).toBe(false);
  });
  it('its first sentence says what moved the date', () => {
    expect(firstSentence('March brought 14 events. Eight sites are late.')).toBe('March brought 14 events.');
    expect(firstSentence('One line\nwithout a stop')).toBe('One line without a stop');
    expect(firstSentence('2.5 events a month. More.')).toBe('2.5 events a month.');
    expect(firstSentence(`${'word '.repeat(60)}`)).toMatch(/^(word ){20,}word…$/);
  });
});

describe('dates in words', () => {
  const ia = fixtureMilestone('IA');
  const at = (quantiles: Partial<typeof ia.quantiles>, rest: Partial<typeof ia> = {}) => ({
    ...ia,
    probabilityReached: 1,
    ...rest,
    quantiles: { ...ia.quantiles, ...quantiles },
  });

  it('the months large, days and median under them, chance of the planned day', () => {
    const words = milestoneWords(
      at(
        { '0.1': '2027-11-23', '0.5': '2027-12-26', '0.9': '2028-02-03' },
        { plannedOn: '2027-10-31', probabilityByPlanned: 0.004 },
      ),
    );
    expect(words).toEqual({
      range: 'Nov 2027 to Feb 2028',
      isRange: true,
      exact: '23 Nov 2027 to 3 Feb 2028; median 26 Dec 2027',
      planned: '31 Oct 2027',
      chance: '<\u00a01\u00a0% chance by then',
    });
  });

  it('a day that is known has no range and no chance', () => {
    expect(milestoneWords(reached(at({}, { plannedOn: '2027-03-02' }), '2027-03-09'))).toEqual({
      range: 'Reached 9 Mar 2027',
      isRange: false,
      exact: '',
      planned: '2 Mar 2027',
      chance: '7 days later than planned',
    });
  });

  it('a range with an open end, and a milestone that hardly any draw reaches', () => {
    const open = milestoneWords(
      at({ '0.1': '2028-06-19', '0.5': '2029-01-31', '0.9': null }, { probabilityReached: 0.88 }),
    );
    expect(open.range).toBe('Jun 2028 or later');
    expect(open.exact).toBe('19 Jun 2028 or later; median 31 Jan 2029; not reached in 12\u00a0% of draws');
    const never = milestoneWords(at({ '0.1': null, '0.5': null, '0.9': null }, { probabilityReached: 0.002 }));
    expect(never.range).toBe('Not reached');
    expect(never.exact).toBe('not reached in >\u00a099\u00a0% of draws');
  });

  it('how far a median moved, and since when', () => {
    expect(medianMoved(ia, shifted(ia, 16))).toBe(16);
    expect(medianMoved(null, ia)).toBeNull();
    expect(medianMoved(ia, reached(ia, '2027-03-09'))).toBeNull();
    expect(movedWords(16, '2027-03-02', '2027-04-06')).toBe('16 days later than on 2 Mar');
    expect(movedWords(-1, '2026-12-04', '2027-02-03')).toBe('1 day earlier than on 4 Dec 2026');
    expect(movedWords(0, '2027-03-02', '2027-04-06')).toBe('unchanged since 2 Mar');
  });

  it('what a milestone waits for', () => {
    const { milestones } = fixtureContent();
    const of = (code: string) => waitsFor(fixtureMilestone(code), milestones);
    expect(of('IA')).toBe('288th event');
    expect(of('LPI')).toBe('1,200th randomisation');
    expect(of('FU')).toBe('12 months after the last patient in');
    expect(of('PA')).toBe('final analysis and follow-up complete');
    expect(inSentence('DMC review')).toBe('DMC review');
  });

  it('a sentence to quote says what, when, how sure, from which data, and that it is a forecast', () => {
    const content = fixtureContent((one) =>
      one.code === 'IA' ? at({ '0.1': '2027-11-23', '0.5': '2027-12-26', '0.9': '2028-02-03' }) : one,
    );
    const said = quotation(
      { number: 5, publishedOn: '2027-04-06', content },
      content.milestones.find(({ code }) => code === 'IA')!,
    );
    expect(said).toBe(
      'KLD-900, interim analysis (288th event): forecast for 23 Nov 2027 to 3 Feb 2028 (80\u00a0%); median 26 Dec 2027 (publication 5 of 6 Apr 2027, from data to 31 Mar 2027, with 2 cautions). A forecast is not a decision.',
    );
  });
});

describe('the share of draws that are there by a day', () => {
  const milestone = {
    ...fixtureMilestone('IA'),
    density: [
      { from: '2027-05-03', share: 0.7 },
      { from: '2027-05-10', share: 0.3 },
    ],
  };
  it('adds whole weeks and the days of a week that has begun', () => {
    expect(shareReachedBy(milestone, '2027-05-02')).toBe(0);
    expect(shareReachedBy(milestone, '2027-05-03')).toBeCloseTo(0.1, 12);
    expect(shareReachedBy(milestone, '2027-05-09')).toBeCloseTo(0.7, 12);
    expect(shareReachedBy(milestone, '2030-01-01')).toBeCloseTo(1, 12);
  });
});
