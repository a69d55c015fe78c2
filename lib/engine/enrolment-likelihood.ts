import gammaln from '@stdlib/math-base-special-gammaln';
import { exp, ln, logOnePlus } from './elementary';
import { findMode } from './mode';

/** Counts of sites and what they were exposed to; typed arrays of one length. */
export interface SiteCounts {
  /** Patients that the likelihood counts (one fewer where the first patient's date stands for the activation). */
  counts: Float64Array;
  /** Months of exposure. */
  exposures: Float64Array;
  /** Planned mean of the site's country over the overall planned mean. */
  ratios: Float64Array;
}

/** A log likelihood in (mean, shape), which keeps what depends on the shape alone for the next call with the same shape. */
export type EnrolmentLogLikelihood = (meanPerMonth: number, shape: number) => number;

/**
 * Log likelihood of the gamma-Poisson model, marginally negative binomial:
 *
 *     Σ lnΓ(α + n) − lnΓ(α) − ln n! + α ln(β / (β + τ)) + n ln(τ / (β + τ)),   β = α / (m · ratio)
 *
 * Sites without exposure say nothing and are left out.
 *
 * @returns a function of the mean m (patients per site-month, > 0) and the shape α (> 0)
 * @see Anisimov & Fedorov 2007, Stat Med 26:4958
 */
export function enrolmentLogLikelihood(sites: SiteCounts): EnrolmentLogLikelihood {
  const groups = groupSites(sites);
  // Σ lnΓ(α + n) − lnΓ(α) = Σ_j (sites with more than j patients) ln(α + j): exact where lnΓ would cancel.
  const largest = groups.reduce((most, group) => Math.max(most, group.count), 0);
  const rising = largest <= 400 ? sitesAbove(groups, largest) : null;
  let fixed = 0;
  for (const { count, exposure, sites: many } of groups) {
    fixed += many * (count * (count > 0 ? ln(exposure) : 0) - gammaln(count + 1));
  }
  let keptShape = NaN;
  let kept = 0;
  return (mean, shape) => {
    if (shape !== keptShape) {
      kept = 0;
      if (rising) {
        for (let j = 0; j < rising.length; j += 1) kept += (rising[j] as number) * ln(shape + j);
      } else {
        for (const group of groups) kept += group.sites * (gammaln(shape + group.count) - gammaln(shape));
      }
      keptShape = shape;
    }
    let sum = kept + fixed;
    for (const group of groups) {
      const rate = shape / (mean * group.ratio);
      // α ln(β / (β + τ)) − n ln(β + τ); the first through ln(1 + τ/β), which keeps its digits for a large shape.
      const share = group.exposure / rate;
      sum -= group.sites * (shape * logOnePlus(share) + group.count * ln(rate + group.exposure));
    }
    return sum;
  };
}

/**
 * Log likelihood with no spread between sites (α → ∞): n Poisson with mean m · ratio · τ.
 *
 * @param mean patients per site-month; 0 only where nobody enrolled
 */
export function poissonLogLikelihood(sites: SiteCounts, mean: number): number {
  let sum = 0;
  for (let site = 0; site < sites.counts.length; site += 1) {
    const exposure = sites.exposures[site] as number;
    if (exposure <= 0) continue;
    const count = sites.counts[site] as number;
    const expected = mean * (sites.ratios[site] as number) * exposure;
    sum += (count > 0 ? count * ln(expected) : 0) - expected - gammaln(count + 1);
  }
  return sum;
}

export interface EnrolmentMaximum {
  meanPerMonth: number;
  /** null: the counts are no more spread than Poisson's, and the likelihood rises up to α = ∞. */
  shape: number | null;
  logLikelihood: number;
}

/**
 * Maximum-likelihood estimates of the gamma-Poisson model.
 *
 * The shape is null where the likelihood has no inner maximum: its slope in 1/α at 0, half of Σ (n − μ)² − n under the
 * Poisson fit, is not positive.
 *
 * @returns null where no site has exposure yet
 */
export function maximiseEnrolment(sites: SiteCounts): EnrolmentMaximum | null {
  let patients = 0;
  let exposure = 0;
  for (let site = 0; site < sites.counts.length; site += 1) {
    if ((sites.exposures[site] as number) <= 0) continue;
    patients += sites.counts[site] as number;
    exposure += (sites.exposures[site] as number) * (sites.ratios[site] as number);
  }
  if (exposure <= 0) return null;
  const mean = patients / exposure;
  let excess = 0;
  let expectedSquares = 0;
  for (let site = 0; site < sites.counts.length; site += 1) {
    if ((sites.exposures[site] as number) <= 0) continue;
    const count = sites.counts[site] as number;
    const expected = mean * (sites.exposures[site] as number) * (sites.ratios[site] as number);
    excess += (count - expected) * (count - expected) - count;
    expectedSquares += expected * expected;
  }
  if (patients === 0 || excess <= 0) {
    return { meanPerMonth: mean, shape: null, logLikelihood: poissonLogLikelihood(sites, mean) };
  }
  const logLikelihood = enrolmentLogLikelihood(sites);
  // The method of moments gives the start.
  const start = { x: ln(mean), y: ln(Math.min(Math.max(expectedSquares / excess, 0.05), 1e4)) };
  const mode = findMode((x, y) => logLikelihood(exp(x), exp(y)), start);
  return { meanPerMonth: exp(mode.x), shape: exp(mode.y), logLikelihood: mode.value };
}

interface Group {
  count: number;
  exposure: number;
  ratio: number;
  sites: number;
}

function groupSites(sites: SiteCounts): Group[] {
  const groups = new Map<string, Group>();
  for (let site = 0; site < sites.counts.length; site += 1) {
    const exposure = sites.exposures[site] as number;
    if (exposure <= 0) continue;
    const count = sites.counts[site] as number;
    const ratio = sites.ratios[site] as number;
    const name = `${count} ${exposure} ${ratio}`;
    const group = groups.get(name);
    if (group) group.sites += 1;
    else groups.set(name, { count, exposure, ratio, sites: 1 });
  }
  return [...groups.values()];
}

function sitesAbove(groups: readonly Group[], largest: number): Float64Array {
  const above = new Float64Array(largest);
  for (const { count, sites } of groups) {
    for (let j = 0; j < count; j += 1) above[j] = (above[j] as number) + sites;
  }
  return above;
}
