import type { BetterAuthOptions } from 'better-auth';
import { type CleanedWhere, createAdapterFactory } from 'better-auth/adapters';
import { type EntityManager, type FilterQuery, LockMode } from '@mikro-orm/postgresql';

type Row = Record<string, unknown>;

/** better-auth's model names are its table names here; MikroORM wants entity names. */
const entityName = (model: string): string =>
  model
    .split('_')
    .map((part) => part[0]!.toUpperCase() + part.slice(1))
    .join('');

const escapeLike = (value: unknown): string => String(value).replace(/[\\%_]/g, '\\$&');

function condition({ operator, value, field, mode }: CleanedWhere): Row {
  const insensitive = mode === 'insensitive' && typeof value === 'string';
  const like = insensitive ? '$ilike' : '$like';
  switch (operator) {
    case 'ne':
      return { [field]: { $ne: value } };
    case 'lt':
      return { [field]: { $lt: value } };
    case 'lte':
      return { [field]: { $lte: value } };
    case 'gt':
      return { [field]: { $gt: value } };
    case 'gte':
      return { [field]: { $gte: value } };
    case 'in':
      return { [field]: { $in: Array.isArray(value) ? value : [value] } };
    case 'not_in':
      return { [field]: { $nin: Array.isArray(value) ? value : [value] } };
    case 'contains':
      return { [field]: { [like]: `%${escapeLike(value)}%` } };
    case 'starts_with':
      return { [field]: { [like]: `${escapeLike(value)}%` } };
    case 'ends_with':
      return { [field]: { [like]: `%${escapeLike(value)}` } };
    default:
      return { [field]: insensitive ? { $ilike: escapeLike(value) } : value };
  }
}

/** All AND clauses hold, and at least one of the OR clauses where there are any. */
function filter(where: CleanedWhere[] | undefined): FilterQuery<Row> {
  const all = (where ?? []).filter((clause) => clause.connector !== 'OR').map(condition);
  const any = (where ?? []).filter((clause) => clause.connector === 'OR').map(condition);
  return { $and: [...all, ...(any.length > 0 ? [{ $or: any }] : [])] } as FilterQuery<Row>;
}

const plain = (entity: object | null): Row | null => (entity ? { ...(entity as Row) } : null);

/** better-auth's storage through MikroORM. `manager` gives the EntityManager to work on: a fork, or an open transaction's. */
export function mikroOrmAdapter(getManager: () => EntityManager) {
  const config = {
    adapterId: 'mikro-orm',
    supportsJSON: true,
    supportsDates: true,
    supportsBooleans: true,
    supportsNumericIds: false,
    supportsUUIDs: true,
  };
  const storage = (em: () => EntityManager) => () => ({
    async create<T extends Row>({ model, data }: { model: string; data: T }): Promise<T> {
      const manager = em();
      const entity = manager.create<Row>(entityName(model), data);
      await manager.persistAndFlush(entity);
      return plain(entity) as T;
    },
    async findOne<T>({ model, where }: { model: string; where: CleanedWhere[] }): Promise<T | null> {
      return plain(await em().findOne<Row>(entityName(model), filter(where), { disableIdentityMap: true })) as T | null;
    },
    async findMany<T>({ model, where, limit, sortBy, offset }: FindMany): Promise<T[]> {
      const options = {
        limit,
        offset,
        disableIdentityMap: true,
        ...(sortBy ? { orderBy: { [sortBy.field]: sortBy.direction } } : {}),
      };
      const found = await em().find<Row>(entityName(model), filter(where), options);
      return found.map((entity) => plain(entity) as T);
    },
    async count({ model, where }: { model: string; where?: CleanedWhere[] }): Promise<number> {
      return em().count<Row>(entityName(model), filter(where));
    },
    async update<T>({ model, where, update }: { model: string; where: CleanedWhere[]; update: T }): Promise<T | null> {
      return lockedRow(em(), model, where, (manager, row) => {
        manager.assign(row, update as Row);
      }) as Promise<T | null>;
    },
    async updateMany({ model, where, update }: { model: string; where: CleanedWhere[]; update: Row }): Promise<number> {
      return em().nativeUpdate<Row>(entityName(model), filter(where), update);
    },
    async delete({ model, where }: { model: string; where: CleanedWhere[] }): Promise<void> {
      await em().nativeDelete<Row>(entityName(model), filter(where));
    },
    async deleteMany({ model, where }: { model: string; where: CleanedWhere[] }): Promise<number> {
      return em().nativeDelete<Row>(entityName(model), filter(where));
    },
    async consumeOne<T>({ model, where }: { model: string; where: CleanedWhere[] }): Promise<T | null> {
      return lockedRow(em(), model, where, (manager, row) => {
        manager.remove(row);
      }) as Promise<T | null>;
    },
    async incrementOne<T>({ model, where, increment, set }: Increment): Promise<T | null> {
      return lockedRow(em(), model, where, (manager, row) => {
        const counters = Object.entries(increment).map(([field, delta]) => [field, Number(row[field] ?? 0) + delta]);
        manager.assign(row, { ...set, ...Object.fromEntries(counters) });
      }) as Promise<T | null>;
    },
  });
  return (options: BetterAuthOptions) =>
    createAdapterFactory({
      config: {
        ...config,
        // Inside a transaction every call works on its EntityManager, and a further one joins it.
        transaction: (callback) =>
          getManager().transactional((trx) =>
            callback(
              createAdapterFactory({
                config: { ...config, transaction: false },
                adapter: storage(() => trx as EntityManager),
              })(options),
            ),
          ),
      },
      adapter: storage(getManager),
    })(options);
}

interface FindMany {
  model: string;
  where?: CleanedWhere[];
  limit: number;
  sortBy?: { field: string; direction: 'asc' | 'desc' };
  offset?: number;
}

interface Increment {
  model: string;
  where: CleanedWhere[];
  increment: Record<string, number>;
  set?: Row;
}

/** One matching row, locked, changed and returned. PostgreSQL re-checks the filter after waiting for the lock, so a race has one winner. */
async function lockedRow(
  em: EntityManager,
  model: string,
  where: CleanedWhere[],
  change: (manager: EntityManager, row: Row) => void,
): Promise<Row | null> {
  if (where.length === 0) return null;
  return em.transactional(async (trx) => {
    const manager = trx as EntityManager;
    const [row] = await manager.find<Row>(entityName(model), filter(where), {
      limit: 1,
      lockMode: LockMode.PESSIMISTIC_WRITE,
      refresh: true,
    });
    if (!row) return null;
    const before = plain(row);
    change(manager, row);
    await manager.flush();
    return { ...before, ...plain(row) };
  });
}
