import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { Forecast } from '../lib/engine/types';
import type { RunFailure, RunStatus } from '../lib/forecasts/schema';

export const ForecastRun = defineEntity({
  name: 'ForecastRun',
  tableName: 'forecast_run',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    number: p.integer(),
    status: p.string().$type<RunStatus>(),
    cutoffOn: p.date(),
    planVersionId: p.uuid(),
    dataCutId: p.uuid().nullable(),
    draws: p.integer(),
    seed: p.bigint('number'),
    drawsDone: p.integer(),
    /** The exact bytes that the engine read; its SHA-256 is of these. Text, since jsonb would reorder them. */
    studyFile: p.text().lazy(),
    studySha256: p.string(),
    forecastFile: p.text().lazy().nullable(),
    forecast: p.json<Forecast>().lazy().nullable(),
    engineVersion: p.string().nullable(),
    failure: p.json<RunFailure>().nullable(),
    requestedAt: p.datetime(),
    requestedBy: p.uuid(),
    startedAt: p.datetime().nullable(),
    /** Moves while a worker is at it; a run whose heart stopped is taken up again. */
    heartbeatAt: p.datetime().nullable(),
    finishedAt: p.datetime().nullable(),
    version: p.integer().version(),
  },
});

export type ForecastRunRow = InferEntity<typeof ForecastRun>;
