import { describe, expect, it } from 'vitest';
import { parseStudyFile } from '@/lib/study-file/parse';
import { exampleStudy, exampleWith } from './example';

/** Every refusal of the contract: which member is pointed at, and that the sentence says what would be right. */
function refusals(study: unknown): { pointer: string; detail: string }[] {
  const parsed = parseStudyFile(JSON.stringify(study));
  return parsed.ok ? [] : parsed.errors;
}

const site = '/enrolment/sites/0';
const planned = '/enrolment/sites/1/planned';
const subject = '/events/subjects/0';
const aggregate = { events: 1, withdrawn: 1, atRisk: 1, personMonths: 20 };

const CASES: [what: string, changes: [string, unknown][], pointer: string, says: RegExp][] = [
  ['a date that is no date', [['/dataCutoff', '2027-02-30']], '/dataCutoff', /YYYY-MM-DD/],
  ['a date in another form', [['/dataCutoff', '31/03/2027']], '/dataCutoff', /YYYY-MM-DD/],
  ['a date before 1990', [[`${site}/activatedOn`, '1989-12-31']], `${site}/activatedOn`, /1990 to 2100/],
  ['another format', [['/format', 'kalends-study/2']], '/format', /kalends-study\/1/],
  ['a missing member', [['/enrolment/target', undefined]], '/enrolment/target', /missing/],
  ['an unknown member', [['/enrolment/targets', 3]], '/enrolment/targets', /no field called/],
  ['an arm', [[`${subject}/arm`, 'A']], `${subject}/arm`, /blinded/],
  ['an ADaM arm', [[`${subject}/TRT01P`, 'A']], `${subject}/TRT01P`, /blinded/],
  [
    'activation after the cut-off',
    [[`${site}/activatedOn`, '2027-04-01']],
    `${site}/activatedOn`,
    /after the data cut-off, 31 Mar 2027/,
  ],
  ['closure before activation', [[`${site}/closedOn`, '2026-02-09']], `${site}/closedOn`, /10 Feb 2026/],
  [
    'neither activation nor window',
    [['/enrolment/sites/1/planned', undefined]],
    '/enrolment/sites/1/activatedOn',
    /planned window/,
  ],
  ['likely before earliest', [[`${planned}/likely`, '2027-04-30']], `${planned}/likely`, /1 May 2027/],
  ['latest before likely', [[`${planned}/latest`, '2027-05-30']], `${planned}/latest`, /31 May 2027/],
  ['a closed site’s patients', [['/enrolment/sites/1/randomised', 2]], '/enrolment/sites/1/randomised', /not active/],
  ['logged beyond the cut-off', [[`${site}/loggedThrough`, '2027-04-01']], `${site}/loggedThrough`, /31 Mar 2027/],
  ['a month not logged after the cut-off', [[`${site}/unlogged`, ['2027-04']]], `${site}/unlogged/0`, /Leave it out/],
  ['months that do not add up', [[`${site}/monthly/0/randomised`, 5]], `${site}/randomised`, /add up to 6, not 3/],
  ['a negative count', [['/enrolment/target', -3]], '/enrolment/target', /1 or more/],
  ['half a patient', [['/enrolment/target', 12.5]], '/enrolment/target', /whole number/],
  ['a rate of nought', [['/enrolment/rate/meanPerMonth', 0]], '/enrolment/rate/meanPerMonth', /above 0/],
  ['a rate as text', [['/enrolment/rate/meanPerMonth', '0.5']], '/enrolment/rate/meanPerMonth', /a number, not text/],
  ['a rate beyond bounds', [['/enrolment/rate/meanPerMonth', 1001]], '/enrolment/rate/meanPerMonth', /1,000 or less/],
  ['a negative weight', [['/events/model/priorEvents', -1]], '/events/model/priorEvents', /0 or more/],
  ['eleven months', [['/enrolment/seasonality', Array(11).fill(1)]], '/enrolment/seasonality', /twelve/],
  [
    'a country twice',
    [
      [
        '/enrolment/countryRates',
        [
          { country: 'PL', meanPerMonth: 1 },
          { country: 'PL', meanPerMonth: 2 },
        ],
      ],
    ],
    '/enrolment/countryRates/1/country',
    /twice/,
  ],
  ['status before randomisation', [[`${subject}/statusOn`, '2026-03-01']], `${subject}/statusOn`, /2 Mar 2026/],
  ['status after the cut-off', [[`${subject}/statusOn`, '2027-04-01']], `${subject}/statusOn`, /31 Mar 2027/],
  [
    'randomised after the cut-off',
    [[`${subject}/randomisedOn`, '2027-04-02']],
    `${subject}/randomisedOn`,
    /31 Mar 2027/,
  ],
  [
    'randomised before the site opened',
    [[`${subject}/randomisedOn`, '2026-02-09']],
    `${subject}/randomisedOn`,
    /10 Feb 2026/,
  ],
  ['a site that no site is', [[`${subject}/site`, '999']], `${subject}/site`, /no site 999/],
  ['a subject twice', [['/events/subjects/1/id', '0001']], '/events/subjects/1/id', /twice/],
  ['a site twice', [['/enrolment/sites/1/code', '101']], '/enrolment/sites/1/code', /twice/],
  [
    'sites and subjects that disagree',
    [
      [`${site}/randomised`, 4],
      [`${site}/monthly`, undefined],
    ],
    `${site}/randomised`,
    /are 3, not 4/,
  ],
  ['subjects and aggregate', [['/events/aggregate', aggregate]], '/events/aggregate', /not both/],
  ['neither of them with basis data', [['/events/subjects', undefined]], '/events/subjects', /Basis “data” needs data/],
  [
    'aggregate beyond the randomised',
    [
      ['/events/subjects', undefined],
      ['/events/aggregate', { ...aggregate, atRisk: 9 }],
      ['/events/model/family', 'exponential'],
    ],
    '/events/aggregate/atRisk',
    /add up to 11/,
  ],
  ['a milestone twice', [['/milestones/1/code', 'IA']], '/milestones/1/code', /twice/],
  ['a part that is no milestone', [['/milestones/4/of', ['FA', 'XX']]], '/milestones/4/of/1', /no milestone XX/],
  ['a milestone in a circle', [['/milestones/4/of', ['FA', 'PA']]], '/milestones/4/of', /leads back/],
  ['events without an events part', [['/events', undefined]], '/milestones/0/kind', /no events part/],
  ['no milestone', [['/milestones', []]], '/milestones', /at least 1/],
  ['no site', [['/enrolment/sites', []]], '/enrolment/sites', /at least 1/],
  ['an unknown kind', [['/milestones/0/kind', 'deaths']], '/milestones/0/kind', /“randomised”, “events”/],
  ['too many draws', [['/simulation/draws', 1_000_001]], '/simulation/draws', /1,000,000 or less/],
  ['a horizon too far', [['/simulation/horizonMonths', 601]], '/simulation/horizonMonths', /600 or less/],
  ['a shape out of bounds', [['/events/model/shape', 21]], '/events/model/shape', /20 or less/],
  ['a spread of nought', [['/enrolment/rate/cv', 0]], '/enrolment/rate/cv', /0.01 or more/],
  ['cuts of another family', [['/events/model/cutsMonths', [6]]], '/events/model/cutsMonths', /piecewise/],
];

describe('a study file', () => {
  it('as the contract writes it is taken', () => expect(refusals(exampleStudy())).toEqual([]));

  it.each(CASES)('is refused for %s', (_what, changes, pointer, says) => {
    const found = refusals(exampleWith(...changes)).find((fault) => fault.pointer === pointer);
    expect(found, JSON.stringify(refusals(exampleWith(...changes)))).toBeDefined();
    expect(found!.detail).toMatch(says);
  });

  it('may leave out what has a default', () => {
    const study = exampleWith(
      ['/simulation', undefined],
      ['/enrolment/sites/1/cap', undefined],
      [`${site}/closedOn`, undefined],
    );
    const parsed = parseStudyFile(JSON.stringify(study));
    expect(parsed).toMatchObject({ ok: true, study: { simulation: { draws: 10_000, seed: 1, horizonMonths: 120 } } });
  });

  it('is told every fault at once, in structure and across members', () => {
    const study = exampleWith(
      ['/enrolment/target', -1],
      [`${subject}/statusOn`, '2026-03-01'],
      ['/milestones/4/of', ['XX']],
      [`${planned}/latest`, '2027-05-02'],
      ['/surprise', 1],
    );
    expect(
      refusals(study)
        .map((fault) => fault.pointer)
        .sort(),
    ).toEqual(
      [
        '/enrolment/sites/1/planned/latest',
        '/enrolment/target',
        '/events/subjects/0/statusOn',
        '/milestones/4/of/0',
        '/surprise',
      ].sort(),
    );
  });

  it('with parts that this engine does not compute is refused, not half computed', () => {
    const study = exampleWith(
      ['/enrolment/ageing', { basis: 'data', floor: 0.5, months: 8 }],
      ['/events/model/family', 'gamma'],
    );
    expect(refusals(study).map((fault) => fault.pointer)).toEqual(['/enrolment/ageing', '/events/model/family']);
  });

  it('names 5,001 sites as too many', () => {
    const sites = Array.from({ length: 5001 }, (_, place) => ({
      code: `S${place}`,
      country: 'PL',
      activatedOn: '2026-02-10',
      randomised: place === 0 ? 3 : 0,
    }));
    const study = exampleWith(['/enrolment/sites', sites], ['/events/subjects', undefined]);
    expect(refusals(study).find((fault) => fault.pointer === '/enrolment/sites')?.detail).toMatch(/at most 5,000/);
  });

  it('with 200,000 subjects is checked within the test’s time', () => {
    const subjects = Array.from({ length: 200_000 }, (_, place) => ({
      id: String(place),
      site: '101',
      randomisedOn: '2026-03-02',
      status: 'at-risk',
      statusOn: '2027-03-31',
    }));
    const study = exampleWith(
      ['/events/subjects', subjects],
      [`${site}/randomised`, 200_000],
      [`${site}/monthly`, undefined],
      [`${site}/cap`, null],
    );
    expect(refusals(study)).toEqual([]);
  });
});

describe('what is no study file at all', () => {
  const whole = (input: Uint8Array | string): string => {
    const parsed = parseStudyFile(input);
    return parsed.ok ? 'taken' : `${parsed.errors.length} ${parsed.errors[0]!.pointer}${parsed.errors[0]!.detail}`;
  };
  const text = JSON.stringify(exampleStudy());

  it('a byte order mark is ignored', () => expect(whole(new TextEncoder().encode(`\uFEFF${text}`))).toBe('taken'));
  it('UTF-16 is named', () => expect(whole(new Uint8Array([0xff, 0xfe, 0x7b, 0x00]))).toMatch(/UTF-16/));
  it('bytes that are not UTF-8 are named', () => expect(whole(new Uint8Array([0x7b, 0xe9, 0x7d]))).toMatch(/UTF-8/));
  it('nothing is named', () => expect(whole('')).toMatch(/empty/));
  it('broken JSON is named with its line', () => expect(whole('{\n "format": ,\n}')).toMatch(/line 2/));
  it('a list is no study', () => expect(whole('[]')).toMatch(/an object, not a list/));
});
