import { defineOperation } from '../http/operation';
import { nothing } from '../http/params';
import { portfolioQuery, portfolioSchema } from './schema';

export const listStudiesOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies',
  summary: 'The studies that you have a role in, late ones first',
  access: { kind: 'person' },
  params: nothing,
  query: portfolioQuery,
  body: nothing,
  reply: portfolioSchema,
});
