/**
 * The one table of who may do what. `authorise()` reads it, the pages show its sentences, the role matrix test compares
 * it with an expected table written by hand.
 */

export const STUDY_ROLES = ['statistician', 'manager', 'coordinator', 'sponsor'] as const;
export type StudyRole = (typeof STUDY_ROLES)[number];

/** A study role, or the organisation's owner acting on a study without a role in it. */
export type ActingRole = StudyRole | 'owner';

export const ROLE_NAMES: Record<ActingRole, string> = {
  statistician: 'protocol statistician',
  manager: 'trial manager',
  coordinator: 'site coordinator',
  sponsor: 'sponsor viewer',
  owner: 'organisation owner',
};

interface Permission {
  /** Completes "May …". */
  sentence: string;
  roles: readonly ActingRole[];
}

export const STUDY_PERMISSIONS = {
  'study:read': {
    sentence: 'see that the study exists, its code and title',
    roles: ['statistician', 'manager', 'coordinator', 'sponsor', 'owner'],
  },
  'plan:read': { sentence: 'read the plan and its versions', roles: ['statistician', 'manager'] },
  'plan:save': { sentence: 'set up and change the plan', roles: ['statistician'] },
  'sites:read': { sentence: 'see every site', roles: ['statistician', 'manager'] },
  'sites:change': {
    sentence: 'add sites and record activations, closures and caps',
    roles: ['statistician', 'manager'],
  },
  'site-log:read': {
    sentence: 'read site logs (a coordinator: their own)',
    roles: ['statistician', 'manager', 'coordinator'],
  },
  'site-log:log': { sentence: 'log the month of their own site', roles: ['coordinator'] },
  'site-log:correct': { sentence: 'correct a logged month of their own site, with a reason', roles: ['coordinator'] },
  'data-cuts:read': { sentence: 'see data cuts', roles: ['statistician'] },
  'data-cuts:accept': { sentence: 'upload and accept data cuts', roles: ['statistician'] },
  'forecasts:read': { sentence: 'see runs that are not published', roles: ['statistician'] },
  'forecasts:run': { sentence: 'run and cancel forecasts', roles: ['statistician'] },
  'publications:publish': { sentence: 'publish a forecast to the sponsor', roles: ['statistician'] },
  'publications:read': { sentence: 'read published forecasts', roles: ['statistician', 'manager', 'sponsor'] },
  'publications:acknowledge': { sentence: 'acknowledge the cautions of a publication', roles: ['sponsor'] },
  'alerts:read': { sentence: 'see alert rules and what was sent', roles: ['statistician'] },
  'alerts:change': { sentence: 'set alert rules', roles: ['statistician'] },
  'people:read': { sentence: 'see who has a role in the study', roles: ['statistician', 'manager', 'owner'] },
  'people:invite': { sentence: 'invite people to the study and end their access', roles: ['manager', 'owner'] },
  'audit:read': { sentence: "read the study's trail", roles: ['statistician', 'owner'] },
} as const satisfies Record<string, Permission>;

export type StudyAction = keyof typeof STUDY_PERMISSIONS;

export const ORGANISATION_PERMISSIONS = {
  'organisation:read': { sentence: 'see the organisation, its people and its studies’ names', roles: ['owner'] },
  'organisation:create-study': { sentence: 'create studies', roles: ['owner'] },
  'organisation:invite': { sentence: 'invite further owners and the statisticians of a study', roles: ['owner'] },
} as const satisfies Record<string, Permission>;

export type OrganisationAction = keyof typeof ORGANISATION_PERMISSIONS;

export function roleMay(role: ActingRole, action: StudyAction): boolean {
  return (STUDY_PERMISSIONS[action].roles as readonly ActingRole[]).includes(role);
}
