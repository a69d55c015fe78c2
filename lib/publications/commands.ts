import { randomUUID } from 'node:crypto';
import { ForecastRun, type ForecastRunRow } from '../../entities/forecast-run';
import { Publication, type PublicationRow } from '../../entities/publication';
import { Study } from '../../entities/study';
import { evaluateAlerts } from '../alerts/commands';
import { type CommandContext, recordAudit } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import type { Forecast, Study as StudyFile } from '../engine/types';
import { ConflictError, InvalidError } from '../errors';
import { formatDate } from '../format';
import { studyTotalsByMonth } from '../site-log/queries';
import { findLastPublication, getPublicationRow, viewPublication } from './queries';
import { publishedForecast } from './rules';
import type { PublicationView, PublishBody } from './schema';

type PublishScope = StudyScope<'publications:publish'>;

/**
 * Releases a run to the study's readers: the publication, its audit row and the mails of the alerts that it sets off
 * are written together or not at all. A run is published once; asking again answers with what stands.
 */
export async function publishForecast(
  scope: PublishScope,
  { body }: { body: PublishBody },
  context: CommandContext,
): Promise<PublicationView> {
  const { em } = context;
  // One publication of a study at a time: its number and what it is compared with depend on the one before.
  await em.execute(`select 1 from study where organisation_id = ? and id = ? for no key update`, [
    scope.organisationId,
    scope.studyId,
  ]);
  const run = await getDoneRun(scope, body.runNumber, context);
  const present = await em.findOne(Publication, { organisationId: scope.organisationId, runId: run.row.id });
  if (present) return answerAgain(scope, present, body, context);
  const publication = await write(scope, run, body.note, context);
  await evaluateAlerts(context, scope, publication);
  return viewPublication(scope, publication, em);
}

interface DoneRun {
  row: ForecastRunRow;
  forecast: Forecast;
  studyFile: StudyFile;
}

async function getDoneRun(scope: PublishScope, number: number, { em }: CommandContext): Promise<DoneRun> {
  const row = await em.findOne(
    ForecastRun,
    { organisationId: scope.organisationId, studyId: scope.studyId, number },
    { populate: ['studyFile', 'forecast'] },
  );
  const refuse = (detail: string): never => {
    throw new InvalidError([{ pointer: '/runNumber', detail }]);
  };
  if (!row) return refuse(`There is no run ${number} of ${scope.studyCode}.`);
  const forecast = row.forecast?.unwrap();
  const studyFile = row.studyFile.unwrap();
  if (row.status !== 'done' || !forecast || !studyFile)
    return refuse(`Run ${number} has no forecast to publish. Choose a run that is done.`);
  return { row, forecast, studyFile: JSON.parse(studyFile) as StudyFile };
}

async function answerAgain(
  scope: PublishScope,
  present: PublicationRow,
  { runNumber, note }: PublishBody,
  { em }: CommandContext,
): Promise<PublicationView> {
  const view = await viewPublication(scope, present, em);
  if (present.note === note) return view;
  throw new ConflictError(
    `Run ${runNumber} was published on ${formatDate(view.publishedAt.slice(0, 10))} as number ${present.number}, with another note. What is published stays; run the forecast again to publish anew.`,
    view,
  );
}

async function write(
  scope: PublishScope,
  { row: run, forecast, studyFile }: DoneRun,
  note: string,
  context: CommandContext,
): Promise<PublicationRow> {
  const { em, clock } = context;
  const { organisationId, studyId } = scope;
  const study = await em.findOneOrFail(Study, { organisationId, id: studyId });
  const number = ((await findLastPublication(scope, em))?.number ?? 0) + 1;
  const content = publishedForecast(
    { code: study.code, title: study.title, sponsorName: study.sponsorName },
    { number: run.number, forecast, studyFile },
    await studyTotalsByMonth(em, scope, run.cutoffOn),
  );
  const id = randomUUID();
  const auditDigest = await recordAudit(context, scope, {
    action: scope.action,
    recordType: 'publication',
    recordId: id,
    changes: [
      { field: 'number', old: number === 1 ? null : number - 1, new: number },
      { field: 'run', old: null, new: run.number },
      { field: 'note', old: null, new: note },
    ],
  });
  const publication = em.create(Publication, {
    id,
    organisationId,
    studyId,
    runId: run.id,
    number,
    note,
    content,
    auditDigest,
    publishedAt: clock.now(),
    publishedBy: scope.actor.personId,
  });
  em.persist(publication);
  await em.flush();
  return publication;
}

/** Once a person and publication; again changes nothing. */
export async function acknowledgeCautions(
  scope: StudyScope<'publications:acknowledge'>,
  { params }: { params: { number: number } },
  context: CommandContext,
): Promise<{ number: number; acknowledgedAt: string }> {
  const { em, clock } = context;
  const publication = await getPublicationRow(scope, params.number, em);
  const key = [scope.organisationId, publication.id, scope.actor.personId];
  const [made] = await em.execute<{ id: string }[]>(
    `insert into publication_acknowledgement (id, organisation_id, publication_id, person_id, acknowledged_at) values (?, ?, ?, ?, ?)
     on conflict (organisation_id, publication_id, person_id) do nothing returning id`,
    [randomUUID(), ...key, clock.now()],
  );
  if (made) {
    await recordAudit(context, scope, {
      action: scope.action,
      recordType: 'publication',
      recordId: publication.id,
      changes: [{ field: 'acknowledged', old: false, new: true }],
    });
  }
  const [stands] = await em.execute<{ acknowledged_at: Date }[]>(
    `select acknowledged_at from publication_acknowledgement where organisation_id = ? and publication_id = ? and person_id = ?`,
    key,
  );
  return { number: publication.number, acknowledgedAt: new Date(stands!.acknowledged_at).toISOString() };
}
