import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

export const RateLimit = defineEntity({
  name: 'RateLimit',
  tableName: 'rate_limit',
  properties: {
    id: p.uuid().primary(),
    key: p.string(),
    count: p.integer(),
    lastRequest: p.bigint('number'),
  },
});

export type RateLimitRow = InferEntity<typeof RateLimit>;
