import type { Milestone, Site, Study, Subject } from '@/lib/engine/types';

/** An invented study that is small enough to reason about: known rates (CV 0.01 stands for known), no events part. */
export function smallStudy(change: (study: Study) => void = () => {}): Study {
  const study: Study = {
    format: 'kalends-study/1',
    study: { code: 'S-1', title: 'Small' },
    dataCutoff: '2027-03-31',
    enrolment: {
      target: 100,
      rate: { meanPerMonth: 2, cv: 0.01, basis: 'plan' },
      sites: [site('101', { activatedOn: '2026-10-01', randomised: 12 })],
    },
    milestones: [{ code: 'LPI', kind: 'randomised', count: 100 }],
    simulation: { draws: 2000, seed: 1, horizonMonths: 120 },
  };
  change(study);
  return study;
}

export function site(code: string, change: Partial<Site> = {}): Site {
  return { code, country: 'PL', ...change };
}

export function subject(id: string, change: Partial<Subject> = {}): Subject {
  return { id, site: '101', randomisedOn: '2026-10-01', status: 'at-risk', statusOn: '2027-03-31', ...change };
}

/** Adds an events part with an exponential of known median, no dropout. */
export function withEvents(
  study: Study,
  subjects: Subject[],
  milestones: Milestone[],
  model: Partial<NonNullable<Study['events']>['model']> = {},
): void {
  study.events = {
    model: { family: 'exponential', medianMonths: 12, basis: 'plan', priorEvents: 5, ...model },
    dropout: { perMonth: 0, basis: 'plan', priorEvents: 0 },
    subjects,
  };
  study.milestones = milestones;
}
