import { randomUUID } from 'node:crypto';
import { type EntityManager, LockMode } from '@mikro-orm/postgresql';
import { changedFields, type CommandContext, recordAudit } from '../audit/record';
import type { OrganisationScope, StudyScope } from '../auth/scope';
import { ConflictError, type FieldFault, InvalidError } from '../errors';
import { PlanDraft, type PlanDraftRow } from '../../entities/plan-draft';
import { PlanVersion, type PlanVersionRow } from '../../entities/plan-version';
import { Person } from '../../entities/person';
import { Study } from '../../entities/study';
import { findCurrentVersion, hasRun } from './queries';
import { planChanges, planFaults, type PartialPlan, sameValue } from './rules';
import {
  type CreateStudyBody,
  type Plan,
  PLAN_REASON_NAMES,
  PLAN_SECTIONS,
  type PlanDraftSections,
  type PlanVersionView,
  type SavedSection,
  type SavePlanSectionBody,
  type SavePlanVersionBody,
  SECTION_SCHEMAS,
  type StudyView,
} from './schema';
import { serialiseVersion, serialiseVersionHead } from './serialise';

type SaveScope = StudyScope<'plan:save'>;

export async function createStudy(
  scope: OrganisationScope<'organisation:create-study'>,
  { body }: { body: CreateStudyBody },
  context: CommandContext,
): Promise<StudyView> {
  const { em, clock } = context;
  const [twin] = await em.execute<{ code: string; title: string }[]>(
    `select code, title from study where organisation_id = ? and lower(code) = lower(?)`,
    [scope.organisationId, body.code],
  );
  if (twin)
    throw new ConflictError(
      `${scope.organisationName} has a study ${twin.code} already: ${twin.title}. Give another code.`,
      twin,
    );
  const study = em.create(Study, {
    id: randomUUID(),
    organisationId: scope.organisationId,
    ...body,
    createdAt: clock.now(),
    createdBy: scope.actor.personId,
  });
  await em.persist(study).flush();
  await recordAudit(
    context,
    { ...scope, studyId: study.id },
    { action: 'studies:create', recordType: 'study', recordId: study.code, changes: changedFields({}, body) },
  );
  return { ...body, createdAt: study.createdAt.toISOString() };
}

/** One section of the draft. The same values again change nothing; a section that someone else saved meanwhile is shown, not overwritten. */
export async function savePlanSection(
  scope: SaveScope,
  { body }: { body: SavePlanSectionBody },
  context: CommandContext,
): Promise<SavedSection> {
  const { section, version, value } = body;
  const { em, clock } = context;
  const draft = await lockDraft(scope, context);
  const stands = draft.sections[section];
  const standing = draft.sections.versions?.[section] ?? 0;
  if (stands !== undefined && sameValue(stands, value)) return savedSection(draft, section, em);
  if (version !== standing)
    throw new ConflictError(
      'Someone else saved this section while you were working on it.',
      await savedSection(draft, section, em),
    );
  const changes = planChanges(stands, value, section);
  draft.sections = {
    ...draft.sections,
    [section]: value,
    versions: { ...draft.sections.versions, [section]: standing + 1 },
  };
  draft.updatedAt = clock.now();
  draft.updatedBy = scope.actor.personId;
  await em.flush();
  await recordAudit(context, scope, {
    action: 'plan:save-section',
    recordType: 'plan-draft',
    recordId: section,
    changes,
  });
  return savedSection(draft, section, em);
}

async function savedSection(
  draft: PlanDraftRow,
  section: SavedSection['section'],
  em: EntityManager,
): Promise<SavedSection> {
  return {
    section,
    value: draft.sections[section] ?? null,
    version: draft.sections.versions?.[section] ?? 0,
    savedAt: draft.updatedAt.toISOString(),
    savedBy: await nameOf(draft.updatedBy, em),
  };
}

async function nameOf(personId: string, em: EntityManager): Promise<string> {
  return (await em.findOne(Person, { id: personId }))?.name ?? 'someone who has left';
}

/** The study's one draft, locked, so that two saves meet one after the other. The first begins where the current version stands. */
async function lockDraft(scope: SaveScope, { em, clock }: CommandContext): Promise<PlanDraftRow> {
  const current = await findCurrentVersion(scope, em);
  const sections: PlanDraftSections = current ? { ...current.plan } : {};
  await em.execute(
    `insert into plan_draft (id, organisation_id, study_id, sections, updated_at, updated_by) values (?, ?, ?, ?::jsonb, ?, ?) on conflict (organisation_id, study_id) do nothing`,
    [randomUUID(), scope.organisationId, scope.studyId, JSON.stringify(sections), clock.now(), scope.actor.personId],
  );
  return em.findOneOrFail(
    PlanDraft,
    { organisationId: scope.organisationId, studyId: scope.studyId },
    { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
  );
}

/** The draft becomes the next version, which nothing changes any more. A second press finds it done. */
export async function savePlanVersion(
  scope: SaveScope,
  { body }: { body: SavePlanVersionBody },
  context: CommandContext,
): Promise<PlanVersionView> {
  const { em, clock } = context;
  const draft = await lockDraft(scope, context);
  const current = await findCurrentVersion(scope, em);
  await refuseOtherSections(body, draft, current, em);
  if (current && PLAN_SECTIONS.every((section) => sameValue(draft.sections[section], current.plan[section])))
    return serialiseVersion(current, await nameOf(current.createdBy, em));
  if (body.baseNumber !== (current?.number ?? 0)) throw await staleConflict(draft, current, [], em);
  const plan = await checkedPlan(scope, body, draft, em);
  const row = em.create(PlanVersion, {
    id: randomUUID(),
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    number: (current?.number ?? 0) + 1,
    plan,
    reasonKind: body.reasonKind,
    reason: body.reason || null,
    createdAt: clock.now(),
    createdBy: scope.actor.personId,
  });
  await em.persist(row).flush();
  await recordAudit(context, scope, {
    action: 'plan:save-version',
    recordType: 'plan-version',
    recordId: String(row.number),
    changes: planChanges(current?.plan, plan),
    reason: body.reasonKind
      ? [PLAN_REASON_NAMES[body.reasonKind], body.reason].filter(Boolean).join(': ')
      : body.reason || null,
  });
  return serialiseVersion(row, scope.actor.name);
}

/** What is saved as a version is what its author had in view. */
async function refuseOtherSections(
  body: SavePlanVersionBody,
  draft: PlanDraftRow,
  current: PlanVersionRow | null,
  em: EntityManager,
): Promise<void> {
  const moved = PLAN_SECTIONS.filter(
    (section) => (draft.sections.versions?.[section] ?? 0) !== body.sectionVersions[section],
  );
  if (moved.length > 0) throw await staleConflict(draft, current, moved, em);
}

async function staleConflict(
  draft: PlanDraftRow,
  current: PlanVersionRow | null,
  moved: readonly SavedSection['section'][],
  em: EntityManager,
): Promise<ConflictError> {
  const sections: SavedSection[] = [];
  for (const section of moved) sections.push(await savedSection(draft, section, em));
  return new ConflictError(
    'Someone else changed the plan while you were working on it. Look at what stands now, then save.',
    { version: current && serialiseVersionHead(current, await nameOf(current.createdBy, em)), sections },
  );
}

async function checkedPlan(
  scope: SaveScope,
  body: SavePlanVersionBody,
  draft: PlanDraftRow,
  em: EntityManager,
): Promise<Plan> {
  const faults: FieldFault[] = [];
  const parts: Record<string, unknown> = {};
  for (const section of PLAN_SECTIONS) {
    if (draft.sections[section] === undefined) continue;
    const parsed = SECTION_SCHEMAS[section].safeParse(draft.sections[section]);
    if (parsed.success) parts[section] = parsed.data;
    else
      faults.push(
        ...parsed.error.issues.map((issue) => ({
          pointer: `/${[section, ...issue.path].join('/')}`,
          detail: issue.message,
        })),
      );
  }
  const read = new Set(faults.map((fault) => fault.pointer.split('/')[1]));
  faults.push(...planFaults(parts as PartialPlan).filter((fault) => !read.has(fault.pointer.slice(1))));
  if (await hasRun(scope, em)) faults.push(...reasonFaults(body));
  if (faults.length > 0) throw new InvalidError(faults);
  return parts as unknown as Plan;
}

function reasonFaults({ reasonKind, reason }: SavePlanVersionBody): FieldFault[] {
  return [
    ...(reasonKind
      ? []
      : [
          { pointer: '/reasonKind', detail: 'Choose why the plan changes: forecasts were made on the version before.' },
        ]),
    ...(reason ? [] : [{ pointer: '/reason', detail: 'Say in a sentence what changed and why.' }]),
  ];
}
