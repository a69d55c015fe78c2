import { randomUUID } from 'node:crypto';
import { MikroORM, type EntityManager } from '@mikro-orm/postgresql';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ormOptions } from '@/lib/db/config';
import { getOrm } from '@/lib/db/orm';
import { setTenancy, transact } from '@/lib/db/transaction';
import { createScene, type Scene } from '@/tests/support/scene';

let scene: Scene;
let foreign: { organisationId: string };

beforeAll(async () => {
  scene = await createScene();
  const [row] = await transact({ personId: scene.people.foreigner.personId }, (em) =>
    em.execute<{ organisation_id: string }[]>('select organisation_id from study_member where person_id = ?', [
      scene.people.foreigner.personId,
    ]),
  );
  foreign = { organisationId: row!.organisation_id };
});

describe('row-level security', () => {
  it('is forced on every table that has an organisation', async () => {
    const rows = await getOrm()
      .em.fork()
      .execute<{ relname: string; protected: boolean }[]>(
        `select c.relname, c.relrowsecurity and c.relforcerowsecurity and exists (select 1 from pg_policy p where p.polrelid = c.oid) as protected
         from pg_class c join pg_attribute a on a.attrelid = c.oid and a.attname = 'organisation_id' and not a.attisdropped
        where c.relkind = 'r' and c.relnamespace = 'public'::regnamespace`,
      );
    expect(rows.length).toBeGreaterThanOrEqual(19);
    expect(rows.filter((row) => !row.protected)).toEqual([]);
  });

  it('the application works as a plain role: no superuser, no owner of a table, no way round the policies', async () => {
    const em = getOrm().em.fork();
    const [role] = await em.execute(
      'select rolsuper, rolbypassrls, rolcreatedb, rolcreaterole from pg_roles where rolname = current_user',
    );
    expect(role).toEqual({ rolsuper: false, rolbypassrls: false, rolcreatedb: false, rolcreaterole: false });
    const owned = await em.execute(
      `select tablename from pg_tables where schemaname = 'public' and tableowner = current_user`,
    );
    expect(owned).toEqual([]);
  });

  it('without an organisation nothing is seen, with one only its own, whatever the query asks for', async () => {
    const all = (em: EntityManager) => em.execute<{ organisation_id: string }[]>('select organisation_id from site');
    expect(await transact({}, all)).toEqual([]);
    const own = await transact({ organisationId: scene.organisationId }, all);
    expect(own).toHaveLength(2);
    expect(new Set(own.map((row) => row.organisation_id))).toEqual(new Set([scene.organisationId]));
  });

  it('refuses to write for another organisation', async () => {
    await expect(
      transact({ organisationId: scene.organisationId }, (em) =>
        em.execute(
          `insert into site (id, organisation_id, study_id, code, name, city, country, created_at) values (?, ?, ?, '900', 'x', 'x', 'GB', now())`,
          [randomUUID(), foreign.organisationId, scene.studyId],
        ),
      ),
    ).rejects.toThrow(/row-level security/);
  });

  it('composite keys: a child under another organisation’s parent is refused by the database', async () => {
    const [study] = await transact({ organisationId: foreign.organisationId }, (em) =>
      em.execute<{ id: string }[]>('select id from study'),
    );
    await expect(
      transact({ organisationId: scene.organisationId }, (em) =>
        em.execute(
          `insert into site (id, organisation_id, study_id, code, name, city, country, created_at) values (?, ?, ?, '901', 'x', 'x', 'GB', now())`,
          [randomUUID(), scene.organisationId, study!.id],
        ),
      ),
    ).rejects.toThrow(/foreign key/);
  });

  describe('on a pool of four', () => {
    let orm: MikroORM;
    beforeAll(async () => {
      orm = await MikroORM.init(ormOptions(process.env.DATABASE_URL!, { pool: { min: 0, max: 4 } }));
    });
    afterAll(() => orm.close(true));

    it('2,000 interleaved transactions of two organisations see only their own', async () => {
      const tenants = [scene.organisationId, foreign.organisationId];
      let leaks = 0;
      let seen = 0;
      const one = async (index: number): Promise<void> => {
        const organisationId = tenants[index % 2]!;
        await orm.em.fork().transactional(async (em) => {
          await setTenancy(em as EntityManager, { organisationId });
          const rows = await (em as EntityManager).execute<{ organisation_id: string }[]>(
            'select organisation_id from study',
          );
          seen += rows.length;
          leaks += rows.filter((row) => row.organisation_id !== organisationId).length;
        });
      };
      for (let start = 0; start < 2000; start += 100)
        await Promise.all(Array.from({ length: 100 }, (_, offset) => one(start + offset)));
      expect({ leaks, seen }).toEqual({ leaks: 0, seen: 2000 });
    });

    it('a connection goes back to the pool without a memory of whom it worked for', async () => {
      await orm.em
        .fork()
        .transactional(async (em) => setTenancy(em as EntityManager, { organisationId: scene.organisationId }));
      for (let i = 0; i < 8; i += 1) expect(await orm.em.fork().execute('select 1 from study')).toEqual([]);
    });
  });
});

describe('the trail', () => {
  it('numbers and chains its rows, and nobody changes, removes or empties it', async () => {
    const write = () =>
      scene.act('statistician', 'study:read', async (scope, context) => {
        const { recordAudit } = await import('@/lib/audit/record');
        return recordAudit(context, scope, { action: 'studies:test', recordType: 'study', recordId: scope.studyId });
      });
    const first = await write();
    const second = await write();
    const rows = await transact({ organisationId: scene.organisationId }, (em) =>
      em.execute<{ sequence: string; digest: string; previous_digest: string }[]>(
        'select sequence, digest, previous_digest from audit_entry order by sequence desc limit 2',
      ),
    );
    expect(rows.map((row) => row.digest)).toEqual([second, first]);
    expect(rows[0]!.previous_digest).toBe(first);
    expect(Number(rows[0]!.sequence)).toBe(Number(rows[1]!.sequence) + 1);
    for (const statement of [
      `update audit_entry set reason = 'x'`,
      'delete from audit_entry',
      'truncate audit_entry',
    ]) {
      await expect(transact({ organisationId: scene.organisationId }, (em) => em.execute(statement))).rejects.toThrow(
        /permission denied|kept as they were written/,
      );
    }
  });
});
