import { ormOptions } from './lib/db/config';

/** For MikroORM's own command line: works as the owner role, which alone may migrate. */
export default ormOptions(process.env.DATABASE_OWNER_URL ?? process.env.DATABASE_URL ?? '');
