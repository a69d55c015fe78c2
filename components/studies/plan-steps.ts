import { isTargetField } from '@/components/studies/enrolment-typed';
import type { PlanBoardState } from '@/components/studies/use-plan-board';
import type { FieldFault } from '@/lib/errors';
import { formatQuantity } from '@/lib/format';
import type { Plan, PlanSection } from '@/lib/studies/schema';

export interface PlanStep {
  step: number;
  id: string;
  title: string;
  /** How it stands: "done: 900 patients", "1 to put right", "to fill in". */
  words: string;
  faults: number;
}

/** The six steps and how each stands; a fault counts at the step whose field it is. */
export function planSteps(board: PlanBoardState, refused: readonly FieldFault[]): PlanStep[] {
  const { plan, sections } = board;
  const saved = <S extends keyof Plan>(section: S): Plan[S] | null => sections[section].savedValue as Plan[S] | null;
  const enrolment = saved('enrolment');
  const target = sections.enrolment.shownFaults.filter((fault) => isTargetField(fault.field)).length;
  const rates = sections.enrolment.shownFaults.length - target;
  const across = (section: PlanSection): number =>
    board.crossFaults.filter((fault) => fault.pointer.startsWith(`/${section}`)).length;
  const stands = (section: PlanSection, done: string): string => {
    if (sections[section].isChanged) return 'typed, not saved yet';
    return sections[section].isSaved ? done : 'to fill in';
  };
  const steps: PlanStep[] = [
    { step: 1, id: 'study', title: 'Study', words: `${plan.study.code}, ${plan.study.sponsorName}`, faults: 0 },
    {
      step: 2,
      id: 'target',
      title: 'Sites and target',
      words: stands(
        'enrolment',
        `${formatQuantity(enrolment?.target ?? 0, 'patient')}, ${formatQuantity(plan.sites.length, 'site')}`,
      ),
      faults: target,
    },
    {
      step: 3,
      id: 'rates',
      title: 'Rates',
      words: stands('enrolment', `${enrolment?.rate.meanPerMonth} a month`),
      faults: rates,
    },
    {
      step: 4,
      id: 'milestones',
      title: 'Milestones',
      words: stands('milestones', `${saved('milestones')?.length ?? 0} set`),
      faults: sections.milestones.shownFaults.length + across('milestones'),
    },
    {
      step: 5,
      id: 'events',
      title: 'Events model',
      words: stands('events', saved('events') ? 'from the protocol' : 'no events'),
      faults: sections.events.shownFaults.length + across('events'),
    },
    {
      step: 6,
      id: 'check',
      title: 'Check and save',
      words: plan.current ? `version ${plan.current.number} stands` : 'no version yet',
      faults: sections.simulation.shownFaults.length + refused.length,
    },
  ];
  return steps.map((step) => (step.faults > 0 ? { ...step, words: `${step.faults} to put right` } : step));
}
