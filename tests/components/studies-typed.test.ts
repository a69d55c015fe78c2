import { describe, expect, it } from 'vitest';
import { enrolmentField, enrolmentTyped, enrolmentValue } from '@/components/studies/enrolment-typed';
import { eventsTyped, eventsValue } from '@/components/studies/events-typed';
import { milestoneCodes, milestonesTyped, milestonesValue, newMilestone } from '@/components/studies/milestones-typed';
import { ENROLMENT, EVENTS, MILESTONES, SIMULATION } from '@/components/studies/plan-sections';
import { plannedSiteSet, planStudy } from '@/components/studies/plan-study';
import { informationWords, sitesWords } from '@/components/studies/plan-words';
import { unsupportedParts } from '@/lib/engine/supported';
import { checkStudy } from '@/lib/study-file/parse';
import { type Plan, SECTION_SCHEMAS } from '@/lib/studies/schema';

const PLAN: Plan = {
  enrolment: {
    target: 900,
    rate: { meanPerMonth: 1.55, cv: 0.7, basis: 'plan' },
    countryRates: [{ country: 'PL', meanPerMonth: 0.8 }],
    seasonality: [1, 1, 1, 1, 1, 1, 0.7, 0.7, 1, 1, 1, 0.8],
    rampUp: { months: 2, fraction: 0.07 },
  },
  events: {
    model: { family: 'weibull', medianMonths: 26.2, shape: 1.1, cureFraction: 0.1, basis: 'data', priorEvents: 5 },
    dropout: { perMonth: 0.007, basis: 'data', priorEvents: 5 },
    followUpMonths: null,
  },
  milestones: [
    { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 900, plannedOn: '2028-11-30' },
    { code: 'IA', name: 'Interim analysis', kind: 'events', count: 180, plannedOn: '2029-01-31' },
    { code: 'FU', name: 'Follow-up', kind: 'follow-up', months: 12, plannedOn: null },
    { code: 'PA', name: 'Primary analysis', kind: 'all-of', of: ['IA', 'FU'], plannedOn: null },
  ],
  simulation: { draws: 10_000, seed: 1, horizonMonths: 120 },
};

describe('fields and values', () => {
  it('a plan goes into the fields and comes back as it was', () => {
    for (const codec of [ENROLMENT, EVENTS, MILESTONES, SIMULATION] as const) {
      const value = PLAN[codec.section];
      const typed = codec.typedOf(value, true);
      expect((codec.valueOf as (typed: unknown, saved: unknown) => unknown)(typed, value)).toEqual(value);
    }
  });

  it('per cent are what a person types, to the last digit', () => {
    expect(enrolmentTyped(PLAN.enrolment).rampPercent).toBe('7');
    expect(eventsTyped(PLAN.events, true).lossPercent).toBe('0.7');
  });

  it('an empty page is full of faults and of no invented figure', () => {
    for (const codec of [ENROLMENT, EVENTS, MILESTONES] as const) {
      const value = (codec.valueOf as (typed: unknown, saved: unknown) => unknown)(codec.typedOf(null, false), null);
      expect(SECTION_SCHEMAS[codec.section].safeParse(value).success).toBe(false);
    }
    const typed = SIMULATION.typedOf(null, false);
    expect(SECTION_SCHEMAS.simulation.safeParse(SIMULATION.valueOf(typed, null)).success).toBe(true);
  });

  it('parts without a field stay as they were saved', () => {
    const saved: Plan['enrolment'] = { ...PLAN.enrolment, countryCaps: [{ country: 'DE', cap: 150 }] };
    expect(enrolmentValue(enrolmentTyped(saved), saved)).toEqual(saved);
  });

  it('“no events” is told from “nothing said yet”', () => {
    expect(eventsTyped(null, true).counted).toBe('no');
    expect(eventsTyped(null, false).counted).toBe('yes');
    expect(eventsValue(eventsTyped(null, true), null)).toBeNull();
  });

  it('a figure that is none yet reaches the schema as one that is refused', () => {
    const typed = { ...enrolmentTyped(PLAN.enrolment), target: '1,2', cv: '', rampPercent: 'half' };
    const parsed = SECTION_SCHEMAS.enrolment.safeParse(enrolmentValue(typed, null));
    const fields = parsed.success ? [] : parsed.error.issues.map((issue) => enrolmentField(issue.path.join('.')));
    expect(fields.sort()).toEqual(['cv', 'rampPercent', 'target']);
  });

  it('a fault of the seventh month stands at July', () => {
    expect(enrolmentField('seasonality.6')).toBe('season.6');
    expect(MILESTONES.fieldOf('2.code')).toBe('rows.2.name');
    expect(MILESTONES.fieldOf('2.of.0')).toBe('rows.2.of');
  });
});

describe('codes of milestones', () => {
  it('saved ones keep theirs whatever they are called; new ones take a free one', () => {
    const { rows } = milestonesTyped(PLAN.milestones);
    const renamed = [
      ...rows.map((row) => (row.key === 'IA' ? { ...row, name: 'First look' } : row)),
      newMilestone(1, { name: 'Independent audit', kind: 'all-of', of: ['IA', 'new 2'] }),
      newMilestone(2, { name: 'Interim analysis' }),
    ];
    expect([...milestoneCodes(renamed)]).toEqual([
      ['LPI', 'LPI'],
      ['IA', 'IA'],
      ['FU', 'FU'],
      ['PA', 'PA'],
      ['new 1', 'IA2'],
      ['new 2', 'IA3'],
    ]);
    const value = milestonesValue({ rows: renamed }) as { code: string; of?: string[] }[];
    expect(value.find((one) => one.code === 'IA2')?.of).toEqual(['IA', 'IA3']);
  });
});

describe('the picture’s study file', () => {
  const sites = [
    { code: '101', country: 'PL', earliest: '2027-06-01', likely: '2027-06-20', latest: '2027-08-01', cap: 40 },
    { code: '102', country: 'DE', earliest: '2027-05-10', likely: '2027-05-10', latest: '2027-05-10', cap: null },
  ];
  it('begins before the first site, without data, with every figure taken as known', () => {
    const study = planStudy({ code: 'X', title: 'X' }, PLAN, sites)!;
    expect(study.dataCutoff).toBe('2027-05-08');
    expect(study.enrolment.sites.every((site) => site.planned && !site.activatedOn && !site.randomised)).toBe(true);
    expect([study.enrolment.rate.basis, study.events!.model.basis, study.events!.dropout.basis]).toEqual([
      'plan',
      'plan',
      'plan',
    ]);
    expect(study.events!.subjects ?? study.events!.aggregate).toBeUndefined();
    expect(unsupportedParts(study)).toEqual([]);
    expect(checkStudy(study)).toMatchObject({ ok: true });
  });

  it('is none without a site', () => {
    expect(planStudy({ code: 'X', title: 'X' }, PLAN, [])).toBeNull();
  });

  it('has a stand-in of sites that open evenly, in a country of the mean rate', () => {
    const set = plannedSiteSet({ count: '5', from: '2027-01-01', to: '2027-01-09' }, ['AD']);
    expect(set.map((site) => site.likely)).toEqual([
      '2027-01-01',
      '2027-01-03',
      '2027-01-05',
      '2027-01-07',
      '2027-01-09',
    ]);
    expect(new Set(set.map((site) => site.country)).has('AD')).toBe(false);
    expect(new Set(set.map((site) => site.code)).size).toBe(5);
  });

  it.each([
    { count: '', from: '2027-01-01', to: '2027-02-01' },
    { count: '2.5', from: '2027-01-01', to: '2027-02-01' },
    { count: '5001', from: '2027-01-01', to: '2027-02-01' },
    { count: '5', from: '2027-03-01', to: '2027-02-01' },
    { count: '5', from: '1 Mar', to: '2027-02-01' },
  ])('and none out of %j', (typed) => {
    expect(plannedSiteSet(typed, [])).toEqual([]);
  });
});

describe('words', () => {
  it('sites in a sentence', () => {
    expect(sitesWords([])).toBe('no site yet');
    expect(
      sitesWords([
        { code: '1', country: 'PL', earliest: '2027-06-01', likely: '2027-06-01', latest: '2027-07-01', cap: null },
        { code: '2', country: 'PL', earliest: '2027-05-01', likely: '2027-06-01', latest: '2028-05-24', cap: null },
      ]),
    ).toBe('2 sites in 1 country, opening between 1 May 2027 and 24 May 2028');
  });

  it('an interim analysis as a share of the final number', () => {
    expect(
      informationWords([
        { name: 'Interim', count: 180 },
        { name: 'Final', count: 300 },
      ]),
    ).toBe('Interim at 60\u00a0% of the final number of events.');
    expect(informationWords([{ name: 'Final', count: 300 }])).toBeNull();
    expect(informationWords([])).toBeNull();
  });
});
