import { beforeAll, describe, expect, it, vi } from 'vitest';
import { GET as listPeopleRoute } from '@/app/api/v1/studies/[code]/people/route';
import { getAuth } from '@/lib/auth/auth';
import { safeNextPath } from '@/lib/auth/next-path';
import { getOrm } from '@/lib/db/orm';
import { env } from '@/lib/env';
import { listPeopleOperation } from '@/lib/people/operations';
import { passwordFault } from '@/lib/people/rules';
import { createScene, type Scene, signIn } from '@/tests/support/scene';

vi.hoisted(() => {
  process.env.KALENDS_SIGN_IN_ATTEMPTS = '40';
});

let scene: Scene;
beforeAll(async () => {
  scene = await createScene();
});

function post(path: string, body: unknown, headers: Record<string, string> = {}): Promise<Response> {
  return getAuth().handler(
    new Request(`${env().origin}/api/auth${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin: env().origin, ...headers },
      body: JSON.stringify(body),
    }),
  );
}

const asManager = (cookie: string) =>
  scene.call(listPeopleRoute, listPeopleOperation, { as: 'stranger', headers: { cookie } });

describe('a session', () => {
  it('ends with signing out', async () => {
    const cookie = await signIn(scene.people.manager.email);
    expect((await asManager(cookie)).status).toBe(200);
    expect((await post('/sign-out', {}, { cookie })).status).toBe(200);
    expect((await asManager(cookie)).status).toBe(401);
  });

  it('ends twelve hours after it began, however much it is used', async () => {
    const cookie = await signIn(scene.people.manager.email);
    const token = decodeURIComponent(/session_token=([^;]+)/.exec(cookie)![1]!).split('.')[0]!;
    const change = `update session set created_at = now() - interval '12 hours 1 minute' where token = ? returning id`;
    expect(await getOrm().em.fork().execute(change, [token])).toHaveLength(1);
    expect((await asManager(cookie)).status).toBe(401);
  });

  it('ends after half an hour without use', async () => {
    const cookie = await signIn(scene.people.manager.email);
    const token = decodeURIComponent(/session_token=([^;]+)/.exec(cookie)![1]!).split('.')[0]!;
    const [row] = await getOrm()
      .em.fork()
      .execute(`select extract(epoch from expires_at - now())::int as seconds from session where token = ?`, [token]);
    expect(row.seconds).toBeGreaterThan(29 * 60);
    expect(row.seconds).toBeLessThanOrEqual(30 * 60);
    await getOrm()
      .em.fork()
      .execute(`update session set expires_at = now() - interval '1 second' where token = ?`, [token]);
    expect((await asManager(cookie)).status).toBe(401);
  });

  it('a cookie that was altered is no session', async () => {
    const cookie = await signIn(scene.people.manager.email);
    const altered = cookie.replace(
      /session_token=(.)/,
      (_, first: string) => `session_token=${first === 'a' ? 'b' : 'a'}`,
    );
    expect((await asManager(altered)).status).toBe(401);
  });

  it('travels in a cookie that scripts and other sites cannot use', async () => {
    const response = await post('/sign-in/email', {
      email: scene.people.sponsor.email,
      password: 'seven quiet herons wade',
    });
    const cookie = response.headers.getSetCookie().find((value) => value.includes('session_token'))!;
    expect(cookie).toMatch(/HttpOnly/i);
    expect(cookie).toMatch(/SameSite=Lax/i);
  });
});

describe('signing in', () => {
  it('answers alike for a wrong password and an unknown address', async () => {
    const wrong = await post('/sign-in/email', { email: scene.people.sponsor.email, password: 'not the right words' });
    const unknown = await post('/sign-in/email', { email: 'nobody@example.test', password: 'not the right words' });
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    expect(await wrong.text()).toBe(await unknown.text());
  });

  it('nobody signs up alone', async () => {
    const reply = await post('/sign-up/email', {
      email: 'new@example.test',
      password: 'seven quiet herons wade',
      name: 'New',
    });
    expect(reply.status).toBeGreaterThanOrEqual(400);
    expect(await getOrm().em.fork().execute(`select 1 from person where email = 'new@example.test'`)).toEqual([]);
  });

  it('of a hundred guesses, each with another forwarded address, at most the limit get through', async () => {
    const statuses: number[] = [];
    for (let guess = 0; guess < 100; guess += 1) {
      const headers = { 'x-forwarded-for': `198.51.100.${guess}` };
      statuses.push(
        (await post('/sign-in/email', { email: scene.people.owner.email, password: `guess number ${guess}` }, headers))
          .status,
      );
    }
    expect(statuses.filter((status) => status !== 429).length).toBeLessThanOrEqual(40);
    expect(statuses.at(-1)).toBe(429);
  });
});

describe('where signing in leads', () => {
  it.each([
    '//elsewhere.example',
    '/\\elsewhere.example',
    'https://elsewhere.example',
    'javascript:alert(1)',
    '/api/auth/sign-out',
    '',
    null,
  ])('%s is not followed', (next) => {
    expect(safeNextPath(next)).toBe('/studies');
  });
  it('a path of this site is', () =>
    expect(safeNextPath('/studies/KLD-301/timeline?x=1')).toBe('/studies/KLD-301/timeline?x=1'));
});

describe('a password', () => {
  const person = { name: 'Nia Coe', email: 'nia.coe@example.test' };
  it.each(['password1234', '123456789012', 'qwertyuiop12', 'aaaaaaaaaaaa', 'nia.coe nia.coe'])(
    '%s is refused',
    (password) => {
      expect(passwordFault(password, person)).not.toBeNull();
    },
  );
  it('a few words in a row pass', () => expect(passwordFault('nine slow otters drift', person)).toBeNull());
});
