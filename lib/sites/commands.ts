import { randomUUID } from 'node:crypto';
import { LockMode } from '@mikro-orm/postgresql';
import { changedFields, type CommandContext, recordAudit } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { ConflictError, type FieldFault, InvalidError, NotFoundError } from '../errors';
import { Site } from '../../entities/site';
import { recordOfSite } from './queries';
import { NOTHING_LOGGED, siteFaults, type SiteRecord } from './rules';
import type { ChangeSiteBody, SiteInput, SiteView } from './schema';
import { inputOf, serialiseSite } from './serialise';

type ChangeScope = StudyScope<'sites:change'>;

export async function addSite(
  scope: ChangeScope,
  { body }: { body: SiteInput },
  context: CommandContext,
): Promise<SiteView> {
  await refuseFaults(scope, body, { record: NOTHING_LOGGED, siteId: null }, context);
  const { em, clock } = context;
  const site = em.create(Site, {
    id: randomUUID(),
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    ...body,
    createdAt: clock.now(),
  });
  em.persist(site);
  await em.flush();
  await recordAudit(context, scope, {
    action: 'sites:add',
    recordType: 'site',
    recordId: site.code,
    changes: changedFields({}, body),
  });
  return serialiseSite(site);
}

export async function changeSite(
  scope: ChangeScope,
  { params, body }: { params: { site: string }; body: ChangeSiteBody },
  context: CommandContext,
): Promise<SiteView> {
  const { em } = context;
  // Locked: a coordinator who saves a month meanwhile is judged by the new cap and dates, or these by their figures.
  const site = await em.findOne(
    Site,
    { organisationId: scope.organisationId, studyId: scope.studyId, code: params.site },
    { lockMode: LockMode.PESSIMISTIC_WRITE, refresh: true },
  );
  if (!site) throw new NotFoundError(`There is no site ${params.site} in this study.`);
  const { version, ...input } = body;
  const before = inputOf(site);
  const changes = changedFields(before, input);
  if (changes.length === 0) return serialiseSite(site);
  if (version !== site.version)
    throw new ConflictError(
      `Someone else changed site ${site.code} while you were working on it.`,
      serialiseSite(site),
    );
  await refuseFaults(scope, input, { record: await recordOfSite(scope, em, site.id), siteId: site.id }, context);
  Object.assign(site, input);
  await em.flush();
  await recordAudit(context, scope, { action: 'sites:change', recordType: 'site', recordId: before.code, changes });
  return serialiseSite(site);
}

interface Known {
  record: SiteRecord;
  siteId: string | null;
}

async function refuseFaults(
  scope: ChangeScope,
  input: SiteInput,
  { record, siteId }: Known,
  { em, clock }: CommandContext,
): Promise<void> {
  const faults: FieldFault[] = siteFaults(input, record, calendarDay(clock.now())).map(({ field, detail }) => ({
    pointer: `/${field}`,
    detail,
  }));
  const [twin] = await em.execute<{ code: string; name: string }[]>(
    `select code, name from site where organisation_id = ? and study_id = ? and lower(code) = lower(?) and (?::uuid is null or id <> ?::uuid)`,
    [scope.organisationId, scope.studyId, input.code, siteId, siteId],
  );
  if (twin)
    faults.unshift({
      pointer: '/code',
      detail: `Site ${twin.code} is in this study already: ${twin.name}. Give another code.`,
    });
  if (faults.length > 0) throw new InvalidError(faults);
}
