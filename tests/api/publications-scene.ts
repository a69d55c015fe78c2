import { createHash, randomUUID } from 'node:crypto';
import { ForecastRun } from '@/entities/forecast-run';
import { PlanVersion } from '@/entities/plan-version';
import { transact } from '@/lib/db/transaction';
import type { MilestoneForecast } from '@/lib/engine/types';
import type { RunStatus } from '@/lib/forecasts/schema';
import { fixtureForecastFile, fixtureStudyFile } from '@/tests/domain/publications-fixture';
import type { Scene } from '@/tests/support/scene';

/** A plan as the scene's study would have it: only what publications and alerts read of it. */
export async function addPlan(scene: Scene): Promise<string> {
  const { enrolment, events, milestones, simulation } = fixtureStudyFile(scene.studyCode);
  const id = randomUUID();
  await transact({ organisationId: scene.organisationId }, async (em) => {
    await em.insert(PlanVersion, {
      id,
      organisationId: scene.organisationId,
      studyId: scene.studyId,
      number: 1,
      plan: { enrolment, events: events!, milestones, simulation },
      reasonKind: null,
      reason: null,
      createdAt: new Date('2027-01-05T09:00:00Z'),
      createdBy: scene.people.statistician.personId,
    });
  });
  return id;
}

interface RunToAdd {
  planVersionId: string;
  number: number;
  status?: RunStatus;
  change?: (milestone: MilestoneForecast) => MilestoneForecast;
}

/** A run as the worker leaves it. */
export async function addRun(
  scene: Scene,
  { planVersionId, number, status = 'done', change }: RunToAdd,
): Promise<void> {
  const studyFile = fixtureStudyFile(scene.studyCode);
  const text = JSON.stringify(studyFile);
  const forecast = fixtureForecastFile(studyFile, change);
  const at = new Date('2027-04-05T09:00:00Z');
  const done = status === 'done';
  await transact({ organisationId: scene.organisationId }, async (em) => {
    await em.execute(
      `insert into forecast_run (id, organisation_id, study_id, number, status, cutoff_on, plan_version_id, draws, seed, draws_done, study_file, study_sha256, forecast_file, forecast, engine_version, failure, requested_at, requested_by, finished_at)
       values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?::jsonb, ?, ?::jsonb, ?, ?, ?)`,
      [
        randomUUID(),
        scene.organisationId,
        scene.studyId,
        number,
        status,
        forecast.dataCutoff,
        planVersionId,
        forecast.draws,
        forecast.seed,
        forecast.draws,
        text,
        createHash('sha256').update(text).digest('hex'),
        done ? JSON.stringify(forecast) : null,
        done ? JSON.stringify(forecast) : null,
        '1.0.0',
        status === 'failed' ? JSON.stringify({ reason: 'stopped', errors: [] }) : null,
        at,
        scene.people.statistician.personId,
        at,
      ],
    );
    // The row reads back as the product's own entity.
    await em.findOneOrFail(ForecastRun, { organisationId: scene.organisationId, studyId: scene.studyId, number });
  });
}
