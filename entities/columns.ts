import { randomUUID } from 'node:crypto';
import { p } from '@mikro-orm/core';

/** Every tenant table carries its organisation, so that row-level security and the composite keys can hold it. */
export const tenantColumns = () => ({
  id: p
    .uuid()
    .primary()
    .onCreate(() => randomUUID()),
  organisationId: p.uuid(),
});

/** Set by the application's clock, so that a replayed history keeps its own instants. */
export const createdAt = () => p.datetime();
