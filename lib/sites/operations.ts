import { defineOperation } from '../http/operation';
import { nothing, studyParams } from '../http/params';
import { addSiteBody, changeSiteBody, siteParams, siteSchema, sitesQuery, sitesSchema } from './schema';

export const listSitesOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/sites',
  summary: 'The sites of a study, by code',
  access: { kind: 'study', action: 'sites:read' },
  params: studyParams,
  query: sitesQuery,
  body: nothing,
  reply: sitesSchema,
});

export const addSiteOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/sites',
  summary: 'Add a site',
  access: { kind: 'study', action: 'sites:change' },
  params: studyParams,
  query: nothing,
  body: addSiteBody,
  reply: siteSchema,
  status: 201,
});

export const getSiteOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/sites/{site}',
  summary: 'One site, by its code',
  access: { kind: 'study', action: 'sites:read' },
  params: siteParams,
  query: nothing,
  body: nothing,
  reply: siteSchema,
});

export const changeSiteOperation = defineOperation({
  method: 'PUT',
  path: '/api/v1/studies/{code}/sites/{site}',
  summary: 'Change a site: its name, window, activation, closure or cap',
  access: { kind: 'study', action: 'sites:change' },
  params: siteParams,
  query: nothing,
  body: changeSiteBody,
  reply: siteSchema,
});
