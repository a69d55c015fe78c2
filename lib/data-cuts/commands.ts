import { createHash, randomUUID } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import { DataCut, type DataCutRow } from '../../entities/data-cut';
import { type CommandContext, recordAudit } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { InvalidError } from '../errors';
import { formatCount } from '../format';
import type { UploadedFile } from '../http/operation';
import { loggedEnrolment } from '../site-log/queries';
import { putFile } from '../storage';
import type { Listing, ListedSubject } from '../subject-listings/schema';
import { checkListing, viewCut } from './queries';
import {
  aggregateDifference,
  aggregateFaults,
  countAggregate,
  countSubjects,
  cutoffFault,
  differencesOf,
  noteNeededSentence,
} from './rules';
import type { AcceptAggregateBody, AcceptCutBody, CutView, SiteDifference } from './schema';

type AcceptScope = StudyScope<'data-cuts:accept'>;

/**
 * Accepts a listing as the study's next data cut: the file as it came, its rows, and the note on what the log has otherwise.
 * Nothing of it changes afterwards; a better listing is another cut. The same file for the same cut-off is accepted once.
 */
export async function acceptCut(
  scope: AcceptScope,
  { file, body }: { file: UploadedFile; body: AcceptCutBody },
  context: CommandContext,
): Promise<CutView> {
  const { em } = context;
  const { listing, sites } = await checkListing(scope, { file, cutoffOn: body.cutoffOn }, context);
  refuseFaults(listing);
  const differences = differencesOf(sites);
  refuseWithoutNote(differences, body.note);
  await holdStudy(scope, em);
  const fileSha256 = createHash('sha256').update(file.bytes).digest('hex');
  const present = await em.findOne(DataCut, {
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    cutoffOn: body.cutoffOn,
    fileSha256,
  });
  if (present) return viewCut(scope, present, em);
  const id = randomUUID();
  const { key } = await putFile(
    `organisations/${scope.organisationId}/studies/${scope.studyId}/data-cuts/${id}.csv`,
    file.bytes,
    'text/csv',
  );
  const row = await insertCut(scope, context, {
    id,
    kind: 'subjects',
    cutoffOn: body.cutoffOn,
    note: body.note,
    differences,
    counts: countSubjects(listing.subjects),
    file: { fileName: file.name, fileKey: key, fileSha256, fileBytes: file.bytes.byteLength },
    aggregate: null,
  });
  await insertSubjects(scope, id, listing.subjects, em);
  return viewCut(scope, row, em);
}

/** Accepts totals where no listing may be had. */
export async function acceptAggregate(
  scope: AcceptScope,
  { body }: { body: AcceptAggregateBody },
  context: CommandContext,
): Promise<CutView> {
  const { em, clock } = context;
  const ahead = cutoffFault(body.cutoffOn, calendarDay(clock.now()));
  const faults = [...(ahead ? [{ pointer: '/cutoffOn', detail: ahead }] : []), ...aggregateFaults(body)];
  if (faults.length > 0) throw new InvalidError(faults);
  const counts = countAggregate(body);
  const differences = aggregateDifference(counts, await loggedEnrolment(em, scope, body.cutoffOn));
  refuseWithoutNote(differences, body.note);
  await holdStudy(scope, em);
  const { cutoffOn, note, events, withdrawn, atRisk, personMonths } = body;
  const aggregate = { events, withdrawn, atRisk, personMonths };
  const [last] = await em.find(
    DataCut,
    { organisationId: scope.organisationId, studyId: scope.studyId },
    { orderBy: { number: 'desc' }, limit: 1 },
  );
  // The button pressed twice: the same totals straight after each other are one cut.
  if (last?.cutoffOn === cutoffOn && sameTotals(last, aggregate)) return viewCut(scope, last, em);
  const row = await insertCut(scope, context, {
    id: randomUUID(),
    kind: 'aggregate',
    cutoffOn,
    note,
    differences,
    counts,
    file: null,
    aggregate,
  });
  return viewCut(scope, row, em);
}

function sameTotals({ aggregate }: DataCutRow, totals: NonNullable<DataCutRow['aggregate']>): boolean {
  return (
    aggregate !== null &&
    aggregate !== undefined &&
    (Object.keys(totals) as (keyof typeof totals)[]).every((field) => aggregate[field] === totals[field])
  );
}

function refuseFaults({ faults, faultCount }: Listing): void {
  if (faultCount === 0) return;
  const rest = faultCount - faults.length;
  throw new InvalidError(
    [
      ...faults.map(({ row, column, value, detail }) => ({
        pointer:
          column === null ? `/rows/${row}` : `/rows/${row}/${column.replaceAll('~', '~0').replaceAll('/', '~1')}`,
        detail: `Row ${row}${column === null ? '' : `, ${column}`}${value === null || value === '' ? '' : `, “${value}”`}: ${detail}`,
      })),
      ...(rest > 0 ? [{ pointer: '/file', detail: `And ${formatCount(rest)} more of these.` }] : []),
    ],
    faultCount === 1 ? 'One thing needs to be put right.' : `${formatCount(faultCount)} things need to be put right.`,
  );
}

function refuseWithoutNote(differences: SiteDifference[], note: string | null): void {
  if (differences.length > 0 && note === null)
    throw new InvalidError([{ pointer: '/note', detail: noteNeededSentence(differences) }]);
}

/** One cut of a study at a time: its number follows the one before. */
async function holdStudy(scope: AcceptScope, em: EntityManager): Promise<void> {
  await em.execute(`select 1 from study where organisation_id = ? and id = ? for no key update`, [
    scope.organisationId,
    scope.studyId,
  ]);
}

interface NewCut extends Pick<DataCutRow, 'id' | 'kind' | 'cutoffOn' | 'counts' | 'differences'> {
  note: string | null;
  aggregate: NonNullable<DataCutRow['aggregate']> | null;
  file: { fileName: string; fileKey: string; fileSha256: string; fileBytes: number } | null;
}

async function insertCut(scope: AcceptScope, context: CommandContext, cut: NewCut): Promise<DataCutRow> {
  const { em, clock } = context;
  const { organisationId, studyId, actor } = scope;
  const { file, ...rest } = cut;
  const [last] = await em.execute<{ number: number | null }[]>(
    `select max(number) as number from data_cut where organisation_id = ? and study_id = ?`,
    [organisationId, studyId],
  );
  const number = (last?.number ?? 0) + 1;
  await em.insert(DataCut, {
    ...rest,
    ...file,
    organisationId,
    studyId,
    number,
    acceptedAt: clock.now(),
    acceptedBy: actor.personId,
  });
  const said = {
    cutoffOn: cut.cutoffOn,
    ...(file ? { fileName: file.fileName, sha256: file.fileSha256 } : { totals: cut.aggregate }),
    subjects: cut.counts.subjects,
    differences: cut.differences,
  };
  await recordAudit(context, scope, {
    action: 'data-cuts:accept',
    recordType: 'data-cut',
    recordId: String(number),
    changes: Object.entries(said).map(([field, value]) => ({ field, old: null, new: value })),
    reason: cut.note,
  });
  return em.findOneOrFail(DataCut, { organisationId, id: cut.id });
}

const ROWS_AT_ONCE = 10_000;

/** In bulk: one statement for ten thousand rows, with one parameter. */
async function insertSubjects(
  { organisationId }: AcceptScope,
  dataCutId: string,
  subjects: readonly ListedSubject[],
  em: EntityManager,
): Promise<void> {
  for (let from = 0; from < subjects.length; from += ROWS_AT_ONCE) {
    const rows = subjects.slice(from, from + ROWS_AT_ONCE);
    await em.execute(
      `insert into data_cut_subject (id, organisation_id, data_cut_id, subject_id, site_code, randomised_on, status, status_on)
       select gen_random_uuid(), ?, ?, r.id, r.site, r."randomisedOn", r.status, r."statusOn"
         from jsonb_to_recordset(?::jsonb) as r (id text, site text, "randomisedOn" date, status text, "statusOn" date)`,
      [organisationId, dataCutId, JSON.stringify(rows)],
    );
  }
}
