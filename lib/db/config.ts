import { defineConfig, type Options } from '@mikro-orm/postgresql';
import { Migrator } from '@mikro-orm/migrations';
import { entities } from '../../entities';
import { migrations } from '../../migrations';

/** Options for one database URL: the application's role at run time, the owner's for migrations. */
export function ormOptions(url: string, extra: Partial<Options> = {}): Options {
  return defineConfig({
    clientUrl: url,
    entities,
    extensions: [Migrator],
    // Calendar dates are strings everywhere; timestamps are UTC instants.
    forceUtcTimezone: true,
    pool: { min: 0, max: 10 },
    migrations: {
      migrationsList: migrations,
      snapshot: false,
      disableForeignKeys: false,
      transactional: true,
      allOrNothing: true,
    },
    dynamicImportProvider: (id) => import(/* webpackIgnore: true */ id),
    discovery: { warnWhenNoEntities: true },
    ...extra,
  });
}
