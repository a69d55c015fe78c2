import { addAlertRule } from '@/lib/alerts/commands';
import { addAlertRuleOperation, listAlertRulesOperation } from '@/lib/alerts/operations';
import { listAlertRules } from '@/lib/alerts/queries';
import { route } from '@/lib/http/route';

export const GET = route(listAlertRulesOperation, listAlertRules);
export const POST = route(addAlertRuleOperation, addAlertRule);
