import { z } from 'zod';
import { defineOperation, defineUpload } from '../http/operation';
import { nothing, pageQuery, studyParams } from '../http/params';
import {
  acceptAggregateBody,
  acceptCutBody,
  cutListSchema,
  cutParams,
  cutPreviewSchema,
  cutSchema,
  previewCutBody,
} from './schema';

export const previewCutOperation = defineUpload({
  method: 'POST',
  path: '/api/v1/studies/{code}/data-cuts/preview',
  summary: 'Read a subject listing: what it holds, what is wrong, where it differs from the log; nothing is stored',
  access: { kind: 'study', action: 'data-cuts:accept' },
  params: studyParams,
  query: nothing,
  body: previewCutBody,
  reply: cutPreviewSchema,
  upload: 'file',
});

export const acceptCutOperation = defineUpload({
  method: 'POST',
  path: '/api/v1/studies/{code}/data-cuts',
  summary: 'Accept a subject listing as the study’s next data cut',
  access: { kind: 'study', action: 'data-cuts:accept' },
  params: studyParams,
  query: nothing,
  body: acceptCutBody,
  reply: cutSchema,
  upload: 'file',
  status: 201,
});

export const acceptAggregateOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/data-cuts/aggregate',
  summary: 'Accept totals instead of a listing as the study’s next data cut',
  access: { kind: 'study', action: 'data-cuts:accept' },
  params: studyParams,
  query: nothing,
  body: acceptAggregateBody,
  reply: cutSchema,
  status: 201,
});

export const listCutsOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/data-cuts',
  summary: 'Data cuts, newest first',
  access: { kind: 'study', action: 'data-cuts:read' },
  params: studyParams,
  query: pageQuery,
  body: nothing,
  reply: cutListSchema,
});

export const getCutOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/data-cuts/{number}',
  summary: 'One data cut',
  access: { kind: 'study', action: 'data-cuts:read' },
  params: cutParams,
  query: nothing,
  body: nothing,
  reply: cutSchema,
});

export const getCutFileOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/data-cuts/{number}/file',
  summary: 'The listing of a data cut, byte for byte as it was uploaded',
  access: { kind: 'study', action: 'data-cuts:read' },
  params: cutParams,
  query: nothing,
  body: nothing,
  reply: z.unknown(),
});
