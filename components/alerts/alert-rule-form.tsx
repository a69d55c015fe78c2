'use client';

import { useState, type FormEvent } from 'react';
import { bodyOf, emptyRule, type RuleValues } from '@/components/alerts/rule-values';
import { Button } from '@/components/ui/button';
import { Checkbox } from '@/components/ui/checkbox';
import { Notice } from '@/components/ui/notice';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { type AddAlertRuleBody, addAlertRuleBody, ALERT_ROLES, type AlertRules } from '@/lib/alerts/schema';
import { ROLE_NAMES } from '@/lib/auth/permissions';
import { ProblemError } from '@/lib/http/client';

const KINDS = [
  { value: 'slips', label: 'it slips against the last publication' },
  { value: 'nears', label: 'it nears' },
  { value: 'reached', label: 'it is reached' },
];

interface Props {
  rules: Pick<AlertRules, 'milestones' | 'readers'>;
  initial?: RuleValues;
  isActive?: boolean;
  verb: string;
  pending: boolean;
  /** Saves; what it throws is shown beside the fields. */
  onSave: (body: AddAlertRuleBody) => Promise<unknown>;
  /** The way back, where the form stands in the place of a rule. */
  onLeave?: () => void;
}

type Faults = Record<string, string>;

/** One rule: which milestone, what about it, who is told. */
export function AlertRuleForm({ rules, initial, isActive = true, verb, pending, onSave, onLeave }: Props) {
  const start = initial ?? emptyRule(rules.milestones[0]?.code ?? '');
  const [values, setValues] = useState(start);
  const [faults, setFaults] = useState<Faults>({});
  const set = (change: Partial<RuleValues>): void => setValues((before) => ({ ...before, ...change }));
  const toggle = <T,>(list: readonly T[], value: T): T[] =>
    list.includes(value) ? list.filter((one) => one !== value) : [...list, value];

  const save = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    const parsed = addAlertRuleBody.safeParse(bodyOf(values, isActive));
    if (!parsed.success)
      return setFaults(
        Object.fromEntries(parsed.error.issues.map((issue) => [`/${issue.path.join('/')}`, issue.message])),
      );
    setFaults({});
    try {
      await onSave(parsed.data);
      if (!onLeave) setValues(start);
    } catch (error) {
      const errors = error instanceof ProblemError ? error.problem.errors : undefined;
      setFaults(
        errors
          ? Object.fromEntries(errors.map(({ pointer, detail }) => [pointer, detail]))
          : { '': (error as Error).message },
      );
    }
  };

  const known = rules.milestones.some(({ code }) => code === values.milestoneCode);
  const milestones = [
    ...(known ? [] : [{ code: values.milestoneCode, name: `${values.milestoneCode}, not in the plan any more` }]),
    ...rules.milestones,
  ];
  const told = Object.entries(faults).find(([pointer]) => pointer.startsWith('/recipients'))?.[1];
  return (
    <form noValidate onSubmit={(event) => void save(event)} className="max-w-measure space-y-5">
      {faults[''] && (
        <Notice tone="stop" live title="Not saved">
          {faults['']}
        </Notice>
      )}
      <div className="grid gap-5 sm:grid-cols-2">
        <SelectField
          label="Milestone"
          value={values.milestoneCode}
          error={faults['/milestoneCode']}
          options={milestones.map(({ code, name }) => ({ value: code, label: name }))}
          onChange={(event) => set({ milestoneCode: event.target.value })}
        />
        <SelectField
          label="Speaks when"
          value={values.kind}
          options={KINDS}
          onChange={(event) => set({ kind: event.target.value as RuleValues['kind'] })}
        />
        {values.kind === 'slips' && (
          <NumberField
            label="Median later by at least"
            whole
            unit="days"
            value={values.days}
            error={faults['/condition/days']}
            onChange={(event) => set({ days: event.target.value })}
          />
        )}
        {values.kind === 'nears' && (
          <>
            <NumberField
              label="Within"
              whole
              unit="weeks"
              value={values.withinWeeks}
              error={faults['/condition/withinWeeks']}
              onChange={(event) => set({ withinWeeks: event.target.value })}
            />
            <NumberField
              label="With a chance of at least"
              unit="%"
              value={values.percent}
              error={faults['/condition/probability']}
              onChange={(event) => set({ percent: event.target.value })}
            />
          </>
        )}
      </div>
      <fieldset aria-describedby={told ? 'told-error' : undefined}>
        <legend className="mb-1 text-13 font-600">Who is told</legend>
        <div className="grid gap-2 sm:grid-cols-2">
          {ALERT_ROLES.map((role) => (
            <Checkbox
              key={role}
              label={`Every ${ROLE_NAMES[role]}`}
              checked={values.roles.includes(role)}
              onChange={() => set({ roles: toggle(values.roles, role) })}
            />
          ))}
          {rules.readers.map(({ id, name, role }) => (
            <Checkbox
              key={id}
              label={name}
              hint={values.roles.includes(role) ? `told as ${ROLE_NAMES[role]}` : ROLE_NAMES[role]}
              checked={values.personIds.includes(id)}
              onChange={() => set({ personIds: toggle(values.personIds, id) })}
            />
          ))}
        </div>
        {told && (
          <p id="told-error" className="mt-1 text-13 text-stop">
            {told}
          </p>
        )}
      </fieldset>
      <div className="flex flex-wrap gap-3">
        <Button type="submit" pending={pending} pendingLabel="Saving">
          {verb}
        </Button>
        {onLeave && (
          <Button variant="second" onClick={onLeave}>
            Leave as it was
          </Button>
        )}
      </div>
    </form>
  );
}
