import { describe, expect, it } from 'vitest';
import { FAMILY_NAMES } from '@/lib/engine/families';
import type { MilestoneForecast } from '@/lib/engine/types';
import { faultsOf } from '@/lib/http/problem';
import { comparePlans, milestoneCode, planChanges, planFaults, sameValue, secondLook } from '@/lib/studies/rules';
import { createStudyBody, OFFERED_FAMILIES, type Plan, PLAN_SECTIONS, SECTION_SCHEMAS } from '@/lib/studies/schema';
import type { z } from 'zod';

const PLAN: Plan = {
  enrolment: {
    target: 900,
    rate: { meanPerMonth: 1.55, cv: 0.7, basis: 'plan' },
    rampUp: { months: 2, fraction: 0.5 },
  },
  events: {
    model: { family: 'weibull', medianMonths: 26, shape: 1, basis: 'data', priorEvents: 5 },
    dropout: { perMonth: 0.008, basis: 'data', priorEvents: 5 },
    followUpMonths: null,
  },
  milestones: [
    { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 900, plannedOn: '2028-11-30' },
    { code: 'IA', name: 'Interim analysis', kind: 'events', count: 180, plannedOn: '2029-01-31' },
    { code: 'FU', name: 'Follow-up', kind: 'follow-up', months: 12 },
    { code: 'PA', name: 'Primary analysis', kind: 'all-of', of: ['IA', 'FU'] },
  ],
  simulation: { draws: 10_000, seed: 1, horizonMonths: 120 },
};

function faults(schema: z.ZodType, value: unknown): { pointer: string; detail: string }[] {
  const parsed = schema.safeParse(value);
  return parsed.success ? [] : faultsOf(parsed.error);
}
const pointers = (schema: z.ZodType, value: unknown): string[] => faults(schema, value).map((fault) => fault.pointer);

describe('sections of a plan', () => {
  it('a plan in order passes unchanged', () => {
    for (const section of PLAN_SECTIONS) expect(SECTION_SCHEMAS[section].parse(PLAN[section])).toEqual(PLAN[section]);
  });

  it('every fault of a section is told at once, at its field', () => {
    const wrong = {
      target: 0,
      rate: { meanPerMonth: 0, cv: 0.001, basis: 'guess' },
      countryRates: [
        { country: 'PL', meanPerMonth: 1 },
        { country: 'PL', meanPerMonth: 2 },
      ],
      seasonality: [1, 1],
      rampUp: { months: -1, fraction: 2 },
      arm: 'A',
    };
    expect(pointers(SECTION_SCHEMAS.enrolment, wrong).sort()).toEqual(
      [
        '/arm',
        '/rampUp/fraction',
        '/rampUp/months',
        '/rate/basis',
        '/rate/cv',
        '/rate/meanPerMonth',
        '/seasonality',
        '/target',
        '/countryRates/1/country',
      ].sort(),
    );
  });

  it.each([
    ['exactly at the bounds', { target: 1_000_000, rate: { meanPerMonth: 1000, cv: 10, basis: 'data' } }, []],
    [
      'just over them',
      { target: 1_000_001, rate: { meanPerMonth: 1000.1, cv: 10.1, basis: 'data' } },
      ['/target', '/rate/meanPerMonth', '/rate/cv'],
    ],
    ['half a patient', { target: 10.5, rate: { meanPerMonth: 1, cv: 1, basis: 'plan' } }, ['/target']],
    [
      'what is no number',
      { target: Number.NaN, rate: { meanPerMonth: null, cv: '1', basis: 'plan' } },
      ['/target', '/rate/meanPerMonth', '/rate/cv'],
    ],
  ])('enrolment %s', (_, value, expected) => {
    expect(pointers(SECTION_SCHEMAS.enrolment, value)).toEqual(expected);
  });

  it('no treatment arm has a place, and only families that can be computed are taken', () => {
    const events = { ...PLAN.events, model: { ...PLAN.events!.model, family: 'cox' }, hazardRatio: 0.7 };
    expect(pointers(SECTION_SCHEMAS.events, events).sort()).toEqual(['/hazardRatio', '/model/family']);
    expect(SECTION_SCHEMAS.events.parse(null)).toBeNull();
  });

  it('codes twice, parts that are not there and circles are named', () => {
    const found = faults(SECTION_SCHEMAS.milestones, [
      { code: 'A', name: 'A', kind: 'events', count: 3 },
      { code: 'B', name: 'B', kind: 'all-of', of: ['A'] },
      { code: 'B', name: 'B again', kind: 'events', count: 3 },
      { code: 'C', name: 'C', kind: 'all-of', of: ['Z'] },
    ]);
    expect(found.map((fault) => fault.pointer)).toEqual(['/2/code', '/3/of/0']);
    const circle = faults(SECTION_SCHEMAS.milestones, [
      { code: 'A', name: 'A', kind: 'all-of', of: ['B'] },
      { code: 'B', name: 'B', kind: 'all-of', of: ['A'] },
    ]);
    expect(circle.map((fault) => fault.pointer)).toEqual(['/0/of', '/1/of']);
    expect(circle[0]!.detail).toMatch(/leads back/);
  });

  it('a study’s code can stand in an address', () => {
    expect(createStudyBody.safeParse({ code: 'KLD-301', title: 'T', sponsorName: 'S' }).success).toBe(true);
    for (const code of ['', ' ', '../x', 'a/b', 'KLD 301', '-1', 'x'.repeat(41)])
      expect(pointers(createStudyBody, { code, title: 'T', sponsorName: 'S' })).toContain('/code');
  });
});

describe('rules across sections', () => {
  it('names what is not saved yet', () => {
    expect(planFaults({ milestones: PLAN.milestones }).map((fault) => fault.pointer)).toEqual([
      '/enrolment',
      '/events',
      '/simulation',
    ]);
  });

  it('events without a model, and counts that enrolment never reaches', () => {
    const found = planFaults({ ...PLAN, enrolment: { ...PLAN.enrolment, target: 899 }, events: null });
    expect(found.map((fault) => fault.pointer)).toEqual(['/milestones/0/count', '/milestones/1/kind']);
    expect(found[0]!.detail).toContain('899');
    expect(planFaults(PLAN)).toEqual([]);
  });
});

describe('what the engine does not compute', () => {
  it('is refused with the plan, not at its first run', () => {
    const aged: Plan = {
      ...PLAN,
      enrolment: {
        ...PLAN.enrolment,
        ageing: { basis: 'plan', floor: 0.5, months: 8 },
        countryCaps: [{ country: 'DE', cap: 150 }],
      },
    };
    expect(planFaults(aged).map((fault) => fault.pointer)).toEqual(['/enrolment/ageing', '/enrolment/countryCaps']);
  });

  it('is not offered: the families are the engine’s', () => {
    expect([...OFFERED_FAMILIES].sort()).toEqual([...FAMILY_NAMES].sort());
  });
});

describe('two versions', () => {
  const after: Plan = {
    ...PLAN,
    enrolment: {
      ...PLAN.enrolment,
      target: 960,
      countryRates: [{ country: 'PL', meanPerMonth: 0.8 }],
      rampUp: undefined,
    },
    milestones: [
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: 190, plannedOn: '2029-02-28' },
      ...PLAN.milestones.filter((one) => one.code === 'LPI' || one.code === 'FU'),
    ],
  };

  it('are told field by field in words, old and new; a moved row is no change', () => {
    expect(comparePlans(PLAN, after)).toEqual([
      { field: 'enrolment.target', label: 'Patients to randomise', old: '900', new: '960' },
      { field: 'enrolment.countryRates.PL', label: 'Mean rate in Poland', old: 'none', new: '0.8 a month' },
      {
        field: 'enrolment.rampUp',
        label: 'First months of a site',
        old: '2 months at 50\u00a0% of its rate',
        new: 'none',
      },
      { field: 'milestones.IA.waits', label: 'IA, falls due at', old: '180 events', new: '190 events' },
      { field: 'milestones.IA.plannedOn', label: 'IA, planned for', old: '31 Jan 2029', new: '28 Feb 2029' },
      { field: 'milestones.PA.name', label: 'PA, name', old: 'Primary analysis', new: 'none' },
      { field: 'milestones.PA.waits', label: 'PA, falls due at', old: 'all of IA, FU', new: 'none' },
    ]);
    expect(comparePlans(PLAN, structuredClone(PLAN))).toEqual([]);
  });

  it('leave raw values in the trail', () => {
    const changes = planChanges(PLAN, after);
    expect(changes).toContainEqual({ field: 'enrolment.target', old: 900, new: 960 });
    expect(changes).toContainEqual({ field: 'milestones.IA.count', old: 180, new: 190 });
    expect(changes).toContainEqual({ field: 'milestones.PA.of', old: ['IA', 'FU'], new: null });
    expect(changes.map((change) => change.field)).not.toContain('milestones.LPI.count');
  });

  it('are the same however their members are ordered', () => {
    const turned = Object.fromEntries(Object.entries(PLAN).reverse());
    expect(sameValue(PLAN, turned)).toBe(true);
    expect(sameValue(PLAN, { ...PLAN, events: null })).toBe(false);
    expect(sameValue(null, undefined)).toBe(true);
  });
});

describe('milestones', () => {
  it.each([
    ['Interim analysis', [], 'IA'],
    ['Interim analysis', ['IA'], 'IA2'],
    ['12-month follow-up', [], '12MFU'],
    ['Élan', [], 'E'],
    ['', ['M1'], 'M2'],
  ])('%s beside %j has the code %s', (name, taken, code) => {
    expect(milestoneCode(name, taken)).toBe(code);
  });

  const forecast = (probabilityByPlanned: number | null): MilestoneForecast => ({
    code: 'IA',
    name: 'Interim analysis',
    kind: 'events',
    count: 180,
    plannedOn: '2029-01-31',
    reachedOn: null,
    probabilityReached: 1,
    probabilityByPlanned,
    quantiles: {
      '0.025': null,
      '0.05': null,
      '0.1': null,
      '0.25': null,
      '0.5': '2029-03-04',
      '0.75': null,
      '0.9': null,
      '0.95': null,
      '0.975': null,
    },
    monteCarloErrorDays: 1,
    density: [],
  });

  it('a plan that hardly meets its own date gets a second look, from just under one in five', () => {
    expect(secondLook(forecast(0.14))).toBe(
      'Interim analysis: on its own figures the plan meets 31 Jan 2029 in 14\u00a0% of futures. A date with an even chance is 4 Mar 2029.',
    );
    expect(secondLook(forecast(0.2))).toBeNull();
    expect(secondLook(forecast(null))).toBeNull();
    expect(secondLook({ ...forecast(0.1), plannedOn: null })).toBeNull();
  });
});
