import { beforeAll, describe, expect, it } from 'vitest';
import { POST as accept } from '@/app/api/v1/invitations/accept/route';
import { POST as joinRoute } from '@/app/api/v1/invitations/join/route';
import { POST as inviteOwnerRoute } from '@/app/api/v1/organisation/invitations/route';
import { DELETE as end } from '@/app/api/v1/studies/[code]/people/[id]/route';
import { DELETE as revoke } from '@/app/api/v1/studies/[code]/people/invitations/[id]/route';
import { POST as invite } from '@/app/api/v1/studies/[code]/people/invitations/route';
import { GET as list } from '@/app/api/v1/studies/[code]/people/route';
import { transact } from '@/lib/db/transaction';
import {
  acceptInvitationOperation,
  endMembershipOperation,
  inviteOwnerOperation,
  invitePersonOperation,
  joinOperation,
  listPeopleOperation,
  revokeInvitationOperation,
} from '@/lib/people/operations';
import { createScene, type Scene, signIn } from '@/tests/support/scene';

let scene: Scene;
beforeAll(async () => {
  scene = await createScene();
});

/** The link that the invitation's mail holds: the only place where the token stands. */
async function mailedToken(email: string): Promise<string> {
  const [mail] = await transact({ organisationId: scene.organisationId }, (em) =>
    em.execute<{ template: { url: string } }[]>(
      'select template from mail_message where recipient = ? order by created_at desc limit 1',
      [email],
    ),
  );
  return mail!.template.url.split('/').at(-1)!;
}

const address = (name: string): string => `${name}.${scene.studyCode.toLowerCase()}@example.test`;

describe('an invitation', () => {
  it('goes from the manager by mail to an account with exactly that role, once', async () => {
    const email = address('new.coordinator');
    const invited = await scene.call(invite, invitePersonOperation, {
      as: 'manager',
      body: { name: 'Nia Coe', email, role: 'coordinator', siteCode: '101' },
    });
    expect(invited.status).toBe(201);
    const token = await mailedToken(email);
    const weak = await scene.call(accept, acceptInvitationOperation, {
      as: 'stranger',
      body: { token, name: 'Nia Coe', password: 'password1234' },
    });
    expect(weak.status).toBe(422);
    expect(weak.json.errors[0].pointer).toBe('/password');
    const body = { token, name: 'Nia Coe', password: 'nine slow otters drift' };
    const both = await Promise.all(
      [1, 2].map(() => scene.call(accept, acceptInvitationOperation, { as: 'stranger', body })),
    );
    expect(both.map((reply) => reply.status).sort()).toEqual([201, 404]);
    expect(await signIn(email, body.password)).toContain('session_token');
    const people = await scene.call(list, listPeopleOperation, { as: 'manager' });
    expect(people.json.members).toContainEqual(
      expect.objectContaining({ email, role: 'coordinator', siteCode: '101' }),
    );
  });

  it('says every fault at once', async () => {
    const reply = await scene.call(invite, invitePersonOperation, {
      as: 'manager',
      body: { name: '', email: 'nobody', role: 'sponsor', arm: 'A' },
    });
    expect(reply.status).toBe(422);
    expect(reply.json.errors.map((fault: { pointer: string }) => fault.pointer).sort()).toEqual([
      '/arm',
      '/email',
      '/name',
    ]);
  });

  it('a coordinator needs a site that exists, others none', async () => {
    const email = address('siteless');
    for (const body of [
      { role: 'coordinator' },
      { role: 'coordinator', siteCode: '999' },
      { role: 'sponsor', siteCode: '101' },
    ]) {
      const reply = await scene.call(invite, invitePersonOperation, {
        as: 'manager',
        body: { name: 'Sid', email, ...body },
      });
      expect(reply.status).toBe(422);
      expect(reply.json.errors[0].pointer).toBe('/siteCode');
    }
  });

  it('a manager does not invite a statistician, an owner does', async () => {
    const body = { name: 'Ada Roe', email: address('ada'), role: 'statistician' };
    expect((await scene.call(invite, invitePersonOperation, { as: 'manager', body })).status).toBe(403);
    expect((await scene.call(invite, invitePersonOperation, { as: 'owner', body })).status).toBe(201);
    expect((await scene.call(invite, invitePersonOperation, { as: 'owner', body })).status).toBe(409);
  });

  it('taken back, it does not work any more', async () => {
    const email = address('withdrawn');
    const invited = await scene.call(invite, invitePersonOperation, {
      as: 'manager',
      body: { name: 'Wim', email, role: 'sponsor' },
    });
    const token = await mailedToken(email);
    expect(
      (await scene.call(revoke, revokeInvitationOperation, { as: 'manager', params: { id: invited.json.id } })).status,
    ).toBe(200);
    expect(
      (
        await scene.call(accept, acceptInvitationOperation, {
          as: 'stranger',
          body: { token, name: 'Wim', password: 'nine slow otters drift' },
        })
      ).status,
    ).toBe(404);
  });

  it('is for its own address alone, and an account that exists joins with it', async () => {
    const email = scene.people.foreigner.email;
    expect(
      (
        await scene.call(invite, invitePersonOperation, {
          as: 'owner',
          body: { name: 'Fenno', email, role: 'sponsor' },
        })
      ).status,
    ).toBe(201);
    const token = await mailedToken(email);
    expect((await scene.call(joinRoute, joinOperation, { as: 'sponsor', body: { token } })).status).toBe(403);
    expect(
      (
        await scene.call(accept, acceptInvitationOperation, {
          as: 'stranger',
          body: { token, name: 'Fenno', password: 'nine slow otters drift' },
        })
      ).status,
    ).toBe(409);
    expect((await scene.call(joinRoute, joinOperation, { as: 'foreigner', body: { token } })).status).toBe(200);
  });

  it('makes an owner only when an owner asks', async () => {
    const body = { name: 'Oz', email: address('oz') };
    expect((await scene.call(inviteOwnerRoute, inviteOwnerOperation, { as: 'manager', body })).status).toBe(403);
    expect((await scene.call(inviteOwnerRoute, inviteOwnerOperation, { as: 'owner', body })).status).toBe(201);
  });
});

describe('a membership that ends', () => {
  it('refuses the old session on its next request', async () => {
    const other = await createScene();
    const people = await other.call(list, listPeopleOperation, { as: 'manager' });
    const sponsor = people.json.members.find((member: { role: string }) => member.role === 'sponsor');
    const statistician = people.json.members.find((member: { role: string }) => member.role === 'statistician');
    expect(
      (await other.call(end, endMembershipOperation, { as: 'manager', params: { id: statistician.id } })).status,
    ).toBe(403);
    expect((await other.call(end, endMembershipOperation, { as: 'manager', params: { id: sponsor.id } })).status).toBe(
      200,
    );
    expect((await other.call(end, endMembershipOperation, { as: 'manager', params: { id: sponsor.id } })).status).toBe(
      404,
    );
    const reply = await other.call(list, listPeopleOperation, { as: 'sponsor' });
    expect(reply.status).toBe(404);
  });
});

describe('a request from elsewhere', () => {
  it('with another site’s origin changes nothing', async () => {
    const body = { name: 'Eve', email: address('eve'), role: 'sponsor' };
    const reply = await scene.call(invite, invitePersonOperation, {
      as: 'manager',
      body,
      headers: { origin: 'https://elsewhere.example' },
    });
    expect(reply.status).toBe(400);
    const plain = await scene.call(invite, invitePersonOperation, {
      as: 'manager',
      body: JSON.stringify(body),
      headers: { 'content-type': 'text/plain' },
    });
    expect(plain.status).toBe(415);
    const people = await scene.call(list, listPeopleOperation, { as: 'manager' });
    expect(people.text).not.toContain(address('eve'));
  });
});
