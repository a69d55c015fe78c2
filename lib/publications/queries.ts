import type { EntityManager } from '@mikro-orm/postgresql';
import { Person } from '../../entities/person';
import { Publication, type PublicationRow } from '../../entities/publication';
import { PublicationAcknowledgement } from '../../entities/publication-acknowledgement';
import { StudyMember } from '../../entities/study-member';
import type { CommandContext } from '../audit/record';
import { STUDY_ROLES, roleMay, type StudyAction } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { daysApart } from '../dates';
import type { MilestoneForecast } from '../engine/types';
import { NotFoundError } from '../errors';
import { nextMilestone } from './rules';
import type { Acknowledgement, PublicationHead, PublicationsQuery, PublicationView, ReaderCount } from './schema';
import { serialiseHead, serialisePublication } from './serialise';

type Read = Pick<CommandContext, 'em'>;
type ReadScope =
  StudyScope<'publications:read'> | StudyScope<'publications:publish'> | StudyScope<'publications:acknowledge'>;

/** As many publications as the history of a date shows. */
export const HISTORY_LENGTH = 12;

const LEFT = 'someone who has left';

const keyOf = (scope: StudyScope<StudyAction>) => ({ organisationId: scope.organisationId, studyId: scope.studyId });

export async function listPublications(
  scope: StudyScope<'publications:read'>,
  { query }: { query: PublicationsQuery },
  { em }: Read,
): Promise<{ items: PublicationHead[]; page: number; size: number; total: number }> {
  const [rows, total] = await em.findAndCount(Publication, keyOf(scope), {
    orderBy: { number: 'desc' },
    limit: query.size,
    offset: (query.page - 1) * query.size,
  });
  const names = await namesOf(em, rows);
  return { items: rows.map((row) => serialiseHead(row, names(row))), page: query.page, size: query.size, total };
}

export async function getPublication(
  scope: StudyScope<'publications:read'>,
  { params }: { params: { number: number } },
  { em }: Read,
): Promise<PublicationView> {
  return viewPublication(scope, await getPublicationRow(scope, params.number, em), em);
}

export function findLastPublication(scope: StudyScope<StudyAction>, em: EntityManager): Promise<PublicationRow | null> {
  return em.findOne(Publication, keyOf(scope), { orderBy: { number: 'desc' } });
}

export async function getPublicationRow(scope: ReadScope, number: number, em: EntityManager): Promise<PublicationRow> {
  const row = await em.findOne(Publication, { ...keyOf(scope), number });
  if (!row) throw new NotFoundError(`There is no publication ${number} of ${scope.studyCode}.`);
  return row;
}

/** The publication before this one, against which its dates are said to have moved. */
function findPublicationBefore(
  scope: StudyScope<'publications:read'>,
  number: number,
  em: EntityManager,
): Promise<PublicationRow | null> {
  return em.findOne(Publication, { ...keyOf(scope), number: { $lt: number } }, { orderBy: { number: 'desc' } });
}

export async function viewPublication(
  scope: ReadScope,
  row: PublicationRow,
  em: EntityManager,
): Promise<PublicationView> {
  const after = await em.findOne(
    Publication,
    { ...keyOf(scope), number: { $gt: row.number } },
    { orderBy: { number: 'asc' }, fields: ['number', 'publishedAt'] },
  );
  const own = await em.findOne(PublicationAcknowledgement, {
    organisationId: scope.organisationId,
    publicationId: row.id,
    personId: scope.actor.personId,
  });
  return serialisePublication(row, {
    publishedBy: (await namesOf(em, [row]))(row),
    supersededBy: after,
    acknowledgedAt: own?.acknowledgedAt ?? null,
    // Those who publish see who has read the cautions; the others need not know about each other.
    acknowledgements: scope.role === 'statistician' ? await listAcknowledgements(scope, row, em) : null,
  });
}

async function listAcknowledgements(
  scope: ReadScope,
  row: PublicationRow,
  em: EntityManager,
): Promise<Acknowledgement[]> {
  const rows = await em.execute<{ name: string; acknowledged_at: Date | null }[]>(
    `select p.name, a.acknowledged_at from study_member m
       join person p on p.id = m.person_id
       left join publication_acknowledgement a on a.organisation_id = m.organisation_id and a.person_id = m.person_id and a.publication_id = ?
      where m.organisation_id = ? and m.study_id = ? and m.role = 'sponsor' order by a.acknowledged_at nulls last, p.name limit 200`,
    [row.id, scope.organisationId, scope.studyId],
  );
  return rows.map(({ name, acknowledged_at }) => ({
    name,
    acknowledgedAt: acknowledged_at && new Date(acknowledged_at).toISOString(),
  }));
}

export interface DateHistory {
  number: number;
  publishedOn: string;
  dataCutoff: string;
  note: string;
  milestone: MilestoneForecast;
}

/** One milestone in the last publications up to one of them, oldest first; a publication without it is passed over. */
export async function listDateHistory(
  scope: StudyScope<StudyAction>,
  { code, upTo, length = HISTORY_LENGTH }: { code: string; upTo: number; length?: number },
  em: EntityManager,
): Promise<DateHistory[]> {
  const rows = await em.execute<
    { number: number; published_on: string; data_cutoff: string; note: string; milestone: MilestoneForecast }[]
  >(
    `select number, to_char(published_at at time zone 'UTC', 'YYYY-MM-DD') as published_on, content->>'dataCutoff' as data_cutoff, note, m.milestone
       from publication cross join lateral jsonb_array_elements(content->'milestones') as m (milestone)
      where organisation_id = ? and study_id = ? and number <= ? and m.milestone->>'code' = ? order by number desc limit ?`,
    [scope.organisationId, scope.studyId, upTo, code, length],
  );
  return rows.reverse().map((row) => ({
    number: row.number,
    publishedOn: row.published_on,
    dataCutoff: row.data_cutoff,
    note: row.note,
    milestone: row.milestone,
  }));
}

export interface PublicationLine {
  number: number;
  publishedOn: string;
  publishedBy: string;
  dataCutoff: string;
}

export interface Timeline {
  publication: PublicationView;
  previous: { number: number; publishedOn: string; milestones: MilestoneForecast[] } | null;
  /** Whose history is shown: the one asked for, else the next milestone ahead. */
  milestone: string;
  history: DateHistory[];
  /** All publications, newest first, a page of them. */
  lines: PublicationLine[];
  total: number;
  /** Days between the data and today. */
  dataAge: number;
}

interface TimelineQuery {
  /** The one that stands where none is asked for. */
  number?: number;
  milestone?: string;
  page: number;
}

/** Everything that the timeline's page shows; null where nothing is published yet. */
export async function findTimeline(
  scope: StudyScope<'publications:read'>,
  query: TimelineQuery,
  { em, clock }: Pick<CommandContext, 'em' | 'clock'>,
): Promise<Timeline | null> {
  const row = query.number ? await getPublicationRow(scope, query.number, em) : await findLastPublication(scope, em);
  if (!row) return null;
  const publication = await viewPublication(scope, row, em);
  const { milestones, dataCutoff } = publication.content;
  const chosen = milestones.find(({ code }) => code === query.milestone) ?? nextMilestone(milestones);
  const before = await findPublicationBefore(scope, row.number, em);
  return {
    publication,
    previous: before && {
      number: before.number,
      publishedOn: calendarDay(before.publishedAt),
      milestones: before.content.milestones,
    },
    milestone: chosen?.code ?? '',
    history: chosen ? await listDateHistory(scope, { code: chosen.code, upTo: row.number }, em) : [],
    lines: await listLines(scope, query.page, em),
    total: await em.count(Publication, keyOf(scope)),
    dataAge: daysApart(dataCutoff, calendarDay(clock.now())),
  };
}

async function listLines(
  scope: StudyScope<'publications:read'>,
  page: number,
  em: EntityManager,
): Promise<PublicationLine[]> {
  const rows = await em.execute<
    { number: number; published_on: string; published_by: string | null; data_cutoff: string }[]
  >(
    `select number, to_char(published_at at time zone 'UTC', 'YYYY-MM-DD') as published_on, p.name as published_by, content->>'dataCutoff' as data_cutoff
       from publication left join person p on p.id = published_by
      where organisation_id = ? and study_id = ? order by number desc limit ? offset ?`,
    [scope.organisationId, scope.studyId, HISTORY_LENGTH, (page - 1) * HISTORY_LENGTH],
  );
  return rows.map((row) => ({
    number: row.number,
    publishedOn: row.published_on,
    publishedBy: row.published_by ?? LEFT,
    dataCutoff: row.data_cutoff,
  }));
}

/** How many people of each reading role will see a publication. */
export async function countReaders(scope: StudyScope<StudyAction>, em: EntityManager): Promise<ReaderCount[]> {
  const counts = await em.execute<{ role: ReaderCount['role']; count: number }[]>(
    `select role, count(*)::int as count from study_member where organisation_id = ? and study_id = ? group by role`,
    [scope.organisationId, scope.studyId],
  );
  return STUDY_ROLES.filter((role) => roleMay(role, 'publications:read')).map((role) => ({
    role: role as ReaderCount['role'],
    count: counts.find((one) => one.role === role)?.count ?? 0,
  }));
}

/** Whom to expect the first publication from. */
export async function listStatisticians(scope: StudyScope<'publications:read'>, em: EntityManager): Promise<string[]> {
  const members = await em.find(StudyMember, { ...keyOf(scope), role: 'statistician' }, { limit: 5 });
  const people = await em.find(Person, { id: { $in: members.map((member) => member.personId) } });
  return people.map((person) => person.name).sort();
}

async function namesOf(em: EntityManager, rows: readonly PublicationRow[]): Promise<(row: PublicationRow) => string> {
  const people = await em.find(Person, { id: { $in: [...new Set(rows.map((row) => row.publishedBy))] } });
  const names = new Map(people.map((person) => [person.id, person.name]));
  return (row) => names.get(row.publishedBy) ?? LEFT;
}
