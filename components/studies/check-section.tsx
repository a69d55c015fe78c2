'use client';

import Link from 'next/link';
import { SimulationFields } from '@/components/studies/simulation-section';
import { PlanDifferences } from '@/components/studies/plan-differences';
import { SectionFrame } from '@/components/studies/section-frame';
import type { PlanBoardState } from '@/components/studies/use-plan-board';
import { REASON_ID, type SavePlan } from '@/components/studies/use-save-plan';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { SelectField } from '@/components/ui/select-field';
import { TextareaField } from '@/components/ui/textarea-field';
import type { FieldFault } from '@/lib/errors';
import { PLAN_REASON_NAMES, PLAN_REASONS, type PlanReason } from '@/lib/studies/schema';

interface CheckSectionProps {
  board: PlanBoardState;
  saving: SavePlan;
}

/** Step 6: how it is drawn, what would change, why, and the save. */
export function CheckSection({ board, saving }: CheckSectionProps) {
  const { plan, sections, crossFaults, differences } = board;
  const versionsHref = `/studies/${encodeURIComponent(plan.study.code)}/plan/versions`;
  const faultOf = (pointer: string): string | undefined =>
    saving.faults.find((fault) => fault.pointer === pointer)?.detail;
  const others = saving.faults.filter((fault) => !fault.pointer.startsWith('/reason'));
  return (
    <SectionFrame step={6} id="check" title="Check and save" folded={false} sentence="" onChange={null}>
      <SimulationFields state={sections.simulation} readOnly={!plan.maySave} />
      {plan.maySave && (
        <div className="mt-5 space-y-5">
          <FaultList faults={[...crossFaults, ...others]} />
          {plan.current && differences && differences.length > 0 && (
            <PlanDifferences
              differences={differences}
              caption={`What changes from version ${plan.current.number}`}
              old={`Version ${plan.current.number}`}
              now="Now"
            />
          )}
          {plan.hasRun && !saving.isCurrent && (
            <fieldset className="space-y-3">
              <legend className="mb-1 text-13 font-600">
                Why it changes: forecasts were made on the version before
              </legend>
              <SelectField
                id={REASON_ID}
                label="Kind of reason"
                fieldClassName="max-w-[320px]"
                value={saving.reason.kind}
                error={faultOf('/reasonKind')}
                options={[
                  { value: '', label: 'Choose a reason' },
                  ...PLAN_REASONS.map((value) => ({ value, label: PLAN_REASON_NAMES[value] })),
                ]}
                onChange={(event) =>
                  saving.setReason({ ...saving.reason, kind: event.target.value as PlanReason | '' })
                }
              />
              <TextareaField
                label="In a sentence"
                rows={2}
                maxLength={2000}
                value={saving.reason.text}
                error={faultOf('/reason')}
                onChange={(event) => saving.setReason({ ...saving.reason, text: event.target.value })}
              />
            </fieldset>
          )}
          {saving.failure && (
            <Notice tone="stop" live title="Not saved">
              {saving.failure}
            </Notice>
          )}
          <Button
            pending={saving.isSaving}
            pendingLabel="Saving"
            disabled={saving.isCurrent}
            onClick={() => void saving.savePlan()}
          >
            Save the plan
          </Button>
        </div>
      )}
      {plan.versions.length > 0 && (
        <p className="mt-5 text-13">
          <Link href={versionsHref}>All versions of the plan, and what each changed</Link>
        </p>
      )}
    </SectionFrame>
  );
}

function FaultList({ faults }: { faults: readonly FieldFault[] }) {
  if (faults.length === 0) return null;
  return (
    <Notice
      tone="stop"
      live
      title={faults.length === 1 ? 'One thing to put right' : `${faults.length} things to put right`}
    >
      <ul>
        {faults.map((fault) => (
          <li key={`${fault.pointer} ${fault.detail}`}>
            <a href={`#${fault.pointer.split('/')[1] === 'enrolment' ? 'target' : fault.pointer.split('/')[1]}`}>
              {fault.detail}
            </a>
          </li>
        ))}
      </ul>
    </Notice>
  );
}
