import { changeAlertRule, deleteAlertRule } from '@/lib/alerts/commands';
import { changeAlertRuleOperation, deleteAlertRuleOperation } from '@/lib/alerts/operations';
import { route } from '@/lib/http/route';

export const DELETE = route(deleteAlertRuleOperation, deleteAlertRule);
export const PUT = route(changeAlertRuleOperation, changeAlertRule);
