import type { AlertRuleRow } from '../../entities/alert-rule';
import type { AlertRules, AlertRuleView } from './schema';

export function serialiseRule(row: AlertRuleRow, milestones: AlertRules['milestones'], raised: number): AlertRuleView {
  const milestone = milestones.find(({ code }) => code === row.milestoneCode);
  return {
    id: row.id,
    milestoneCode: row.milestoneCode,
    milestoneName: milestone?.name ?? row.milestoneCode,
    isPlanned: milestone !== undefined,
    condition: row.condition,
    recipients: row.recipients,
    isActive: row.isActive,
    raised,
    createdAt: row.createdAt.toISOString(),
    version: row.version,
  };
}
