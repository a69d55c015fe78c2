import gamma from '@stdlib/stats-base-dists-gamma';
import { describe, expect, it } from 'vitest';
import { quantileType7 } from '@/lib/engine/quantiles';
import { checkValue, checkValues } from './check-values';
import {
  mean,
  negativeBinomialCdf,
  negativeBinomialQuantile,
  poissonUpper,
  shareTolerance,
  shareUpTo,
  variance,
  waitingTimeCdf,
  waitingTimeQuantile,
} from './closed-forms';
import { countsAt, type KnownEnrolment, simulateKnown } from './known-enrolment';

const DRAWS = 20_000;

/** The n-th arrival of each draw, ascending; Infinity where it does not come. */
function waitingTimes(arrivals: readonly Float64Array[], n: number): Float64Array {
  return Float64Array.from(arrivals, (moments) => moments[n - 1] ?? Infinity).sort();
}

describe('closed forms themselves', () => {
  it.each(checkValues<Record<'alpha' | 'beta' | 't' | 'n', number>, Record<string, number>>('A-nb-'))(
    '$id: negative binomial count ($source)',
    ({ inputs: { alpha, beta, t, n }, expected }) => {
      expect(Math.abs(negativeBinomialCdf(n, alpha, beta, t) - (expected.cdf as number))).toBeLessThan(1e-10);
      expect(negativeBinomialQuantile(0.9, alpha, beta, t)).toBe(expected.q90);
    },
  );

  it.each(
    checkValues<{ n: number; A: number; B: number; t: number; probs: number[] }, { cdf: number; quantiles: number[] }>(
      'A-betaprime-',
    ),
  )('$id: time to n more, Pearson VI ($source)', ({ inputs: { n, A, B, t, probs }, expected }) => {
    expect(Math.abs(waitingTimeCdf(t, n, A, B) - expected.cdf)).toBeLessThan(1e-9);
    probs.forEach((p, place) => {
      expect(Math.abs(waitingTimeQuantile(p, n, A, B) - (expected.quantiles[place] as number))).toBeLessThan(1e-7);
    });
  });
});

describe('the simulator against closed forms', () => {
  it.each(checkValues<Record<'alpha' | 'beta' | 't' | 'n', number>, Record<string, number>>('A-nb-'))(
    '$id: one site’s count is negative binomial ($source)',
    ({ inputs: { alpha, beta, t, n }, expected }) => {
      const counts = countsAt(
        simulateKnown({ alpha, beta, n: [0], t: [0], remaining: 2000, horizonMonths: t }, DRAWS),
        t,
      );
      const exact = expected.variance as number;
      expect(Math.abs(mean(counts) - (expected.mean as number))).toBeLessThan(4 * Math.sqrt(exact / DRAWS));
      expect(Math.abs(variance(counts) / exact - 1)).toBeLessThan(4 * Math.sqrt((2 + 6 / alpha + 1 / exact) / DRAWS));
      expect(Math.abs(shareUpTo(counts, n) - (expected.cdf as number))).toBeLessThan(
        shareTolerance(expected.cdf as number, DRAWS),
      );
    },
  );

  it.each(checkValues<{ n: number; A: number; B: number; probs: number[] }, { quantiles: number[] }>('A-betaprime-'))(
    '$id: the time to n more at a gamma total rate is Pearson VI ($source)',
    ({ inputs, expected }) => {
      const times = waitingTimes(
        simulateKnown(
          { alpha: inputs.A, beta: inputs.B, n: [0], t: [0], remaining: inputs.n, horizonMonths: 1e4 },
          DRAWS,
        ),
        inputs.n,
      );
      inputs.probs.forEach((p, place) => {
        expect(Math.abs(shareUpTo(times, expected.quantiles[place] as number) - p)).toBeLessThan(
          shareTolerance(p, DRAWS),
        );
      });
    },
  );

  it('12 sites of equal exposure: the total rate is exactly Gamma(C alpha + N, beta + t) (R)', () => {
    const { inputs, expected } = checkValue<
      { alpha: number; beta: number; n: number[]; t: number; target_more: number; probs: number[] },
      { quantiles: number[]; mean: number; sd: number }
    >('B-time-equal-exposure');
    const times = waitingTimes(
      simulateKnown(
        { ...inputs, t: inputs.n.map(() => inputs.t), remaining: inputs.target_more, horizonMonths: 600 },
        DRAWS,
      ),
      inputs.target_more,
    );
    expect(Math.abs(mean(times) - expected.mean)).toBeLessThan((4 * expected.sd) / Math.sqrt(DRAWS));
    inputs.probs.forEach((p, place) => {
      expect(Math.abs(shareUpTo(times, expected.quantiles[place] as number) - p)).toBeLessThan(
        shareTolerance(p, DRAWS),
      );
    });
  });

  it('constant known rate: the elapsed time to the k-th is Gamma(k, rate), and P(T_k <= t) = P(N(t) >= k)', () => {
    // A coefficient of variation of 0.001 stands for a known rate. Source: Johnson, Kotz & Balakrishnan 1994, ch. 17; duality.
    const rate = 3;
    const known: KnownEnrolment = { alpha: 1e6, beta: 1e6 / rate, n: [0], t: [0], remaining: 60, horizonMonths: 600 };
    const arrivals = simulateKnown(known, DRAWS);
    for (const k of [1, 5, 20, 50]) {
      const times = waitingTimes(arrivals, k);
      for (const p of [0.1, 0.5, 0.9]) {
        const t = gamma.quantile(p, k, rate);
        const share = shareUpTo(times, t);
        expect(Math.abs(share - p)).toBeLessThan(shareTolerance(p, DRAWS));
        expect(Math.abs(share - poissonUpper(k, rate * t))).toBeLessThan(shareTolerance(p, DRAWS));
      }
    }
  });

  it.each(
    checkValues<
      {
        alpha: number;
        beta: number;
        n: number[];
        t: number[];
        h: number;
        new_site_activation_after_census: number[];
        target_more: number;
        probs: number[];
      },
      { mean: number; variance: number; prob_reach_target: number; quantiles: number[] }
    >('B-pred-').filter(({ id }) => /\d$/.test(id)),
  )('$id: count over a horizon, sites open and to come ($source)', ({ inputs, expected }) => {
    const counts = countsAt(
      simulateKnown(
        { ...inputs, newSites: inputs.new_site_activation_after_census, remaining: 1500, horizonMonths: inputs.h },
        DRAWS,
      ),
      inputs.h,
    );
    expect(Math.abs(mean(counts) - expected.mean)).toBeLessThan(4 * Math.sqrt(expected.variance / DRAWS));
    expect(Math.abs(variance(counts) / expected.variance - 1)).toBeLessThan(4 * Math.sqrt(3 / DRAWS));
    expect(Math.abs(1 - shareUpTo(counts, inputs.target_more - 1) - expected.prob_reach_target)).toBeLessThan(
      shareTolerance(expected.prob_reach_target, DRAWS),
    );
    const sorted = Float64Array.from(counts).sort();
    inputs.probs.forEach((p, place) => {
      expect(Math.abs(quantileType7(sorted, p) - (expected.quantiles[place] as number))).toBeLessThanOrEqual(1);
    });
  });

  it.each(
    checkValues<
      {
        alpha: number;
        beta: number;
        n: number[];
        t: number[];
        new_site_activation_after_census: number[];
        target_more: number;
        probs: number[];
      },
      { quantiles_exact: number[] }
    >('B-time-').filter(({ id }) => /\d$/.test(id)),
  )('$id: time until n more ($source)', ({ inputs, expected }) => {
    const times = waitingTimes(
      simulateKnown(
        {
          ...inputs,
          newSites: inputs.new_site_activation_after_census,
          remaining: inputs.target_more,
          horizonMonths: 120,
        },
        DRAWS,
      ),
      inputs.target_more,
    );
    inputs.probs.forEach((p, place) => {
      expect(Math.abs(shareUpTo(times, expected.quantiles_exact[place] as number) - p)).toBeLessThan(
        shareTolerance(p, DRAWS),
      );
    });
  });

  it('caps and closures: min(negative binomial, cap − n) over the time open (R, exact convolution)', () => {
    const { inputs, expected } = checkValue<
      {
        alpha: number;
        beta: number;
        n: number[];
        t: number[];
        h: number;
        cap: number;
        close_after_census: (number | null)[];
      },
      { mean: number; variance: number; quantiles_10_50_90: number[]; mean_without_caps_or_closures: number }
    >('B-cap-closure');
    const known: KnownEnrolment = { ...inputs, remaining: 1000, horizonMonths: inputs.h };
    const counts = countsAt(
      simulateKnown({ ...known, closes: inputs.close_after_census, cap: inputs.cap }, DRAWS),
      inputs.h,
    );
    expect(Math.abs(mean(counts) - expected.mean)).toBeLessThan(4 * Math.sqrt(expected.variance / DRAWS));
    expect(Math.abs(variance(counts) / expected.variance - 1)).toBeLessThan(4 * Math.sqrt(3 / DRAWS));
    const sorted = Float64Array.from(counts).sort();
    [0.1, 0.5, 0.9].forEach((p, place) => {
      expect(Math.abs(quantileType7(sorted, p) - (expected.quantiles_10_50_90[place] as number))).toBeLessThanOrEqual(
        1,
      );
    });
    const { cap: _cap, ...uncapped } = known;
    expect(
      Math.abs(mean(countsAt(simulateKnown(uncapped, 5000), inputs.h)) - expected.mean_without_caps_or_closures),
    ).toBeLessThan(2);
  });
});
