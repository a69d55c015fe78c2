import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';

export const PublicationAcknowledgement = defineEntity({
  name: 'PublicationAcknowledgement',
  tableName: 'publication_acknowledgement',
  properties: {
    ...tenantColumns(),
    publicationId: p.uuid(),
    personId: p.uuid(),
    acknowledgedAt: p.datetime(),
  },
});

export type PublicationAcknowledgementRow = InferEntity<typeof PublicationAcknowledgement>;
