import type { EntityManager } from '@mikro-orm/postgresql';
import { DataCut, type DataCutRow } from '../../entities/data-cut';
import { Person } from '../../entities/person';
import { Site } from '../../entities/site';
import type { CommandContext } from '../audit/record';
import type { StudyAction } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import type { Subject } from '../engine/types';
import { InvalidError, NotFoundError } from '../errors';
import type { UploadedFile } from '../http/operation';
import { loggedEnrolment } from '../site-log/queries';
import { getFile } from '../storage';
import { readListing } from '../subject-listings/rules';
import type { Listing } from '../subject-listings/schema';
import { countSubjects, type CutSite, cutoffFault, reconcile, subjectFaults } from './rules';
import { type CutHead, type CutPreview, type CutView, type ReconciledSite, SHOWN_SUBJECTS } from './schema';
import { serialiseCut, serialiseCutHead } from './serialise';

type Read = Pick<CommandContext, 'em'>;
type ReadScope = StudyScope<'data-cuts:read'> | StudyScope<'data-cuts:accept'>;

const keyOf = (scope: StudyScope<StudyAction>) => ({ organisationId: scope.organisationId, studyId: scope.studyId });

export interface CheckedListing {
  listing: Listing;
  sites: ReconciledSite[];
}

/** Preview and acceptance read a listing in the same way; only acceptance stores. */
export async function checkListing(
  scope: StudyScope<'data-cuts:accept'>,
  { file, cutoffOn }: { file: UploadedFile; cutoffOn: string },
  { em, clock }: Pick<CommandContext, 'em' | 'clock'>,
): Promise<CheckedListing> {
  const ahead = cutoffFault(cutoffOn, calendarDay(clock.now()));
  if (ahead) throw new InvalidError([{ pointer: '/cutoffOn', detail: ahead }]);
  const rows = await em.find(Site, keyOf(scope), { fields: ['code', 'activatedOn', 'closedOn'] });
  const sites = new Map<string, CutSite>(
    rows.map(({ code, activatedOn = null, closedOn = null }) => [code, { activatedOn, closedOn }]),
  );
  const listing = readListing(file.bytes, scope.studyCode, (subject) => subjectFaults(subject, { sites, cutoffOn }));
  return { listing, sites: reconcile(listing.subjects, await loggedEnrolment(em, scope, cutoffOn)) };
}

export async function previewCut(
  scope: StudyScope<'data-cuts:accept'>,
  { file, body }: { file: UploadedFile; body: { cutoffOn: string } },
  context: CommandContext,
): Promise<CutPreview> {
  const { listing, sites } = await checkListing(scope, { file, cutoffOn: body.cutoffOn }, context);
  return {
    fileName: file.name,
    form: listing.form,
    cutoffOn: body.cutoffOn,
    rows: listing.rows,
    counts: countSubjects(listing.subjects),
    faultCount: listing.faultCount,
    faults: listing.faults,
    subjects: listing.subjects.slice(0, SHOWN_SUBJECTS).map(({ row: _, ...subject }) => subject),
    sites,
    noteNeeded: sites.some((site) => !site.agrees),
  };
}

export async function listCuts(
  scope: StudyScope<'data-cuts:read'>,
  { query }: { query: { page: number; size: number } },
  { em }: Read,
): Promise<{ items: CutHead[]; page: number; size: number; total: number }> {
  const [rows, total] = await em.findAndCount(DataCut, keyOf(scope), {
    orderBy: { number: 'desc' },
    limit: query.size,
    offset: (query.page - 1) * query.size,
  });
  const nameOf = await namesOf(em, rows);
  return { items: rows.map((row) => serialiseCutHead(row, nameOf(row))), page: query.page, size: query.size, total };
}

export async function getCut(
  scope: StudyScope<'data-cuts:read'>,
  { params }: { params: { number: number } },
  { em }: Read,
): Promise<CutView> {
  return viewCut(scope, await getCutRow(scope, params.number, em), em);
}

export async function viewCut(scope: ReadScope, row: DataCutRow, em: EntityManager): Promise<CutView> {
  const runs = await em.execute<{ number: number }[]>(
    `select number from forecast_run where organisation_id = ? and data_cut_id = ? order by number desc limit 50`,
    [scope.organisationId, row.id],
  );
  return serialiseCut(
    row,
    (await namesOf(em, [row]))(row),
    runs.map((run) => run.number),
  );
}

/** The bytes as they were uploaded; the SHA-256 recorded at acceptance is compared before they leave. */
export async function getCutFile(
  scope: StudyScope<'data-cuts:read'>,
  { params }: { params: { number: number } },
  { em }: Read,
): Promise<Response> {
  const row = await getCutRow(scope, params.number, em);
  if (!row.fileKey || !row.fileSha256)
    throw new NotFoundError(`Data cut ${row.number} is of totals: there is no listing.`);
  const bytes = await getFile(row.fileKey, row.fileSha256);
  return new Response(bytes as BodyInit, {
    headers: {
      'content-type': 'text/csv',
      'content-length': String(bytes.byteLength),
      'content-disposition': `attachment; filename="${scope.studyCode}-data-cut-${row.number}.csv"`,
      'cache-control': 'no-store',
    },
  });
}

export async function getCutRow(
  scope: StudyScope<StudyAction>,
  number: number,
  em: EntityManager,
): Promise<DataCutRow> {
  const row = await em.findOne(DataCut, { ...keyOf(scope), number });
  if (!row) throw new NotFoundError(`There is no data cut ${number} of ${scope.studyCode}.`);
  return row;
}

/** The subjects of a cut, by identifier. */
export async function listCutSubjects(
  scope: StudyScope<StudyAction>,
  dataCutId: string,
  em: EntityManager,
): Promise<Subject[]> {
  return em.execute<Subject[]>(
    `select subject_id as id, site_code as site, to_char(randomised_on, 'YYYY-MM-DD') as "randomisedOn", status, to_char(status_on, 'YYYY-MM-DD') as "statusOn"
       from data_cut_subject where organisation_id = ? and data_cut_id = ? order by subject_id`,
    [scope.organisationId, dataCutId],
  );
}

async function namesOf(em: EntityManager, rows: readonly DataCutRow[]): Promise<(row: DataCutRow) => string> {
  const people = await em.find(Person, { id: { $in: [...new Set(rows.map((row) => row.acceptedBy))] } });
  const names = new Map(people.map((person) => [person.id, person.name]));
  return (row) => names.get(row.acceptedBy) ?? 'someone who has left';
}
