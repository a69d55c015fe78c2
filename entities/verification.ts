import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

export const Verification = defineEntity({
  name: 'Verification',
  tableName: 'verification',
  properties: {
    id: p.uuid().primary(),
    identifier: p.string(),
    value: p.text(),
    expiresAt: p.datetime(),
    createdAt: p.datetime(),
    updatedAt: p.datetime(),
  },
});

export type VerificationRow = InferEntity<typeof Verification>;
