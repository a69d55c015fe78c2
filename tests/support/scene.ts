import { randomUUID } from 'node:crypto';
import { hashPassword } from 'better-auth/crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import { Account } from '@/entities/account';
import { Organisation } from '@/entities/organisation';
import { OrganisationMember } from '@/entities/organisation-member';
import { Person } from '@/entities/person';
import { Site } from '@/entities/site';
import { Study } from '@/entities/study';
import { StudyMember } from '@/entities/study-member';
import type { CommandContext } from '@/lib/audit/record';
import { getAuth } from '@/lib/auth/auth';
import { authoriseStudy } from '@/lib/auth/authorise';
import type { StudyAction, StudyRole } from '@/lib/auth/permissions';
import type { Actor, StudyScope } from '@/lib/auth/scope';
import { fixedClock } from '@/lib/clock';
import { transact } from '@/lib/db/transaction';
import { env } from '@/lib/env';
import { addressOf } from '@/lib/http/client';
import type { Operation } from '@/lib/http/operation';

/**
 * Two organisations with a study each and one person per role: the stage of every test of a route. Everything goes
 * through the real tables as the application's own database role.
 */
const PASSWORD = 'seven quiet herons wade';
let passwordHash: string | undefined;

export interface Persona extends Actor {
  cookie: string;
}

export const PERSONAS = [
  'owner',
  'statistician',
  'manager',
  'coordinator',
  'otherCoordinator',
  'sponsor',
  'foreigner',
  'stranger',
] as const;
export type PersonaName = (typeof PERSONAS)[number];

export interface Scene {
  organisationId: string;
  studyId: string;
  /** The study of `foreigner`, in another organisation; nobody else has a role in it. */
  foreignStudyCode: string;
  studyCode: string;
  siteId: string;
  otherSiteId: string;
  /** `stranger` has no session at all. */
  people: Record<Exclude<PersonaName, 'stranger'>, Persona>;
  call: (handler: RouteHandler, operation: Operation, input: CallInput) => Promise<Reply>;
  /** Runs a command or query as somebody, in a committed transaction, past the HTTP layer. */
  act: <A extends StudyAction, T>(
    as: Exclude<PersonaName, 'stranger'>,
    action: A,
    work: (scope: StudyScope<A>, context: CommandContext) => Promise<T>,
    at?: string,
  ) => Promise<T>;
}

export type RouteHandler = (
  request: Request,
  context: { params: Promise<Record<string, string | string[] | undefined>> },
) => Promise<Response>;

interface CallInput {
  as: PersonaName;
  params?: Record<string, string | number>;
  query?: Record<string, unknown>;
  body?: unknown;
  file?: { name: string; text?: string; bytes?: Uint8Array };
  headers?: Record<string, string>;
}

/** Whatever a reply holds: tests assert on the fields they need. */
export type ReplyJson = ReturnType<typeof JSON.parse>;

export interface Reply {
  status: number;
  json: ReplyJson;
  text: string;
  headers: Headers;
}

export async function createScene(): Promise<Scene> {
  const suffix = randomUUID().slice(0, 8);
  const home = await makeStudy(`Hazelmoor Biometrics ${suffix}`, `HZM-${suffix}`);
  const abroad = await makeStudy(`Farside Research ${suffix}`, `FAR-${suffix}`);
  const add = (name: string, role: StudyRole | 'owner', siteId: string | null = null) =>
    makePerson(home, `${name} ${suffix}`, role, siteId);
  const people = {
    owner: await add('Odile Ferrand', 'owner'),
    statistician: await add('Stellan Brandt', 'statistician'),
    manager: await add('Marta Oyelaran', 'manager'),
    coordinator: await add('Corin Adair', 'coordinator', home.siteId),
    otherCoordinator: await add('Orla Vance', 'coordinator', home.otherSiteId),
    sponsor: await add('Sabine Lorne', 'sponsor'),
    foreigner: await makePerson(abroad, `Fenno Aalto ${suffix}`, 'statistician', null),
  };
  return {
    ...home,
    foreignStudyCode: abroad.studyCode,
    people,
    call: (handler, operation, input) =>
      call(handler, operation, { ...input, params: { code: home.studyCode, ...input.params } }, people),
    act: (as, action, work, at) =>
      transact({ personId: people[as].personId }, async (em) => {
        const scope = await authoriseStudy(em, people[as], home.studyCode, action);
        return work(scope, {
          em,
          clock: at ? fixedClock(at) : { now: () => new Date() },
          requestId: null,
          source: 'api',
        });
      }),
  };
}

interface Home {
  organisationId: string;
  studyId: string;
  studyCode: string;
  siteId: string;
  otherSiteId: string;
}

async function makeStudy(name: string, studyCode: string): Promise<Home> {
  const home = {
    organisationId: randomUUID(),
    studyId: randomUUID(),
    studyCode,
    siteId: randomUUID(),
    otherSiteId: randomUUID(),
  };
  const now = new Date('2026-01-01T08:00:00Z');
  const clerk = randomUUID();
  await transact({ organisationId: home.organisationId }, async (em) => {
    await insertPerson(em, clerk, 'Set-up clerk', `${clerk}@example.test`, null);
    await em.insert(Organisation, { id: home.organisationId, name, isDemonstration: false, createdAt: now });
    await em.insert(Study, {
      id: home.studyId,
      organisationId: home.organisationId,
      code: studyCode,
      title: 'Ostrelin in adults with gout',
      sponsorName: 'Tarn Medicines',
      createdAt: now,
      createdBy: clerk,
    });
    for (const [id, code] of [
      [home.siteId, '101'],
      [home.otherSiteId, '102'],
    ] as const) {
      await em.insert(Site, {
        id,
        organisationId: home.organisationId,
        studyId: home.studyId,
        code,
        name: `Clinic ${code}`,
        city: 'Leith',
        country: 'GB',
        activatedOn: '2026-02-10',
        cap: 40,
        createdAt: now,
      });
    }
  });
  return home;
}

async function insertPerson(
  em: EntityManager,
  id: string,
  name: string,
  email: string,
  password: string | null,
): Promise<void> {
  const now = new Date();
  await em.insert(Person, { id, name, email, emailVerified: true, createdAt: now, updatedAt: now });
  if (password)
    await em.insert(Account, {
      id: randomUUID(),
      accountId: id,
      providerId: 'credential',
      userId: id,
      password,
      createdAt: now,
      updatedAt: now,
    });
}

async function makePerson(
  home: Home,
  name: string,
  role: StudyRole | 'owner',
  siteId: string | null,
): Promise<Persona> {
  const personId = randomUUID();
  const email = `${name.toLowerCase().replaceAll(' ', '.')}@example.test`;
  passwordHash ??= await hashPassword(PASSWORD);
  const { organisationId, studyId } = home;
  await transact({ organisationId }, async (em) => {
    await insertPerson(em, personId, name, email, passwordHash!);
    const key = { id: randomUUID(), organisationId, personId, createdAt: new Date() };
    if (role === 'owner') await em.insert(OrganisationMember, { ...key, role });
    else await em.insert(StudyMember, { ...key, studyId, role, siteId });
  });
  return { personId, name, email, cookie: await signIn(email) };
}

export async function signIn(email: string, password = PASSWORD): Promise<string> {
  const response = await getAuth().handler(
    new Request(`${env().origin}/api/auth/sign-in/email`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin: env().origin },
      body: JSON.stringify({ email, password }),
    }),
  );
  if (!response.ok) throw new Error(`sign-in of ${email} answered ${response.status}: ${await response.text()}`);
  return response.headers
    .getSetCookie()
    .map((cookie) => cookie.split(';')[0])
    .join('; ');
}

async function call(
  handler: RouteHandler,
  operation: Operation,
  input: CallInput,
  people: Scene['people'],
): Promise<Reply> {
  const headers = new Headers({ origin: env().origin, ...input.headers });
  if (input.as !== 'stranger') headers.set('cookie', people[input.as].cookie);
  let body: BodyInit | undefined;
  if (input.file) {
    const form = new FormData();
    form.set('file', new File([(input.file.bytes ?? input.file.text ?? '') as BlobPart], input.file.name));
    for (const [key, value] of Object.entries((input.body ?? {}) as Record<string, unknown>))
      form.set(key, typeof value === 'string' ? value : JSON.stringify(value));
    body = form;
  } else if (operation.method !== 'GET' && operation.method !== 'DELETE') {
    if (!headers.has('content-type')) headers.set('content-type', 'application/json');
    body = typeof input.body === 'string' ? input.body : JSON.stringify(input.body ?? {});
  }
  const request = new Request(env().origin + addressOf(operation, input.params, input.query), {
    method: operation.method,
    headers,
    body,
  });
  const params = Object.fromEntries(Object.entries(input.params ?? {}).map(([key, value]) => [key, String(value)]));
  const used = Object.fromEntries(
    [...operation.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => [name!, params[name!]!]),
  );
  const response = await handler(request, { params: Promise.resolve(used) });
  const text = await response.text();
  const isJson = response.headers.get('content-type')?.includes('json');
  return { status: response.status, text, json: isJson ? JSON.parse(text) : {}, headers: response.headers };
}
