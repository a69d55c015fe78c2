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
  'GET /api/v1/studies/{code}/audit': ['owner', ...S],
  'GET /api/v1/studies/{code}/people': ['owner', 'statistician', 'manager'],
  'DELETE /api/v1/studies/{code}/people/{id}': ['owner', 'manager'],
  'POST /api/v1/studies/{code}/people/invitations': ['owner', 'manager'],
  'DELETE /api/v1/studies/{code}/people/invitations/{id}': ['owner', 'manager'],
};
