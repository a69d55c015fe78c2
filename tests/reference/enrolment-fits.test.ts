import { describe, expect, it } from 'vitest';
import { exp, ln } from '@/lib/engine/elementary';
import { enrolmentLogLikelihood, maximiseEnrolment, type SiteCounts } from '@/lib/engine/enrolment-likelihood';
import { enrolmentPosterior } from '@/lib/engine/enrolment-model';
import { cellsOf, posteriorGrid } from '@/lib/engine/posterior-grid';
import { checkValue, checkValues, readCsv } from './check-values';
import { countsAt, simulateKnown } from './known-enrolment';
import { mean, shareUpTo, variance } from './closed-forms';

function sitesOf(counts: readonly number[], exposures: readonly number[]): SiteCounts {
  return {
    counts: Float64Array.from(counts),
    exposures: Float64Array.from(exposures),
    ratios: Float64Array.from(counts, () => 1),
  };
}

describe('maximum likelihood of the gamma-Poisson model', () => {
  it('red mites on apple leaves: k = 1.02459 (Bliss & Fisher 1953, Biometrics 9:176, from memory; R)', () => {
    const { inputs, expected } = checkValue<
      { counts: Record<string, number> },
      { k_published: number; alpha: number; mean: number; loglik: number }
    >('B-nb-mites');
    const counts = Object.entries(inputs.counts).flatMap(([count, leaves]) =>
      Array<number>(leaves).fill(Number(count)),
    );
    const fit = maximiseEnrolment(
      sitesOf(
        counts,
        counts.map(() => 1),
      ),
    );
    expect(fit?.shape).toBeCloseTo(expected.k_published, 4);
    expect(Math.abs((fit?.shape ?? 0) - expected.alpha)).toBeLessThan(1e-6);
    expect(Math.abs((fit?.meanPerMonth ?? 0) - expected.mean)).toBeLessThan(1e-9);
    expect(Math.abs((fit?.logLikelihood ?? 0) - expected.loglik)).toBeLessThan(1e-7);
  });

  it('failures of ten pumps (Gaver & O’Muircheartaigh 1987, Technometrics 29:1; R, MASS::glm.nb)', () => {
    const { inputs, expected } = checkValue<
      { x: number[]; t: number[] },
      { alpha: number; beta: number; mean: number; loglik: number; posterior_rate_mean: number[] }
    >('B-gp-pumps-ml');
    const fit = maximiseEnrolment(sitesOf(inputs.x, inputs.t));
    const shape = fit?.shape ?? NaN;
    const rate = shape / (fit?.meanPerMonth ?? NaN);
    expect(Math.abs(shape - expected.alpha)).toBeLessThan(1e-6);
    expect(Math.abs(rate - expected.beta)).toBeLessThan(1e-6);
    expect(Math.abs((fit?.meanPerMonth ?? 0) - expected.mean)).toBeLessThan(1e-7);
    expect(Math.abs((fit?.logLikelihood ?? 0) - expected.loglik)).toBeLessThan(1e-7);
    inputs.x.forEach((x, pump) => {
      const posterior = (shape + x) / (rate + (inputs.t[pump] as number));
      expect(Math.abs(posterior - (expected.posterior_rate_mean[pump] as number))).toBeLessThan(1e-6);
    });
  });

  it.each(checkValues<{ n: number[]; t: number[] }, Record<string, number>>('B-fit-dev'))(
    '$id ($source)',
    ({ inputs, expected }) => {
      const fit = maximiseEnrolment(sitesOf(inputs.n, inputs.t));
      expect(Math.abs((fit?.shape ?? 0) - (expected.alpha as number))).toBeLessThan(1e-6);
      expect(Math.abs((fit?.meanPerMonth ?? 0) - (expected.mean as number))).toBeLessThan(1e-8);
      expect(Math.abs((fit?.logLikelihood ?? 0) - (expected.loglik as number))).toBeLessThan(1e-8);
    },
  );

  it('209 hospitals of the International Stroke Trial after 36 months (doi:10.7488/ds/104; R)', () => {
    const { inputs, expected } = checkValue<{ cut_month: number }, Record<string, number>>('R-replay-ist');
    const first = new Map<string, number>();
    const total = new Map<string, number>();
    for (const { site = '', month, n } of readCsv('ist_site_month_to48.csv')) {
      if (Number(month) > inputs.cut_month) continue;
      first.set(site, Math.min(first.get(site) ?? Infinity, Number(month)));
      total.set(site, (total.get(site) ?? 0) + Number(n));
    }
    const sites = [...first.keys()];
    // The first patient is certain, and on average comes in the middle of its month.
    const fit = maximiseEnrolment(
      sitesOf(
        sites.map((site) => (total.get(site) as number) - 1),
        sites.map((site) => inputs.cut_month - (first.get(site) as number) + 0.5),
      ),
    );
    expect(sites).toHaveLength(expected.open_sites as number);
    expect([...total.values()].reduce((sum, n) => sum + n, 0)).toBe(expected.enrolled);
    expect(Math.abs((fit?.shape ?? 0) - (expected.alpha as number))).toBeLessThan(1e-6);
    expect(Math.abs((fit?.shape ?? 0) / (fit?.meanPerMonth ?? 1) - (expected.beta as number))).toBeLessThan(1e-6);
  });

  it('with exposures weighted by a ramp-up (R)', () => {
    const { inputs, expected } = checkValue<
      { n: number[] },
      { effective_exposure: number[]; alpha: number; beta: number; loglik: number }
    >('B-rampup');
    const fit = maximiseEnrolment(sitesOf(inputs.n, expected.effective_exposure));
    expect(Math.abs((fit?.shape ?? 0) - expected.alpha)).toBeLessThan(1e-5);
    expect(Math.abs((fit?.shape ?? 0) / (fit?.meanPerMonth ?? 1) - expected.beta)).toBeLessThan(1e-5);
    expect(Math.abs((fit?.logLikelihood ?? 0) - expected.loglik)).toBeLessThan(1e-6);
  });
});

describe('posterior of the two hyperparameters on the grid', () => {
  it('pumps, prior alpha ~ Exp(1), beta ~ Gamma(0.1, 1): means 0.70 and 0.93 (BUGS Examples vol. 1, from memory; R quadrature)', () => {
    const { inputs, expected } = checkValue<
      { x: number[]; t: number[] },
      { alpha_mean: number; alpha_sd: number; beta_mean: number; beta_sd: number; theta_mean: number[] }
    >('B-gp-pumps-bayes');
    const logLikelihood = enrolmentLogLikelihood(sitesOf(inputs.x, inputs.t));
    // x = ln beta, y = ln alpha; the last two terms turn densities of alpha and beta into those of their logarithms.
    const grid = posteriorGrid((x, y) => logLikelihood(exp(y - x), exp(y)) - exp(y) + (0.1 - 1) * x - exp(x) + x + y, {
      x: 0,
      y: 0,
    });
    const { weights, x, y } = cellsOf(grid);
    const expect_ = (of: (alpha: number, beta: number) => number): number =>
      weights.reduce((sum, weight, cell) => sum + weight * of(exp(y[cell] as number), exp(x[cell] as number)), 0);
    const alpha = expect_((a) => a);
    const beta = expect_((_, b) => b);
    expect(Math.abs(alpha - expected.alpha_mean)).toBeLessThan(2e-4);
    expect(Math.abs(beta - expected.beta_mean)).toBeLessThan(2e-4);
    expect(Math.abs(Math.sqrt(expect_((a) => a * a) - alpha ** 2) - expected.alpha_sd)).toBeLessThan(2e-4);
    expect(Math.abs(Math.sqrt(expect_((_, b) => b * b) - beta ** 2) - expected.beta_sd)).toBeLessThan(2e-4);
    expect(alpha).toBeCloseTo(0.7, 1);
    inputs.x.forEach((count, pump) => {
      const theta = expect_((a, b) => (a + count) / (b + (inputs.t[pump] as number)));
      expect(Math.abs(theta - (expected.theta_mean[pump] as number))).toBeLessThan(2e-4);
    });
  });

  it('20 sites: the grid and the forecast that carries its uncertainty along (R quadrature and convolution)', () => {
    const { inputs, expected } = checkValue<
      { n: number[]; t: number[]; h: number; new_site_activation_after_census: number[]; target_more: number },
      Record<string, number>
    >('B-pred-bayes-hyper');
    const grid = enrolmentPosterior(sitesOf(inputs.n, inputs.t), {
      lnMean: { mean: 0, sd: 1.5 },
      lnShape: { mean: ln(1.5), sd: 0.7 },
    });
    const { weights, x, y } = cellsOf(grid);
    const moment = (values: Float64Array, power: number): number =>
      weights.reduce((sum, weight, cell) => sum + weight * (values[cell] as number) ** power, 0);
    expect(Math.abs(moment(x, 1) - (expected.post_mean_logmean as number))).toBeLessThan(1e-4);
    expect(Math.abs(moment(y, 1) - (expected.post_mean_logalpha as number))).toBeLessThan(1e-4);
    expect(Math.abs(Math.sqrt(moment(x, 2) - moment(x, 1) ** 2) - (expected.post_sd_logmean as number))).toBeLessThan(
      1e-4,
    );
    expect(Math.abs(Math.sqrt(moment(y, 2) - moment(y, 1) ** 2) - (expected.post_sd_logalpha as number))).toBeLessThan(
      1e-4,
    );

    const draws = 40_000;
    const counts = countsAt(
      simulateKnown(
        {
          alpha: 1,
          beta: 1,
          n: inputs.n,
          t: inputs.t,
          newSites: inputs.new_site_activation_after_census,
          grid,
          remaining: 1000,
          horizonMonths: inputs.h,
        },
        draws,
      ),
      inputs.h,
    );
    const sd = expected.sd as number;
    expect(Math.abs(mean(counts) - (expected.mean as number))).toBeLessThan((4 * sd) / Math.sqrt(draws));
    expect(Math.abs(Math.sqrt(variance(counts)) - sd)).toBeLessThan((4 * sd) / Math.sqrt(2 * draws) + 0.1);
    expect(
      Math.abs(1 - shareUpTo(counts, inputs.target_more - 1) - (expected.prob_reach_target as number)),
    ).toBeLessThan(0.01);
    // The estimate alone, plugged in, would give a band that is too narrow: sd 19.5 in place of 24.2.
    expect(Math.sqrt(variance(counts))).toBeGreaterThan((expected.plugin_sd as number) + 3);
  });
});
