import { z } from 'zod';
import { defineOperation } from '../http/operation';
import { nothing, paged, studyParams } from '../http/params';
import {
  addAlertRuleBody,
  alertRuleSchema,
  alertRulesSchema,
  changeAlertRuleBody,
  deleteAlertRuleQuery,
  sentAlertSchema,
  sentAlertsQuery,
} from './schema';

const ruleParams = studyParams.extend({ id: z.uuid() });

export const listAlertRulesOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/alerts/rules',
  summary: 'Alert rules of the study',
  access: { kind: 'study', action: 'alerts:read' },
  params: studyParams,
  query: nothing,
  body: nothing,
  reply: alertRulesSchema,
});

export const addAlertRuleOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/alerts/rules',
  summary: 'Add an alert rule',
  access: { kind: 'study', action: 'alerts:change' },
  params: studyParams,
  query: nothing,
  body: addAlertRuleBody,
  reply: alertRuleSchema,
  status: 201,
});

export const changeAlertRuleOperation = defineOperation({
  method: 'PUT',
  path: '/api/v1/studies/{code}/alerts/rules/{id}',
  summary: 'Change an alert rule, or switch it off or on',
  access: { kind: 'study', action: 'alerts:change' },
  params: ruleParams,
  query: nothing,
  body: changeAlertRuleBody,
  reply: alertRuleSchema,
});

export const deleteAlertRuleOperation = defineOperation({
  method: 'DELETE',
  path: '/api/v1/studies/{code}/alerts/rules/{id}',
  summary: 'Delete an alert rule that has not spoken yet',
  access: { kind: 'study', action: 'alerts:change' },
  params: ruleParams,
  query: deleteAlertRuleQuery,
  body: nothing,
  reply: z.strictObject({ id: z.uuid() }),
});

export const listSentAlertsOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/alerts',
  summary: 'Alerts that were sent, newest first, with the state of each message',
  access: { kind: 'study', action: 'alerts:read' },
  params: studyParams,
  query: sentAlertsQuery,
  body: nothing,
  reply: paged(sentAlertSchema),
});
