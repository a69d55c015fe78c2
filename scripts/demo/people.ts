import { randomBytes, randomUUID } from 'node:crypto';
import { hashPassword } from 'better-auth/crypto';
import { Account } from '@/entities/account';
import { Organisation } from '@/entities/organisation';
import { OrganisationMember } from '@/entities/organisation-member';
import { Person } from '@/entities/person';
import { StudyMember } from '@/entities/study-member';
import { ROLE_NAMES, type ActingRole, type StudyRole } from '@/lib/auth/permissions';
import type { Actor } from '@/lib/auth/scope';
import { transact } from '@/lib/db/transaction';

/** An account of the demonstration, as it is printed at the first start. */
export interface DemoAccount {
  name: string;
  role: string;
  email: string;
  password: string;
}

export interface DemoPerson extends Actor {
  account: DemoAccount | null;
}

/** Short words that read well aloud; four of them from chance make a password that can be typed. */
const WORDS =
  'amber barley cedar delta ember fennel gravel harbour indigo juniper kettle lantern meadow nutmeg orchard pebble quartz ripple saffron thistle umber violet willow yarrow'.split(
    ' ',
  );

function makePassword(): string {
  return [...randomBytes(5)].map((byte) => WORDS[byte % WORDS.length]).join(' ') + ` ${randomBytes(2).readUInt16BE()}`;
}

export async function makeOrganisation(name: string, at: string): Promise<string> {
  const id = randomUUID();
  await transact({ organisationId: id }, async (em) => {
    await em.insert(Organisation, { id, name, isDemonstration: true, createdAt: new Date(at) });
  });
  return id;
}

/** A person, with an account where somebody is meant to sign in as them. */
export async function makePerson(
  name: string,
  email: string,
  role: ActingRole | null,
  at: string,
): Promise<DemoPerson> {
  const personId = randomUUID();
  const createdAt = new Date(at);
  const account = role ? { name, role: ROLE_NAMES[role], email, password: makePassword() } : null;
  const password = account ? await hashPassword(account.password) : null;
  await transact({ personId }, async (em) => {
    await em.insert(Person, { id: personId, name, email, emailVerified: true, createdAt, updatedAt: createdAt });
    if (!password) return;
    const key = { id: randomUUID(), accountId: personId, providerId: 'credential', userId: personId };
    await em.insert(Account, { ...key, password, createdAt, updatedAt: createdAt });
  });
  return { personId, name, email, account };
}

export async function makeOwner(organisationId: string, person: Actor, at: string): Promise<void> {
  await transact({ organisationId }, async (em) => {
    const key = { id: randomUUID(), organisationId, personId: person.personId, createdAt: new Date(at) };
    await em.insert(OrganisationMember, { ...key, role: 'owner' });
  });
}

interface Membership {
  organisationId: string;
  studyId: string;
  role: StudyRole;
  siteId?: string;
}

export async function giveRole(person: Actor, membership: Membership, at: string): Promise<void> {
  const { organisationId, studyId, role, siteId = null } = membership;
  await transact({ organisationId }, async (em) => {
    const key = { id: randomUUID(), organisationId, studyId, personId: person.personId, createdAt: new Date(at) };
    await em.insert(StudyMember, { ...key, role, siteId });
  });
}
