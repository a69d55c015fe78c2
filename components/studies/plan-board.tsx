'use client';

import { usePlanForecast } from '@/components/forecast-worker/use-plan-forecast';
import { useOnDevice } from '@/components/site-log/use-phone';
import { CheckSection } from '@/components/studies/check-section';
import { EnrolmentSections } from '@/components/studies/enrolment-sections';
import { EventsSection } from '@/components/studies/events-section';
import { MilestonesSection } from '@/components/studies/milestones-section';
import { PlanHead } from '@/components/studies/plan-head';
import { PlanPreview } from '@/components/studies/plan-preview';
import { PlanStepList } from '@/components/studies/plan-step-list';
import { planSteps } from '@/components/studies/plan-steps';
import { SectionFrame } from '@/components/studies/section-frame';
import { usePlanBoard } from '@/components/studies/use-plan-board';
import { useSavePlan } from '@/components/studies/use-save-plan';
import type { PlanSection, PlanView } from '@/lib/studies/schema';

interface PlanBoardProps {
  initial: PlanView;
  personId: string;
}

/** Drawn once as the server has it, then anew on the device, which may hold typing that was not saved. */
export function PlanBoard(props: PlanBoardProps) {
  const onDevice = useOnDevice();
  return <PlanPage key={String(onDevice)} {...props} onDevice={onDevice} />;
}

function PlanPage({ initial, personId, onDevice }: PlanBoardProps & { onDevice: boolean }) {
  const board = usePlanBoard({ initial, personId, onDevice });
  const saving = useSavePlan(board);
  const { forecast, state, error } = usePlanForecast(onDevice ? board.study : null);
  const { plan, sections } = board;
  const steps = planSteps(board, saving.faults);
  const frameOf = (section: PlanSection) => ({
    folded: board.folded(section),
    onChange: plan.maySave ? () => board.open(section) : null,
    onDone: () => board.close(section),
  });
  return (
    <>
      <PlanHead plan={plan} forecast={forecast} steps={steps} isPending={!saving.isCurrent} saving={saving} />
      <div className="border-t border-ink lg:grid lg:grid-cols-[132px_minmax(0,1fr)_372px] lg:gap-x-7">
        <PlanStepList steps={steps} />
        <div className="min-w-0 [&>section:first-child]:mt-0 [&>section:first-child]:border-t-0">
          <SectionFrame
            step={1}
            id="study"
            title="Study"
            folded
            onChange={null}
            sentence={`${plan.study.code}, ${plan.study.title}, for ${plan.study.sponsorName}. The organisation’s owner gave it its name.`}
          >
            {null}
          </SectionFrame>
          <EnrolmentSections
            plan={plan}
            state={sections.enrolment}
            {...frameOf('enrolment')}
            plannedSites={board.plannedSites}
            onPlannedSites={board.setPlannedSites}
          />
          <MilestonesSection state={sections.milestones} {...frameOf('milestones')} />
          <EventsSection state={sections.events} {...frameOf('events')} />
          <CheckSection board={board} saving={saving} />
        </div>
        <aside
          aria-label="What the plan implies"
          className="max-lg:mt-8 lg:-ml-3.5 lg:border-l lg:border-rule lg:pl-3.5"
        >
          <PlanPreview
            forecast={forecast}
            waitsFor={board.waitsFor}
            error={error}
            atWork={state === 'drawing'}
            standIn={plan.sites.length === 0}
          />
        </aside>
      </div>
    </>
  );
}
