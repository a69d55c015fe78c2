'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { PlanBoardState } from '@/components/studies/use-plan-board';
import { sayDone } from '@/components/ui/toaster';
import type { FieldFault } from '@/lib/errors';
import { ProblemError } from '@/lib/http/client';
import { useSavePlanVersion } from '@/lib/studies/hooks';
import { PLAN_SECTIONS, type PlanReason, type PlanSection } from '@/lib/studies/schema';

export interface ReasonTyped {
  kind: PlanReason | '';
  text: string;
}

export interface SavePlan {
  reason: ReasonTyped;
  setReason: (reason: ReasonTyped) => void;
  faults: FieldFault[];
  failure: string | null;
  isSaving: boolean;
  /** Nothing differs from the version that stands. */
  isCurrent: boolean;
  savePlan: () => Promise<void>;
}

/** Where the focus goes when the reason is what is missing. */
export const REASON_ID = 'plan-reason';

const NO_REASON: ReasonTyped = { kind: '', text: '' };

/** One press: checks every section, saves those that were typed in, and makes a version of them. */
export function useSavePlan(board: PlanBoardState): SavePlan {
  const { plan, sections } = board;
  const router = useRouter();
  const [reason, setReason] = useState(NO_REASON);
  const [faults, setFaults] = useState<FieldFault[]>([]);
  const [failure, setFailure] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const version = useSavePlanVersion(plan.study.code);

  /** Every section shows its faults; the first one that has some takes the focus. */
  const checkAll = async (): Promise<boolean> => {
    let sound = true;
    for (const section of PLAN_SECTIONS) {
      if (!board.folded(section)) sound = (await sections[section].check(sound)) && sound;
    }
    return sound;
  };

  const saveSections = async (): Promise<Record<PlanSection, number> | null> => {
    const versions = { enrolment: 0, events: 0, milestones: 0, simulation: 0 };
    for (const section of PLAN_SECTIONS) {
      const state = sections[section];
      const saved = state.isChanged || !state.isSaved ? await state.save() : state;
      if (!saved) return null;
      versions[section] = saved.version;
      board.close(section);
    }
    return versions;
  };

  const refuse = (error: Error): void => {
    const problem = error instanceof ProblemError ? error.problem : null;
    setFaults(problem?.errors ?? []);
    if (problem?.errors?.some(({ pointer }) => pointer.startsWith('/reason')))
      document.getElementById(REASON_ID)?.focus();
    setFailure(problem?.errors ? null : error.message);
  };

  const savePlan = async (): Promise<void> => {
    setBusy(true);
    setFaults([]);
    setFailure(null);
    try {
      if (!(await checkAll()) || board.crossFaults.length > 0) return;
      const sectionVersions = await saveSections();
      if (!sectionVersions) return;
      const saved = await version.mutateAsync({
        baseNumber: plan.current?.number ?? 0,
        sectionVersions,
        reasonKind: reason.kind || null,
        reason: reason.text || null,
      });
      setReason(NO_REASON);
      router.refresh();
      sayDone(`The plan is saved as version ${saved.number}.`);
    } catch (error) {
      refuse(error as Error);
    } finally {
      setBusy(false);
    }
  };

  return {
    reason,
    setReason: (typed) => {
      setReason(typed);
      setFaults(faults.filter(({ pointer }) => !pointer.startsWith('/reason')));
    },
    faults,
    failure,
    isSaving: busy,
    isCurrent: board.differences?.length === 0,
    savePlan,
  };
}
