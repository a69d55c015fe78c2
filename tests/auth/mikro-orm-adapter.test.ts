import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { getAuth } from '@/lib/auth/auth';
import { getOrm } from '@/lib/db/orm';

type Adapter = Awaited<ReturnType<typeof getAuth>['$context']>['adapter'];

/** Every operator of better-auth's `Where`, against rows whose answers are written by hand. */
let adapter: Adapter;
const model = 'verification';
const NAMES = ['alpha', 'beta', 'gamma', 'a%b', 'Alpha'];
let run: string;

beforeAll(async () => {
  adapter = (await getAuth().$context).adapter;
});

beforeEach(async () => {
  run = randomUUID();
  for (const [index, value] of NAMES.entries()) {
    const expiresAt = new Date(Date.UTC(2026, 0, index + 1));
    await adapter.create({
      model,
      data: { identifier: run, value, expiresAt, createdAt: expiresAt, updatedAt: expiresAt },
    });
  }
});

async function values(...clauses: Parameters<Adapter['findMany']>[0]['where'] & object): Promise<string[]> {
  const found = await adapter.findMany<{ value: string }>({
    model,
    where: [{ field: 'identifier', value: run }, ...clauses],
    sortBy: { field: 'expiresAt', direction: 'asc' },
  });
  return found.map((row) => row.value);
}

describe('operators', () => {
  it('eq', async () => expect(await values({ field: 'value', value: 'beta' })).toEqual(['beta']));
  it('eq, insensitive', async () =>
    expect(await values({ field: 'value', value: 'ALPHA', mode: 'insensitive' })).toEqual(['alpha', 'Alpha']));
  it('ne', async () =>
    expect(await values({ field: 'value', operator: 'ne', value: 'beta' })).toEqual([
      'alpha',
      'gamma',
      'a%b',
      'Alpha',
    ]));
  it('lt', async () =>
    expect(await values({ field: 'expiresAt', operator: 'lt', value: new Date(Date.UTC(2026, 0, 2)) })).toEqual([
      'alpha',
    ]));
  it('lte', async () =>
    expect(await values({ field: 'expiresAt', operator: 'lte', value: new Date(Date.UTC(2026, 0, 2)) })).toEqual([
      'alpha',
      'beta',
    ]));
  it('gt', async () =>
    expect(await values({ field: 'expiresAt', operator: 'gt', value: new Date(Date.UTC(2026, 0, 4)) })).toEqual([
      'Alpha',
    ]));
  it('gte', async () =>
    expect(await values({ field: 'expiresAt', operator: 'gte', value: new Date(Date.UTC(2026, 0, 4)) })).toEqual([
      'a%b',
      'Alpha',
    ]));
  it('in', async () =>
    expect(await values({ field: 'value', operator: 'in', value: ['beta', 'gamma'] })).toEqual(['beta', 'gamma']));
  it('not_in', async () =>
    expect(await values({ field: 'value', operator: 'not_in', value: ['beta', 'gamma'] })).toEqual([
      'alpha',
      'a%b',
      'Alpha',
    ]));
  it('contains, with a percent sign taken literally', async () =>
    expect(await values({ field: 'value', operator: 'contains', value: '%' })).toEqual(['a%b']));
  it('starts_with', async () =>
    expect(await values({ field: 'value', operator: 'starts_with', value: 'a' })).toEqual(['alpha', 'a%b']));
  it('ends_with', async () =>
    expect(await values({ field: 'value', operator: 'ends_with', value: 'ma' })).toEqual(['gamma']));
  it('OR clauses: at least one holds, beside every AND clause', async () =>
    expect(
      await values(
        { field: 'value', value: 'beta', connector: 'OR' },
        { field: 'value', value: 'gamma', connector: 'OR' },
      ),
    ).toEqual(['beta', 'gamma']));
  it('count, limit and offset', async () => {
    const where = [{ field: 'identifier', value: run }];
    expect(await adapter.count({ model, where })).toBe(5);
    const page = await adapter.findMany<{ value: string }>({
      model,
      where,
      limit: 2,
      offset: 1,
      sortBy: { field: 'expiresAt', direction: 'asc' },
    });
    expect(page.map((row) => row.value)).toEqual(['beta', 'gamma']);
  });
});

describe('changes', () => {
  it('update returns the row as it now is, and null where none matches', async () => {
    const where = [
      { field: 'identifier', value: run },
      { field: 'value', value: 'beta' },
    ];
    expect(await adapter.update<{ value: string }>({ model, where, update: { value: 'delta' } })).toMatchObject({
      value: 'delta',
    });
    expect(await adapter.update({ model, where, update: { value: 'epsilon' } })).toBeNull();
    expect(await values({ field: 'value', value: 'delta' })).toEqual(['delta']);
  });

  it('updateMany and deleteMany count what they changed', async () => {
    expect(
      await adapter.updateMany({ model, where: [{ field: 'identifier', value: run }], update: { value: 'same' } }),
    ).toBe(5);
    expect(await adapter.deleteMany({ model, where: [{ field: 'identifier', value: run }] })).toBe(5);
    expect(await values()).toEqual([]);
  });

  it('consumeOne: eight at once, one gets it', async () => {
    const where = [
      { field: 'identifier', value: run },
      { field: 'value', value: 'beta' },
    ];
    const won = await Promise.all(
      Array.from({ length: 8 }, () => adapter.consumeOne<{ value: string }>({ model, where })),
    );
    expect(won.filter((row) => row !== null)).toHaveLength(1);
    expect(won.find((row) => row !== null)).toMatchObject({ value: 'beta' });
  });

  it('incrementOne: eight at once, eight are counted', async () => {
    const key = randomUUID();
    await adapter.create({ model: 'rateLimit', data: { key, count: 0, lastRequest: 1 } });
    const where = [{ field: 'key', value: key }];
    await Promise.all(
      Array.from({ length: 8 }, () => adapter.incrementOne({ model: 'rateLimit', where, increment: { count: 1 } })),
    );
    expect(await adapter.findOne<{ count: number }>({ model: 'rateLimit', where })).toMatchObject({ count: 8 });
  });

  it('incrementOne: the filter guards, so that of eight only three get through a limit of three', async () => {
    const key = randomUUID();
    await adapter.create({ model: 'rateLimit', data: { key, count: 0, lastRequest: 1 } });
    const where = [
      { field: 'key', value: key },
      { field: 'count', operator: 'lt' as const, value: 3 },
    ];
    const through = await Promise.all(
      Array.from({ length: 8 }, () => adapter.incrementOne({ model: 'rateLimit', where, increment: { count: 1 } })),
    );
    expect(through.filter((row) => row !== null)).toHaveLength(3);
  });

  it('a transaction that fails leaves nothing behind', async () => {
    const identifier = randomUUID();
    const instant = new Date();
    await expect(
      adapter.transaction(async (inside) => {
        await inside.create({
          model,
          data: { identifier, value: 'x', expiresAt: instant, createdAt: instant, updatedAt: instant },
        });
        throw new Error('stop here');
      }),
    ).rejects.toThrow('stop here');
    expect(await adapter.count({ model, where: [{ field: 'identifier', value: identifier }] })).toBe(0);
    expect(await getOrm().em.fork().execute(`select 1 from verification where identifier = ?`, [identifier])).toEqual(
      [],
    );
  });
});
