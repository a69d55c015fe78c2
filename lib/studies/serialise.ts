import type { PlanDraftRow } from '../../entities/plan-draft';
import type { PlanVersionRow } from '../../entities/plan-version';
import {
  PLAN_SECTIONS,
  type PlanSection,
  type PlanVersionHead,
  type PlanVersionView,
  type SectionState,
} from './schema';

export function serialiseVersionHead(row: PlanVersionRow, createdBy: string): PlanVersionHead {
  return {
    number: row.number,
    createdAt: row.createdAt.toISOString(),
    createdBy,
    reasonKind: row.reasonKind ?? null,
    reason: row.reason ?? null,
  };
}

export function serialiseVersion(row: PlanVersionRow, createdBy: string): PlanVersionView {
  return { ...serialiseVersionHead(row, createdBy), plan: row.plan };
}

/** The draft section by section; one that was never saved stands as the current version has it. */
export function sectionStates(
  draft: PlanDraftRow | null,
  current: PlanVersionRow | null,
): Record<PlanSection, Required<SectionState>> {
  const state = (section: PlanSection): Required<SectionState> => ({
    value: (draft ? draft.sections[section] : current?.plan[section]) ?? null,
    version: draft?.sections.versions?.[section] ?? 0,
  });
  return Object.fromEntries(PLAN_SECTIONS.map((section) => [section, state(section)])) as Record<
    PlanSection,
    Required<SectionState>
  >;
}

/** An events section that says "no events" is null as well; whether it was said is told by its presence. */
export function isSaved(draft: PlanDraftRow | null, current: PlanVersionRow | null, section: PlanSection): boolean {
  return draft ? draft.sections[section] !== undefined : current !== null;
}
