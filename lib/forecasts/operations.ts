import { z } from 'zod';
import { defineOperation } from '../http/operation';
import { nothing, pageQuery, studyParams } from '../http/params';
import { requestForecastBody, runListSchema, runParams, runSchema, runViewSchema } from './schema';

export const requestForecastOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/forecasts',
  summary: 'Run a forecast from the current plan, the sites, the log and a data cut',
  access: { kind: 'study', action: 'forecasts:run' },
  params: studyParams,
  query: nothing,
  body: requestForecastBody,
  reply: runSchema,
  status: 202,
});

export const listRunsOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/forecasts',
  summary: 'Forecast runs, newest first',
  access: { kind: 'study', action: 'forecasts:read' },
  params: studyParams,
  query: pageQuery,
  body: nothing,
  reply: runListSchema,
});

export const getRunOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/forecasts/{number}',
  summary: 'A run: how far it is, and its forecast when it is done',
  access: { kind: 'study', action: 'forecasts:read' },
  params: runParams,
  query: nothing,
  body: nothing,
  reply: runViewSchema,
});

export const cancelForecastOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/forecasts/{number}/cancel',
  summary: 'Cancel a run that waits or is being computed',
  access: { kind: 'study', action: 'forecasts:run' },
  params: runParams,
  query: nothing,
  body: nothing,
  reply: runSchema,
});

export const getStudyFileOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/forecasts/{number}/study-file',
  summary: 'The study file that the run read, byte for byte',
  access: { kind: 'study', action: 'forecasts:read' },
  params: runParams,
  query: nothing,
  body: nothing,
  reply: z.unknown(),
});

export const getForecastFileOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/forecasts/{number}/forecast-file',
  summary: 'The forecast file that came out, byte for byte',
  access: { kind: 'study', action: 'forecasts:read' },
  params: runParams,
  query: nothing,
  body: nothing,
  reply: z.unknown(),
});
