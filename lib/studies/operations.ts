import { z } from 'zod';
import { defineOperation } from '../http/operation';
import { nothing, studyParams } from '../http/params';
import {
  comparisonQuery,
  comparisonSchema,
  createStudyBody,
  planVersionSchema,
  planViewSchema,
  savedSectionSchema,
  savePlanSectionBody,
  savePlanVersionBody,
  studyFrameSchema,
  studySchema,
} from './schema';

export const createStudyOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies',
  summary: 'Create a study',
  access: { kind: 'organisation', action: 'organisation:create-study' },
  params: nothing,
  query: nothing,
  body: createStudyBody,
  reply: studySchema,
  status: 201,
});

export const getStudyOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}',
  summary: 'A study’s name and the sections that your role sees',
  access: { kind: 'study', action: 'study:read' },
  params: studyParams,
  query: nothing,
  body: nothing,
  reply: studyFrameSchema,
});

export const getPlanOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/plan',
  summary: 'The plan: its current version, its draft and its history',
  access: { kind: 'study', action: 'plan:read' },
  params: studyParams,
  query: nothing,
  body: nothing,
  reply: planViewSchema,
});

export const savePlanSectionOperation = defineOperation({
  method: 'PUT',
  path: '/api/v1/studies/{code}/plan/draft',
  summary: 'Save one section of the plan’s draft',
  access: { kind: 'study', action: 'plan:save' },
  params: studyParams,
  query: nothing,
  body: savePlanSectionBody,
  reply: savedSectionSchema,
});

export const savePlanVersionOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/plan/versions',
  summary: 'Save the draft as the plan’s next version',
  access: { kind: 'study', action: 'plan:save' },
  params: studyParams,
  query: nothing,
  body: savePlanVersionBody,
  reply: planVersionSchema,
  status: 201,
});

export const getPlanVersionOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/plan/versions/{number}',
  summary: 'One version of the plan, as it was saved',
  access: { kind: 'study', action: 'plan:read' },
  params: studyParams.extend({ number: z.coerce.number().int().min(1) }),
  query: nothing,
  body: nothing,
  reply: planVersionSchema,
});

export const comparePlanVersionsOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/plan/comparison',
  summary: 'What two versions of the plan have different, field by field',
  access: { kind: 'study', action: 'plan:read' },
  params: studyParams,
  query: comparisonQuery,
  body: nothing,
  reply: comparisonSchema,
});
