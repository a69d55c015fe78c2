import { defineUpload } from '../http/operation';
import { nothing, studyParams } from '../http/params';
import { acceptedSitesSchema, sitePreviewSchema } from './schema';

export const previewSiteListOperation = defineUpload({
  method: 'POST',
  path: '/api/v1/studies/{code}/sites/list/preview',
  summary: 'Read a site list and say what it would add; nothing is stored',
  access: { kind: 'study', action: 'sites:change' },
  params: studyParams,
  query: nothing,
  body: nothing,
  reply: sitePreviewSchema,
  upload: 'file',
});

export const acceptSiteListOperation = defineUpload({
  method: 'POST',
  path: '/api/v1/studies/{code}/sites/list/accept',
  summary: 'Add the sites of a list, all of them or none',
  access: { kind: 'study', action: 'sites:change' },
  params: studyParams,
  query: nothing,
  body: nothing,
  reply: acceptedSitesSchema,
  upload: 'file',
  status: 201,
});
