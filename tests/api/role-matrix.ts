import type { PersonaName } from '@/tests/support/scene';

type Allowed = readonly Exclude<PersonaName, 'foreigner'>[] | readonly PersonaName[];

const everyone = [
  'owner',
  'statistician',
  'manager',
  'coordinator',
  'otherCoordinator',
  'sponsor',
  'foreigner',
  'stranger',
] as const;
const signedIn = [
  'owner',
  'statistician',
  'manager',
  'coordinator',
  'otherCoordinator',
  'sponsor',
  'foreigner',
] as const;
const S = ['statistician'] as const;

/** Routes that are no operations: the sign-in service, and what a watchdog asks. */
export const NO_OPERATION = ['GET /api/auth/{...all}', 'POST /api/auth/{...all}', 'GET /api/health', 'GET /api/ready'];

/** Written by hand, from the roles' table of the README: who gets past the permission check of each route. */
export const EXPECTED: Record<string, Allowed> = {
  'POST /api/v1/invitations/accept': everyone,
  'POST /api/v1/invitations/join': signedIn,
  'POST /api/v1/organisation/invitations': ['owner'],
  'GET /api/v1/studies': signedIn,
  'POST /api/v1/studies': ['owner'],
  'GET /api/v1/studies/{code}': ['owner', 'statistician', 'manager', 'coordinator', 'otherCoordinator', 'sponsor'],
  'GET /api/v1/studies/{code}/alerts': S,
  'GET /api/v1/studies/{code}/alerts/rules': S,
  'POST /api/v1/studies/{code}/alerts/rules': S,
  'PUT /api/v1/studies/{code}/alerts/rules/{id}': S,
  'DELETE /api/v1/studies/{code}/alerts/rules/{id}': S,
  'GET /api/v1/studies/{code}/audit': ['owner', 'statistician'],
  'GET /api/v1/studies/{code}/data-cuts': S,
  'POST /api/v1/studies/{code}/data-cuts': S,
  'POST /api/v1/studies/{code}/data-cuts/preview': S,
  'POST /api/v1/studies/{code}/data-cuts/aggregate': S,
  'GET /api/v1/studies/{code}/data-cuts/{number}': S,
  'GET /api/v1/studies/{code}/data-cuts/{number}/file': S,
  'GET /api/v1/studies/{code}/forecasts': S,
  'POST /api/v1/studies/{code}/forecasts': S,
  'GET /api/v1/studies/{code}/forecasts/{number}': S,
  'POST /api/v1/studies/{code}/forecasts/{number}/cancel': S,
  'GET /api/v1/studies/{code}/forecasts/{number}/study-file': S,
  'GET /api/v1/studies/{code}/forecasts/{number}/forecast-file': S,
  'GET /api/v1/studies/{code}/log': ['statistician', 'manager', 'coordinator', 'otherCoordinator'],
  'GET /api/v1/studies/{code}/log/{site}': ['statistician', 'manager', 'coordinator', 'otherCoordinator'],
  'PUT /api/v1/studies/{code}/log/{site}/{month}': ['coordinator', 'otherCoordinator'],
  'PATCH /api/v1/studies/{code}/log/{site}/{month}': ['coordinator', 'otherCoordinator'],
  'GET /api/v1/studies/{code}/people': ['owner', 'statistician', 'manager'],
  'DELETE /api/v1/studies/{code}/people/{id}': ['owner', 'manager'],
  'POST /api/v1/studies/{code}/people/invitations': ['owner', 'manager'],
  'DELETE /api/v1/studies/{code}/people/invitations/{id}': ['owner', 'manager'],
  'GET /api/v1/studies/{code}/plan': ['statistician', 'manager'],
  'GET /api/v1/studies/{code}/plan/comparison': ['statistician', 'manager'],
  'PUT /api/v1/studies/{code}/plan/draft': S,
  'POST /api/v1/studies/{code}/plan/versions': S,
  'GET /api/v1/studies/{code}/plan/versions/{number}': ['statistician', 'manager'],
  'GET /api/v1/studies/{code}/publications': ['statistician', 'manager', 'sponsor'],
  'POST /api/v1/studies/{code}/publications': S,
  'GET /api/v1/studies/{code}/publications/{number}': ['statistician', 'manager', 'sponsor'],
  'POST /api/v1/studies/{code}/publications/{number}/acknowledgement': ['sponsor'],
  'GET /api/v1/studies/{code}/sites': ['statistician', 'manager'],
  'POST /api/v1/studies/{code}/sites': ['statistician', 'manager'],
  'GET /api/v1/studies/{code}/sites/{site}': ['statistician', 'manager'],
  'PUT /api/v1/studies/{code}/sites/{site}': ['statistician', 'manager'],
  'POST /api/v1/studies/{code}/sites/list/preview': ['statistician', 'manager'],
  'POST /api/v1/studies/{code}/sites/list/accept': ['statistician', 'manager'],
};
