import { defineOperation } from '../http/operation';
import { nothing, studyParams } from '../http/params';
import {
  correctMonthBody,
  logMonthBody,
  monthEntrySchema,
  monthSheetSchema,
  overviewQuery,
  overviewSchema,
  siteLogParams,
  siteMonthParams,
} from './schema';

export const listLogOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/log',
  summary: 'Which sites have reported which of the last months',
  access: { kind: 'study', action: 'site-log:read' },
  params: studyParams,
  query: overviewQuery,
  body: nothing,
  reply: overviewSchema,
});

export const getMonthSheetOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/log/{site}',
  summary: 'The month sheet of a site',
  access: { kind: 'study', action: 'site-log:read' },
  params: siteLogParams,
  query: nothing,
  body: nothing,
  reply: monthSheetSchema,
});

export const logMonthOperation = defineOperation({
  method: 'PUT',
  path: '/api/v1/studies/{code}/log/{site}/{month}',
  summary: 'Log the first figures of a month',
  access: { kind: 'study', action: 'site-log:log' },
  params: siteMonthParams,
  query: nothing,
  body: logMonthBody,
  reply: monthEntrySchema,
});

export const correctMonthOperation = defineOperation({
  method: 'PATCH',
  path: '/api/v1/studies/{code}/log/{site}/{month}',
  summary: 'Correct figures of a logged month, with a reason',
  access: { kind: 'study', action: 'site-log:correct' },
  params: siteMonthParams,
  query: nothing,
  body: correctMonthBody,
  reply: monthEntrySchema,
});
