'use client';

import { useState } from 'react';
import { AlertRuleForm } from '@/components/alerts/alert-rule-form';
import { recipientWords, ruleWords } from '@/components/alerts/alert-words';
import { valuesOf } from '@/components/alerts/rule-values';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { Cell, Row, RowHead, SubLine } from '@/components/ui/table';
import { sayDone, sayStopped } from '@/components/ui/toaster';
import { useChangeAlertRule, useDeleteAlertRule } from '@/lib/alerts/hooks';
import { type AddAlertRuleBody, alertRuleSchema, type AlertRules, type AlertRuleView } from '@/lib/alerts/schema';
import { formatQuantity } from '@/lib/format';
import { ProblemError } from '@/lib/http/client';

interface Props {
  code: string;
  rule: AlertRuleView;
  rules: AlertRules;
  onAskDelete: (rule: AlertRuleView) => void;
}

/** A rule in the list; "Change" opens it in its own place. */
export function AlertRuleRow({ code, rule, rules, onAskDelete }: Props) {
  const change = useChangeAlertRule(code);
  const [open, setOpen] = useState(false);
  /** What somebody else saved meanwhile, and what was typed here: both are shown. */
  const [conflict, setConflict] = useState<{ theirs: AlertRuleView; mine: AddAlertRuleBody } | null>(null);

  const save = async (body: AddAlertRuleBody, version = rule.version): Promise<void> => {
    try {
      await change.mutateAsync({ ...body, id: rule.id, version });
      setOpen(false);
      setConflict(null);
      sayDone('The rule is saved.');
    } catch (error) {
      const theirs = error instanceof ProblemError ? alertRuleSchema.safeParse(error.problem.current) : null;
      if (!theirs?.success) throw error;
      setConflict({ theirs: theirs.data, mine: body });
    }
  };
  const switchTo = (isActive: boolean): void => {
    const { milestoneCode, condition, recipients } = rule;
    save({ milestoneCode, condition, recipients, isActive }).catch((error: Error) => sayStopped(error.message));
  };

  if (open || conflict) {
    return (
      <Row>
        <Cell colSpan={4} className="py-5">
          {conflict ? (
            <Notice
              tone="caution"
              live
              title="Someone else changed this rule while you were working on it."
              action={
                <>
                  <Button
                    pending={change.isPending}
                    onClick={() =>
                      void save(conflict.mine, conflict.theirs.version).catch((error: Error) =>
                        sayStopped(error.message),
                      )
                    }
                  >
                    Keep mine
                  </Button>
                  <Button
                    variant="second"
                    onClick={() => {
                      setConflict(null);
                      setOpen(false);
                    }}
                  >
                    Take theirs
                  </Button>
                </>
              }
            >
              <p>
                It now says: {ruleWords(conflict.theirs)}. Told: {recipientWords(conflict.theirs, rules.readers)}.
              </p>
              <p>
                You have: {ruleWords({ ...conflict.mine, milestoneName: nameIn(rules, conflict.mine.milestoneCode) })}.
                Told: {recipientWords(conflict.mine, rules.readers)}.
              </p>
            </Notice>
          ) : (
            <AlertRuleForm
              rules={rules}
              initial={valuesOf(rule)}
              isActive={rule.isActive}
              verb="Save the rule"
              pending={change.isPending}
              onSave={save}
              onLeave={() => setOpen(false)}
            />
          )}
        </Cell>
      </Row>
    );
  }
  return (
    <Row>
      <RowHead>
        {ruleWords(rule)}
        {!rule.isPlanned && <SubLine className="text-caution">not in the plan any more</SubLine>}
      </RowHead>
      <Cell>{recipientWords(rule, rules.readers)}</Cell>
      <Cell>
        {rule.isActive ? 'on' : 'switched off'}
        {rule.raised > 0 && <SubLine>spoke {rule.raised === 1 ? 'once' : formatQuantity(rule.raised, 'time')}</SubLine>}
      </Cell>
      <Cell className="text-right">
        <Button variant="quiet" size="small" onClick={() => setOpen(true)}>
          Change
        </Button>
        <Button variant="quiet" size="small" pending={change.isPending} onClick={() => switchTo(!rule.isActive)}>
          {rule.isActive ? 'Switch off' : 'Switch on'}
        </Button>
        {rule.raised === 0 && (
          <Button variant="quiet" size="small" onClick={() => onAskDelete(rule)}>
            Delete
          </Button>
        )}
      </Cell>
    </Row>
  );
}

const nameIn = ({ milestones }: AlertRules, code: string): string =>
  milestones.find((milestone) => milestone.code === code)?.name ?? code;

interface DeleteProps {
  code: string;
  rule: AlertRuleView | null;
  onDone: () => void;
}

/** Deleting and its outcome, for the question that the list asks once. */
export function useDeleteRule({ code, rule, onDone }: DeleteProps) {
  const remove = useDeleteAlertRule(code);
  const confirm = (): void => {
    if (!rule) return;
    remove.mutate(
      { id: rule.id, version: rule.version },
      {
        onSuccess: () => sayDone('The rule is deleted.'),
        onError: (error) => sayStopped(error.message),
        onSettled: onDone,
      },
    );
  };
  return { confirm, pending: remove.isPending };
}
