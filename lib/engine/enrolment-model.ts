import { siteCalendar, siteExposure, type SiteCalendar } from './enrolment-exposure';
import { enrolmentLogLikelihood, type SiteCounts } from './enrolment-likelihood';
import { exp, ln } from './elementary';
import { type PosteriorGrid, posteriorGrid } from './posterior-grid';
import type { Enrolment, Study } from './types';

/** Standard deviation of the weak priors of ln mean and ln shape around the plan, basis "data". */
const PRIOR_SD = 1;

/** The sites' rates: Gamma(shape α, rate β), with α and the mean m = α/β known or on a grid. */
export interface EnrolmentModel {
  /** The plan's mean (patients per site-month) and shape 1/CV². */
  planned: { meanPerMonth: number; shape: number };
  /** Posterior of (ln m, ln α) under basis "data"; null: both are known. */
  grid: PosteriorGrid | null;
  calendars: SiteCalendar[];
  /** One place per site of the study, in its order. */
  sites: SiteCounts;
}

/** What each site has shown so far, ready for likelihood and posterior. */
export function siteCounts(study: Study, calendars: readonly SiteCalendar[]): SiteCounts {
  const { enrolment } = study;
  const ratioOf = countryRatios(enrolment);
  const size = enrolment.sites.length;
  const counts = new Float64Array(size);
  const exposures = new Float64Array(size);
  const ratios = new Float64Array(size);
  enrolment.sites.forEach((site, place) => {
    const calendar = calendars[place] as SiteCalendar;
    const exposure = siteExposure(calendar, enrolment);
    const randomised = site.randomised ?? 0;
    exposures[place] = exposure;
    // That first patient is certain: it is the reason why the site counts as active from that day.
    const counted = site.activationIsFirstPatient ? Math.max(0, randomised - 1) : randomised;
    // Patients without exposure (all months unlogged, or a season of 0) say nothing about the rate.
    counts[place] = exposure > 0 ? counted : 0;
    ratios[place] = ratioOf(site.country);
  });
  return { counts, exposures, ratios };
}

function countryRatios(enrolment: Enrolment): (country: string) => number {
  const means = new Map((enrolment.countryRates ?? []).map(({ country, meanPerMonth }) => [country, meanPerMonth]));
  return (country) => (means.get(country) ?? enrolment.rate.meanPerMonth) / enrolment.rate.meanPerMonth;
}

/**
 * Prior and likelihood of the sites' rates, brought together.
 *
 * Basis "plan": m and α = 1/CV² are known. Basis "data": ln m ~ Normal(ln planned m, 1), ln α ~ Normal(−2 ln planned CV, 1),
 * times the gamma-Poisson likelihood, on the two-dimensional grid; each draw takes its own (m, α), because plugging in the
 * estimate alone gives bands that are too narrow (Mountain & Sherlock 2022, Biometrics 78:636). Countries keep their planned
 * ratio to the mean.
 */
export function prepareEnrolment(study: Study): EnrolmentModel {
  const calendars = study.enrolment.sites.map((site) => siteCalendar(site, study.dataCutoff));
  const sites = siteCounts(study, calendars);
  const { rate } = study.enrolment;
  const planned = { meanPerMonth: rate.meanPerMonth, shape: 1 / (rate.cv * rate.cv) };
  return {
    planned,
    calendars,
    sites,
    grid:
      rate.basis === 'data'
        ? enrolmentPosterior(sites, {
            lnMean: { mean: ln(planned.meanPerMonth), sd: PRIOR_SD },
            lnShape: { mean: ln(planned.shape), sd: PRIOR_SD },
          })
        : null,
  };
}

interface NormalPrior {
  mean: number;
  sd: number;
}

/**
 * Posterior of (ln m, ln α) of the gamma-Poisson model under independent normal priors, on the grid.
 *
 * @param sites counts, exposures in months, country ratios
 */
export function enrolmentPosterior(
  sites: SiteCounts,
  prior: { lnMean: NormalPrior; lnShape: NormalPrior },
): PosteriorGrid {
  const logLikelihood = enrolmentLogLikelihood(sites);
  const logPrior = (value: number, { mean, sd }: NormalPrior): number => {
    const distance = (value - mean) / sd;
    return -0.5 * distance * distance - ln(sd) - 0.5 * ln(2 * Math.PI);
  };
  return posteriorGrid(
    (lnMean, lnShape) =>
      logLikelihood(exp(lnMean), exp(lnShape)) + logPrior(lnMean, prior.lnMean) + logPrior(lnShape, prior.lnShape),
    { x: prior.lnMean.mean, y: prior.lnShape.mean },
  );
}
