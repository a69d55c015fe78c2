import { MikroORM } from '@mikro-orm/postgresql';
import { ormOptions } from './config';

/** One ORM for the process; Next.js may load this module more than once, hence the global. */
const holder = globalThis as typeof globalThis & { kalendsOrm?: MikroORM };

export function getOrm(): MikroORM {
  if (!holder.kalendsOrm) {
    const url = process.env.DATABASE_URL;
    if (!url) throw new Error('DATABASE_URL is not set: start the product with npm start, or set it.');
    holder.kalendsOrm = MikroORM.initSync(ormOptions(url));
  }
  return holder.kalendsOrm;
}

export async function closeOrm(): Promise<void> {
  const orm = holder.kalendsOrm;
  holder.kalendsOrm = undefined;
  await orm?.close(true);
}
