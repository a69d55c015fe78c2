import gammaQuantile from '@stdlib/stats-base-dists-gamma-quantile';
import { exp } from './elementary';
import { type EnrolmentModel, prepareEnrolment } from './enrolment-model';
import { cellsOf } from './posterior-grid';
import type { Study } from './types';

/** Posterior of one site's rate of randomisation. */
export interface SiteRate {
  code: string;
  /** Planned mean of the site's country, patients per month. */
  plannedPerMonth: number;
  /** Months of exposure so far. */
  exposureMonths: number;
  /** Gamma(shape, rate) with the rate in months; mean = shape / rate. */
  shape: number;
  rate: number;
  meanPerMonth: number;
  /** 10 % and 90 % points. */
  interval80: { low: number; high: number };
}

/**
 * Posterior of each site's rate: its own record, shrunk to the study.
 *
 * Basis "plan": exactly Gamma(α + n, β + τ). Basis "data": the mixture of those gammas over the posterior of (m, α), given
 * as the gamma of the same mean and variance, which is an approximation. A site without exposure: the rate of a new site.
 *
 * @returns one entry per site of the study, in its order; rates in patients per site-month at full speed (after ramp-up, in
 *   a month with seasonal multiplier 1)
 * @see Anisimov & Fedorov 2007, Stat Med 26:4958
 */
export function siteRates(study: Study, model: EnrolmentModel = prepareEnrolment(study)): SiteRate[] {
  const cells = hyperparameters(model);
  return study.enrolment.sites.map((site, place) => {
    const ratio = model.sites.ratios[place] as number;
    const exposureMonths = model.sites.exposures[place] as number;
    const { shape, rate } = matchedGamma(cells, model.sites.counts[place] as number, exposureMonths, ratio);
    return {
      code: site.code,
      plannedPerMonth: model.planned.meanPerMonth * ratio,
      exposureMonths,
      shape,
      rate,
      meanPerMonth: shape / rate,
      interval80: { low: gammaQuantile(0.1, shape, rate), high: gammaQuantile(0.9, shape, rate) },
    };
  });
}

/** Shape α and rate β = α/m with their probabilities: one cell under basis "plan", those of the grid under basis "data". */
interface Hyperparameters {
  weights: Float64Array;
  shapes: Float64Array;
  rates: Float64Array;
}

function hyperparameters({ grid, planned }: EnrolmentModel): Hyperparameters {
  if (!grid) {
    return {
      weights: Float64Array.of(1),
      shapes: Float64Array.of(planned.shape),
      rates: Float64Array.of(planned.shape / planned.meanPerMonth),
    };
  }
  const { weights, x, y } = cellsOf(grid);
  return { weights, shapes: y.map(exp), rates: y.map((lnShape, cell) => exp(lnShape - (x[cell] as number))) };
}

function matchedGamma(cells: Hyperparameters, count: number, exposure: number, ratio: number) {
  const only = cells.weights.length === 1;
  if (only) return { shape: (cells.shapes[0] as number) + count, rate: (cells.rates[0] as number) / ratio + exposure };
  let mean = 0;
  let square = 0;
  for (let cell = 0; cell < cells.weights.length; cell += 1) {
    const weight = cells.weights[cell] as number;
    const shape = (cells.shapes[cell] as number) + count;
    const rate = (cells.rates[cell] as number) / ratio + exposure;
    mean += (weight * shape) / rate;
    square += (weight * shape * (shape + 1)) / (rate * rate);
  }
  const variance = square - mean * mean;
  return { shape: (mean * mean) / variance, rate: mean / variance };
}
