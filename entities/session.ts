import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

export const Session = defineEntity({
  name: 'Session',
  tableName: 'session',
  properties: {
    id: p.uuid().primary(),
    token: p.string(),
    userId: p.uuid(),
    expiresAt: p.datetime(),
    ipAddress: p.string().nullable(),
    userAgent: p.text().nullable(),
    createdAt: p.datetime(),
    updatedAt: p.datetime(),
  },
});

export type SessionRow = InferEntity<typeof Session>;
