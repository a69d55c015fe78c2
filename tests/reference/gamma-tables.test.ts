import gamma from '@stdlib/stats-base-dists-gamma';
import gammaQuantile from '@stdlib/stats-base-dists-gamma-quantile';
import { describe, expect, it } from 'vitest';
import { createGammaVariate } from '@/lib/engine/gamma-variate';
import { createGenerator } from '@/lib/engine/generator';
import { checkValues } from './check-values';
import { mean, poissonUpper, shareTolerance, shareUpTo, variance } from './closed-forms';

describe('gamma distribution', () => {
  it.each(checkValues<{ shape: number; rate: number; x: number; p: number }, Record<string, number>>('A-gamma-'))(
    '$id: distribution, density, quantile ($source)',
    ({ inputs: { shape, rate, x, p }, expected }) => {
      expect(Math.abs(gamma.cdf(x, shape, rate) - (expected.cdf as number))).toBeLessThan(1e-9);
      expect(Math.abs(gamma.pdf(x, shape, rate) / (expected.pdf as number) - 1)).toBeLessThan(1e-9);
      expect(Math.abs(gammaQuantile(p, shape, rate) / (expected.quantile as number) - 1)).toBeLessThan(1e-8);
    },
  );

  it.each(checkValues<{ shape: number; rate: number; x: number; p: number }, Record<string, number>>('A-gamma-'))(
    '$id: the engine’s variates have its mean, variance and distribution ($source)',
    ({ inputs: { shape, rate, x, p }, expected }) => {
      const generator = createGenerator(5);
      generator.startAt(0, 0, 1);
      const variate = createGammaVariate(generator);
      const draws = 50_000;
      const values = Float64Array.from({ length: draws }, () => variate(shape, rate));
      const kurtosis = 3 + 6 / shape;
      expect(Math.abs(mean(values) - (expected.mean as number))).toBeLessThan(
        4 * Math.sqrt((expected.variance as number) / draws),
      );
      expect(Math.abs(variance(values) / (expected.variance as number) - 1)).toBeLessThan(
        4 * Math.sqrt((kurtosis - 1) / draws),
      );
      expect(Math.abs(shareUpTo(values, x) - (expected.cdf as number))).toBeLessThan(
        shareTolerance(expected.cdf as number, draws),
      );
      expect(Math.abs(shareUpTo(values, expected.quantile as number) - p)).toBeLessThan(shareTolerance(p, draws));
    },
  );

  it.each(checkValues<{ nu: number; Q: number }, { x: number; x_R: number }>('A-chisq'))(
    '$id: percentage point of chi-squared, twice that of a gamma ($source)',
    ({ inputs: { nu, Q }, expected }) => {
      const point = 2 * gammaQuantile(1 - Q, nu / 2, 1);
      expect(Math.abs(point - expected.x)).toBeLessThan(6e-5 * Math.max(1, expected.x / 10));
      expect(Math.abs(point - expected.x_R)).toBeLessThan(1e-8 * Math.max(1, expected.x_R));
    },
  );

  it.each(checkValues<{ m: number; c: number }, { prob: number; prob_R: number }>('A-poisson'))(
    '$id: cumulative Poisson as a gamma tail ($source)',
    ({ inputs: { m, c }, expected }) => {
      const tail = 1 - gamma.cdf(m, c + 1, 1);
      expect(Math.abs(tail - expected.prob)).toBeLessThan(6e-6);
      expect(Math.abs(tail - expected.prob_R)).toBeLessThan(1e-10);
      expect(Math.abs(1 - poissonUpper(c + 1, m) - expected.prob_R)).toBeLessThan(1e-10);
    },
  );

  it.each(checkValues<{ k: number; rate: number; t: number }, { prob: number }>('A-duality'))(
    '$id: P(T_k <= t) = P(N(t) >= k) ($source)',
    ({ inputs: { k, rate, t }, expected }) => {
      expect(Math.abs(gamma.cdf(t, k, rate) - expected.prob)).toBeLessThan(1e-10);
      expect(Math.abs(poissonUpper(k, rate * t) - expected.prob)).toBeLessThan(1e-10);
    },
  );
});
