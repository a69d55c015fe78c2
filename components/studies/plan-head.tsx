import { Button } from '@/components/ui/button';
import { Mark } from '@/components/ui/mark';
import { type HeadFigure, PageHead } from '@/components/ui/page-head';
import type { PlanStep } from '@/components/studies/plan-steps';
import type { SavePlan } from '@/components/studies/use-save-plan';
import type { Forecast } from '@/lib/engine/types';
import { formatDate, formatInstant, formatMonthRange, formatPercent, formatProbability } from '@/lib/format';
import type { PlanView } from '@/lib/studies/schema';

interface PlanHeadProps {
  plan: PlanView;
  forecast: Forecast | null;
  steps: readonly PlanStep[];
  /** Something is typed or was never saved as a version. */
  isPending: boolean;
  saving: SavePlan;
}

/** The plan's first milestone, as the plan alone would have it. */
function planFigure(forecast: Forecast | null): HeadFigure | undefined {
  const milestone = forecast?.milestones.find((one) => one.kind === 'randomised') ?? forecast?.milestones[0];
  if (!milestone || milestone.quantiles['0.1'] === null) return undefined;
  const { quantiles, plannedOn, probabilityByPlanned: chance } = milestone;
  return {
    label: (
      <>
        <b>{milestone.name ?? milestone.code}</b>, if the plan holds
      </>
    ),
    value: formatMonthRange(quantiles['0.1'], quantiles['0.9']),
    unit: formatPercent(0.8),
    below: (
      <>
        {quantiles['0.5'] && `Median ${formatDate(quantiles['0.5'])}.`}{' '}
        {plannedOn && chance !== null && (
          <>
            <Mark kind="planned" /> Planned {formatDate(plannedOn)}; {formatProbability(chance)} chance by then, on the
            plan’s own figures.
          </>
        )}
      </>
    ),
  };
}

export function PlanHead({ plan, forecast, steps, isPending, saving }: PlanHeadProps) {
  const { study, current, draft, maySave } = plan;
  const home = `/studies/${encodeURIComponent(study.code)}`;
  return (
    <PageHead
      path={[
        { label: 'Studies', href: '/studies' },
        { label: study.code, href: current ? home : undefined },
        { label: current ? 'Plan' : 'Set up' },
      ]}
      title={study.title}
      figure={planFigure(forecast)}
      action={
        maySave ? (
          <>
            <Button
              pending={saving.isSaving}
              pendingLabel="Saving"
              disabled={saving.isCurrent}
              onClick={() => void saving.savePlan()}
            >
              Save the plan
            </Button>
            <FaultWords steps={steps} />
            {saving.failure && <p className="text-13 text-stop">{saving.failure}</p>}
            <p className="text-13 text-ink-soft">
              {draft &&
                isPending &&
                `Kept as a draft on ${formatInstant(draft.savedAt)} UTC by ${draft.savedBy}. You can leave and come back. `}
              {current &&
                `Version ${current.number}, saved ${formatInstant(current.createdAt)} UTC by ${current.createdBy}${saving.isCurrent ? ', stands; nothing has changed since.' : '.'}`}
            </p>
          </>
        ) : (
          <p className="text-13 text-ink-soft">
            {current
              ? `Version ${current.number}, saved ${formatInstant(current.createdAt)} UTC by ${current.createdBy}. The protocol statistician changes it.`
              : 'No version of the plan is saved yet. The protocol statistician sets it up.'}
          </p>
        )
      }
    />
  );
}

/** Faults are counted beside the action, each with a way to its step. */
function FaultWords({ steps }: { steps: readonly PlanStep[] }) {
  const wrong = steps.filter((step) => step.faults > 0);
  const count = wrong.reduce((sum, step) => sum + step.faults, 0);
  if (count === 0) return null;
  return (
    <p role="status" className="text-13">
      <b className="text-stop">{count === 1 ? 'One thing to put right' : `${count} things to put right`}</b> under{' '}
      {wrong.map((step, place) => (
        <span key={step.id}>
          {place > 0 && ', '}
          <a href={`#${step.id}`}>{step.title}</a>
        </span>
      ))}
      , then the plan can be saved.
    </p>
  );
}
