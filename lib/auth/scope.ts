import type { ActingRole, OrganisationAction, StudyAction } from './permissions';

/**
 * Proofs of a passed permission check. Only `authorise.ts` makes them (the brand is not exported as a value anywhere
 * else), and queries and commands require them: a forgotten check does not compile.
 */
declare const brand: unique symbol;

export interface Actor {
  personId: string;
  name: string;
  email: string;
}

export interface StudyScope<A extends StudyAction> {
  readonly [brand]: A;
  readonly action: A;
  readonly actor: Actor;
  readonly role: ActingRole;
  readonly organisationId: string;
  readonly organisationName: string;
  readonly isDemonstration: boolean;
  readonly studyId: string;
  readonly studyCode: string;
  /** A coordinator's own site; null for everybody else. */
  readonly siteId: string | null;
}

export interface OrganisationScope<A extends OrganisationAction> {
  readonly [brand]: A;
  readonly action: A;
  readonly actor: Actor;
  readonly role: 'owner';
  readonly organisationId: string;
  readonly organisationName: string;
}

/** Signed in, nothing more. */
export interface PersonScope {
  readonly actor: Actor;
}
