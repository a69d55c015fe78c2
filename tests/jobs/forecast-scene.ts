import { randomUUID } from 'node:crypto';
import { PlanVersion } from '@/entities/plan-version';
import { acceptCut } from '@/lib/data-cuts/commands';
import type { CutView } from '@/lib/data-cuts/schema';
import { transact } from '@/lib/db/transaction';
import { logMonth } from '@/lib/site-log/commands';
import type { Plan } from '@/lib/studies/schema';
import { type LocalServer, startLocalServer } from '@/tests/machine/local-servers';
import type { Scene } from '@/tests/support/scene';

/** A small plan with a date of each kind. */
export const plan: Plan = {
  enrolment: { target: 60, rate: { meanPerMonth: 1.5, cv: 0.6, basis: 'data' } },
  events: {
    model: { family: 'exponential', medianMonths: 14, basis: 'data', priorEvents: 4 },
    dropout: { perMonth: 0.01, basis: 'data', priorEvents: 4 },
    followUpMonths: null,
  },
  milestones: [
    { code: 'IA', name: 'Interim analysis', kind: 'events', count: 20, plannedOn: '2027-06-30' },
    { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 60, plannedOn: '2027-03-31' },
    { code: 'FU6', name: '6 months after last patient in', kind: 'follow-up', months: 6 },
    { code: 'PA', name: 'Primary analysis', kind: 'all-of', of: ['IA', 'FU6'] },
  ],
  simulation: { draws: 1000, seed: 7, horizonMonths: 60 },
};

export async function savePlan(scene: Scene, number = 1, changed: Plan = plan): Promise<void> {
  await transact({ organisationId: scene.organisationId }, (em) =>
    em.insert(PlanVersion, {
      id: randomUUID(),
      organisationId: scene.organisationId,
      studyId: scene.studyId,
      number,
      plan: changed,
      reasonKind: null,
      reason: null,
      createdAt: new Date('2026-02-01T09:00:00Z'),
      createdBy: scene.people.statistician.personId,
    }),
  );
}

/** Two months of the scene's two sites, all logged. */
export async function logSites(scene: Scene): Promise<void> {
  for (const [as, site, counts] of [
    ['coordinator', '101', { '2026-02': 0, '2026-03': 2, '2026-04': 1 }],
    ['otherCoordinator', '102', { '2026-02': 1, '2026-03': 0, '2026-04': 2 }],
  ] as const) {
    for (const [month, randomised] of Object.entries(counts)) {
      const cells = { screened: randomised + 1, failed: 1, randomised, events: 0, withdrawn: 0 };
      await scene.act(
        as,
        'site-log:log',
        (scope, context) =>
          logMonth(scope, { params: { site, month }, body: { version: null, source: 'screen', cells } }, context),
        '2026-06-02T09:00:00Z',
      );
    }
  }
}

export const CUTOFF = '2026-04-30';

const LISTING = `subject,site,randomised on,status,status on
0001,101,2026-03-02,event,2026-04-12
0002,101,2026-03-20,at-risk,2026-04-30
0003,101,2026-04-21,at-risk,2026-04-30
0004,102,2026-02-19,withdrawn,2026-04-02
0005,102,2026-04-02,at-risk,2026-04-30
0006,102,2026-04-28,at-risk,2026-04-30
`;

export function cutData(scene: Scene): Promise<CutView> {
  const file = { name: 'listing.csv', bytes: new TextEncoder().encode(LISTING) };
  return scene.act('statistician', 'data-cuts:accept', (scope, context) =>
    acceptCut(scope, { file, body: { cutoffOn: CUTOFF, note: null } }, context),
  );
}

/** A file store of the test's own; before the first look at the environment. */
export async function startFileStore(): Promise<LocalServer> {
  const keys = { S3_ACCESS_KEY: 'access-of-this-test', S3_SECRET_KEY: 'secret-of-this-test' };
  const store = await startLocalServer('local-files', (folder) => ({ ...keys, KALENDS_FILES_FOLDER: folder }));
  Object.assign(process.env, keys, { S3_ENDPOINT: `http://127.0.0.1:${store.port}` });
  return store;
}
