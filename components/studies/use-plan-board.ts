'use client';

import { useMemo, useState } from 'react';
import type { EnrolmentTyped } from '@/components/studies/enrolment-typed';
import type { EventsTyped } from '@/components/studies/events-typed';
import { keep, keptKey, readKept } from '@/components/studies/kept-typing';
import type { MilestonesTyped } from '@/components/studies/milestones-typed';
import type { PlannedSites } from '@/components/studies/planned-sites';
import { ENROLMENT, EVENTS, MILESTONES, SIMULATION, type SimulationTyped } from '@/components/studies/plan-sections';
import { plannedSiteSet, planStudy } from '@/components/studies/plan-study';
import { type PlanSectionForm, usePlanSection } from '@/components/studies/use-plan-section';
import type { Study } from '@/lib/engine/types';
import type { FieldFault } from '@/lib/errors';
import { usePlan } from '@/lib/studies/hooks';
import { comparePlans, planFaults } from '@/lib/studies/rules';
import { PLAN_SECTIONS, type Plan, type PlanDifference, type PlanSection, type PlanView } from '@/lib/studies/schema';

interface Sections {
  enrolment: PlanSectionForm<EnrolmentTyped>;
  events: PlanSectionForm<EventsTyped>;
  milestones: PlanSectionForm<MilestonesTyped>;
  simulation: PlanSectionForm<SimulationTyped>;
}

export interface PlanBoardState {
  plan: PlanView;
  sections: Sections;
  folded: (section: PlanSection) => boolean;
  open: (section: PlanSection) => void;
  close: (section: PlanSection) => void;
  plannedSites: PlannedSites;
  setPlannedSites: (sites: PlannedSites) => void;
  /** Faults across sections that are each in order. */
  crossFaults: FieldFault[];
  /** What would differ from the current version; null while the plan is not whole. */
  differences: PlanDifference[] | null;
  /** The latest plan that was whole, as a study file; null before there was one. */
  study: Study | null;
  /** Why the picture is not of what the fields say. */
  waitsFor: string | null;
}

const NO_SITES: PlannedSites = { count: '', from: '', to: '' };
const STEPS: Record<PlanSection, string> = {
  enrolment: 'target and rates',
  milestones: 'milestones',
  events: 'events model',
  simulation: 'draws',
};

interface Given {
  initial: PlanView;
  personId: string;
  onDevice: boolean;
}

/** The whole plan page: four forms, what they say together, and the study file of the picture beside them. */
export function usePlanBoard({ initial, personId, onDevice }: Given): PlanBoardState {
  const plan = usePlan(initial.study.code, initial).data;
  const where = { plan, personId, onDevice };
  const sections: Sections = {
    enrolment: usePlanSection(ENROLMENT, where),
    events: usePlanSection(EVENTS, where),
    milestones: usePlanSection(MILESTONES, where),
    simulation: usePlanSection(SIMULATION, where),
  };
  const [opened, setOpened] = useState<readonly PlanSection[]>([]);
  const sitesKey = keptKey(personId, plan.study.code, 'planned-sites');
  const [plannedSites, setSites] = useState<PlannedSites>(() => {
    const kept = onDevice ? readKept(sitesKey, NO_SITES) : null;
    return { ...NO_SITES, ...(kept?.typed as Partial<PlannedSites> | undefined) };
  });

  const wrong = PLAN_SECTIONS.filter((section) => sections[section].value === undefined);
  const whole =
    wrong.length === 0
      ? (Object.fromEntries(PLAN_SECTIONS.map((section) => [section, sections[section].value])) as unknown as Plan)
      : null;
  const crossFaults = whole ? planFaults(whole) : [];
  const sites = plan.sites.length > 0 ? plan.sites : plannedSiteSet(plannedSites, countriesOf(whole));
  const now = whole && crossFaults.length === 0 ? planStudy(plan.study, whole, sites) : null;

  return {
    plan,
    sections,
    folded: (section) => {
      const { isSaved, isChanged, conflict, kept } = sections[section];
      return !plan.maySave || (isSaved && !isChanged && !conflict && !kept && !opened.includes(section));
    },
    open: (section) => setOpened([...opened, section]),
    close: (section) => setOpened(opened.filter((other) => other !== section)),
    plannedSites,
    setPlannedSites: (typed) => {
      setSites(typed);
      keep(sitesKey, { typed, version: 0, keptAt: new Date().toISOString() });
    },
    crossFaults,
    differences: whole && plan.current ? comparePlans(plan.current.plan, whole) : null,
    study: useLastWhole(now),
    waitsFor: waitingWords(now !== null, wrong, sites.length === 0),
  };
}

function countriesOf(plan: Plan | null): string[] {
  return (plan?.enrolment.countryRates ?? []).map((row) => row.country);
}

function waitingWords(drawn: boolean, wrong: readonly PlanSection[], withoutSites: boolean): string | null {
  if (drawn) return null;
  if (wrong.length > 0)
    return `It is drawn as soon as these are in order: ${wrong.map((section) => STEPS[section]).join(', ')}.`;
  return withoutSites
    ? 'It needs sites: add some, or type a stand-in under step 2.'
    : 'It is drawn as soon as the milestones fit the rest.';
}

/** The same study stays the same object, and one that is being typed leaves the last whole one standing. */
function useLastWhole(now: Study | null): Study | null {
  const text = now ? JSON.stringify(now) : null;
  const [last, setLast] = useState(text);
  if (text !== null && text !== last) setLast(text);
  return useMemo(() => (last ? (JSON.parse(last) as Study) : null), [last]);
}
