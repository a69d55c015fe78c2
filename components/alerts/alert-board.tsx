'use client';

import { useState } from 'react';
import { AlertRuleForm } from '@/components/alerts/alert-rule-form';
import { AlertRuleRow, useDeleteRule } from '@/components/alerts/alert-rule-row';
import { ruleWords } from '@/components/alerts/alert-words';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { EmptyState } from '@/components/ui/empty-state';
import { Section } from '@/components/ui/section';
import { HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { sayDone } from '@/components/ui/toaster';
import { useAddAlertRule, useAlertRules } from '@/lib/alerts/hooks';
import type { AlertRules, AlertRuleView } from '@/lib/alerts/schema';

interface Props {
  code: string;
  initial: AlertRules;
}

/** The study's rules, and a form for another. */
export function AlertBoard({ code, initial }: Props) {
  const rules = useAlertRules(code, initial).data;
  const add = useAddAlertRule(code);
  const [leaving, setLeaving] = useState<AlertRuleView | null>(null);
  const remove = useDeleteRule({ code, rule: leaving, onDone: () => setLeaving(null) });
  return (
    <>
      {rules.rules.length === 0 ? (
        <EmptyState title="No rule yet">
          <p>Nobody is written to when a forecast is published. Add a rule, and those whom it names are.</p>
        </EmptyState>
      ) : (
        <Table caption="Alert rules of the study">
          <TableHead>
            <Row>
              <HeadCell>Rule</HeadCell>
              <HeadCell>Told</HeadCell>
              <HeadCell>State</HeadCell>
              <HeadCell>
                <span className="sr-only">Act</span>
              </HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            {rules.rules.map((rule) => (
              <AlertRuleRow key={rule.id} code={code} rule={rule} rules={rules} onAskDelete={setLeaving} />
            ))}
          </TableBody>
        </Table>
      )}
      <Section title="Add a rule">
        {rules.milestones.length === 0 ? (
          <p>A rule speaks of a milestone, and the plan has none yet. Save the plan first.</p>
        ) : (
          <AlertRuleForm
            rules={rules}
            verb="Add the rule"
            pending={add.isPending}
            onSave={async (body) => {
              await add.mutateAsync(body);
              sayDone('The rule is added. It looks at the next publication.');
            }}
          />
        )}
      </Section>
      <ConfirmDialog
        open={leaving !== null}
        onOpenChange={(open) => !open && setLeaving(null)}
        title="Delete this rule?"
        description={`${leaving ? ruleWords(leaving) : ''}: nobody is told any more. It has not spoken yet, so nothing else goes with it.`}
        verb="Delete the rule"
        danger
        pending={remove.pending}
        onConfirm={remove.confirm}
      />
    </>
  );
}
