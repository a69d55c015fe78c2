import { describe, expect, it } from 'vitest';
import { exponentialFamily } from '@/lib/engine/family-exponential';
import { weibullFamily, weibullLogLikelihood } from '@/lib/engine/family-weibull';
import { groupTimes, type SurvivalData } from '@/lib/engine/survival-data';
import { checkValue, checkValues, readCsv } from './check-values';

function dataOf(csv: string): SurvivalData {
  const rows = readCsv(csv);
  return groupTimes(
    rows.map(({ time }) => Number(time)),
    rows.map(({ status }) => status === '1'),
  );
}

interface Fits {
  fits: Record<
    'exponential' | 'weibull',
    { loglik: number; aic: number; natural: { rate: number; shape: number; scale: number }; median: number }
  >;
}

describe('maximum likelihood of the families (R, survival::survreg)', () => {
  it.each(checkValues<{ csv: string; events: number; total_time: number }, Fits>('C-fit-'))(
    '$id: exponential and Weibull ($source)',
    ({ inputs, expected: { fits } }) => {
      const data = dataOf(inputs.csv.replace('data/', ''));
      expect(data.eventCount).toBe(inputs.events);
      expect(data.exposure).toBeCloseTo(inputs.total_time, 6);
      const exponential = exponentialFamily.fit(data, 0);
      expect(Math.abs((exponential?.ratePerMonth ?? 0) / fits.exponential.natural.rate - 1)).toBeLessThan(1e-10);
      expect(Math.abs((exponential?.logLikelihood ?? 0) - fits.exponential.loglik)).toBeLessThan(1e-7);
      expect(Math.abs((exponential?.aic ?? 0) - fits.exponential.aic)).toBeLessThan(1e-7);
      expect(Math.abs((exponential?.medianMonths ?? 0) / fits.exponential.median - 1)).toBeLessThan(1e-10);
      const weibull = weibullFamily.fit(data, 0);
      expect(Math.abs((weibull?.shape ?? 0) / fits.weibull.natural.shape - 1)).toBeLessThan(1e-6);
      expect(Math.abs((weibull?.scaleMonths ?? 0) / fits.weibull.natural.scale - 1)).toBeLessThan(1e-6);
      expect(Math.abs((weibull?.logLikelihood ?? 0) - fits.weibull.loglik)).toBeLessThan(1e-6);
      expect(Math.abs((weibull?.aic ?? 0) - fits.weibull.aic)).toBeLessThan(1e-6);
      expect(Math.abs((weibull?.medianMonths ?? 0) / fits.weibull.median - 1)).toBeLessThan(1e-6);
    },
  );

  it('Weibull with a cured share, recurrence of colon cancer (R, direct maximisation)', () => {
    const { expected } = checkValue<unknown, Record<'pi' | 'shape' | 'scale' | 'loglik', number>>('C-cure-fit');
    const data = dataOf('colon_recurrence.csv');
    const fit = weibullFamily.fit(data, expected.pi);
    expect(Math.abs((fit?.shape ?? 0) - expected.shape)).toBeLessThan(1e-4);
    expect(Math.abs((fit?.scaleMonths ?? 0) / expected.scale - 1)).toBeLessThan(1e-4);
    expect(Math.abs((fit?.logLikelihood ?? 0) - expected.loglik)).toBeLessThan(1e-5);
    // 0.483 cured: S falls to a half only late, S(t) = pi + (1 - pi) exp(-(t/sigma)^kappa).
    const median = fit?.medianMonths ?? NaN;
    const survival = expected.pi + (1 - expected.pi) * Math.exp(-((median / expected.scale) ** expected.shape));
    expect(survival).toBeCloseTo(0.5, 4);
    // The share is the best one: less likely a little to either side.
    const at = (pi: number): number => weibullFamily.fit(data, pi)?.logLikelihood ?? -Infinity;
    expect(at(expected.pi)).toBeGreaterThan(at(expected.pi - 0.01));
    expect(at(expected.pi)).toBeGreaterThan(at(expected.pi + 0.01));
  });

  it('the Weibull’s log likelihood in (ln median, ln shape) is the textbook one', () => {
    // Σ events [ln κ − ln σ + (κ − 1) ln(t/σ)] − Σ (t/σ)^κ, Kalbfleisch & Prentice 2002, ch. 3.
    const rows = readCsv('veteran.csv');
    const [shape, scale] = [0.9, 110];
    const plain = rows.reduce((sum, { time, status }) => {
      const t = Number(time) / scale;
      return sum + (status === '1' ? Math.log(shape / scale) + (shape - 1) * Math.log(t) : 0) - t ** shape;
    }, 0);
    const lnMedian = Math.log(scale * Math.LN2 ** (1 / shape));
    expect(weibullLogLikelihood(dataOf('veteran.csv'), 0)(lnMedian, Math.log(shape))).toBeCloseTo(plain, 9);
  });
});
