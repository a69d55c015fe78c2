/** The contract's own example, with the parts that every reader computes; tests change one thing at a time. */
export function exampleStudy() {
  return {
    format: 'kalends-study/1',
    study: { code: 'KLD-301', title: 'An invented study' },
    dataCutoff: '2027-03-31',
    enrolment: {
      target: 1200,
      rate: { meanPerMonth: 0.55, cv: 0.8, basis: 'data' },
      countryRates: [{ country: 'PL', meanPerMonth: 0.8 }],
      seasonality: [1, 1, 1, 1, 1, 1, 0.7, 0.7, 1, 1, 1, 0.8],
      rampUp: { months: 2, fraction: 0.5 },
      sites: [
        {
          code: '101',
          country: 'PL',
          activatedOn: '2026-02-10',
          closedOn: null,
          cap: 40,
          randomised: 3,
          loggedThrough: '2027-03-31',
          unlogged: ['2026-11'],
          monthly: [
            { month: '2026-03', randomised: 2 },
            { month: '2026-04', randomised: 1 },
          ],
        },
        {
          code: '151',
          country: 'DE',
          cap: 40,
          planned: { earliest: '2027-05-01', likely: '2027-05-31', latest: '2027-08-29' },
        },
      ],
    },
    events: {
      model: { family: 'weibull', medianMonths: 20, shape: 1, basis: 'data', priorEvents: 5 },
      dropout: { perMonth: 0.02, basis: 'data', priorEvents: 5 },
      followUpMonths: null,
      subjects: [
        { id: '0001', site: '101', randomisedOn: '2026-03-02', status: 'event', statusOn: '2026-09-12' },
        { id: '0002', site: '101', randomisedOn: '2026-03-20', status: 'withdrawn', statusOn: '2026-12-01' },
        { id: '0003', site: '101', randomisedOn: '2026-04-07', status: 'at-risk', statusOn: '2027-03-31' },
      ],
    },
    milestones: [
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: 288, plannedOn: '2028-01-31' },
      { code: 'FA', name: 'Final analysis', kind: 'events', count: 480 },
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 1200 },
      { code: 'FU12', name: '12-month follow-up', kind: 'follow-up', months: 12 },
      { code: 'PA', kind: 'all-of', of: ['FA', 'FU12'] },
    ],
    simulation: { draws: 500, seed: 1, horizonMonths: 120 },
  };
}

type Json = ReturnType<typeof JSON.parse>;

/** The example with one member set (or, with `undefined`, left out) by its JSON Pointer. */
export function exampleWith(...changes: [pointer: string, value: unknown][]): Json {
  const study: Json = exampleStudy();
  for (const [pointer, value] of changes) {
    const parts = pointer.slice(1).split('/');
    const last = parts.pop()!;
    const holder = parts.reduce((member: Json, part) => member[part], study);
    if (value === undefined) delete holder[last];
    else holder[last] = value;
  }
  return study;
}
