import { z } from 'zod';
import { defineOperation } from '../http/operation';
import { instant, nothing, paged, studyParams } from '../http/params';
import { publicationHeadSchema, publicationSchema, publicationsQuery, publishBody } from './schema';

const publicationParams = studyParams.extend({ number: z.coerce.number().int().min(1).max(1_000_000_000) });

export const publishForecastOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/publications',
  summary: 'Publish a run to the study’s readers',
  access: { kind: 'study', action: 'publications:publish' },
  params: studyParams,
  query: nothing,
  body: publishBody,
  reply: publicationSchema,
  status: 201,
});

export const listPublicationsOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/publications',
  summary: 'Publications of the study, newest first',
  access: { kind: 'study', action: 'publications:read' },
  params: studyParams,
  query: publicationsQuery,
  body: nothing,
  reply: paged(publicationHeadSchema),
});

export const getPublicationOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/publications/{number}',
  summary: 'One publication',
  access: { kind: 'study', action: 'publications:read' },
  params: publicationParams,
  query: nothing,
  body: nothing,
  reply: publicationSchema,
});

export const acknowledgeOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/publications/{number}/acknowledgement',
  summary: 'Acknowledge the cautions of a publication',
  access: { kind: 'study', action: 'publications:acknowledge' },
  params: publicationParams,
  query: nothing,
  body: nothing,
  reply: z.strictObject({ number: z.number(), acknowledgedAt: instant }),
});
