import { QUANTILE_LEVELS, type Forecast } from './types';

/**
 * The forecast file: keys in the order of the contract whatever the order in the object, numbers as `JSON.stringify` prints
 * them, two spaces of indent, one newline at the end.
 */
export function serialiseForecast(forecast: Forecast): string {
  const fit = forecast.fit;
  const file = {
    ...ordered(forecast, ['format', 'engineVersion', 'studySha256', 'seed', 'draws', 'dataCutoff']),
    observed: ordered(forecast.observed, ['randomised', 'events', 'withdrawn', 'atRisk']),
    fit: {
      enrolment: fit.enrolment && ordered(fit.enrolment, ['meanPerMonth', 'shape', 'logLikelihood']),
      events: fit.events && fit.events.map((family) => ordered(family, EVENTS_FIT_KEYS)),
      dropout: fit.dropout && ordered(fit.dropout, ['perMonth']),
    },
    milestones: forecast.milestones.map((milestone) => ({
      ...ordered(milestone, ['code', 'name', 'kind', 'count', 'months', 'of', 'plannedOn', 'reachedOn']),
      ...ordered(milestone, ['probabilityReached', 'probabilityByPlanned']),
      quantiles: ordered(milestone.quantiles, QUANTILE_LEVELS),
      monteCarloErrorDays: milestone.monteCarloErrorDays,
      density: milestone.density.map((week) => ordered(week, ['from', 'share'])),
    })),
    monthly: forecast.monthly.map((row) => ({
      monthEnd: row.monthEnd,
      randomised: counts(row.randomised),
      ...(row.events ? { events: counts(row.events) } : {}),
    })),
    cautions: forecast.cautions.map((caution) => ordered(caution, ['code', 'text', 'sponsorText', 'milestones'])),
  };
  return `${JSON.stringify(file, null, 2)}\n`;
}

const EVENTS_FIT_KEYS = [
  'family',
  'weight',
  'ratePerMonth',
  'mu',
  'sigma',
  'shape',
  'scaleMonths',
  'ratesPerMonth',
  'medianMonths',
  'logLikelihood',
  'aic',
] as const;

function counts(row: Forecast['monthly'][number]['randomised']) {
  return { mean: row.mean, quantiles: ordered(row.quantiles, QUANTILE_LEVELS) };
}

function ordered<T extends object, K extends keyof T>(from: T, keys: readonly K[]): Partial<T> {
  const out: Partial<T> = {};
  for (const key of keys) if (from[key] !== undefined) out[key] = from[key];
  return out;
}
