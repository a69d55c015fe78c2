import { describe, expect, it } from 'vitest';
import { createGenerator } from '@/lib/engine/generator';
import { countInto, medianError, quantileType1, quantileType7 } from '@/lib/engine/quantiles';

describe('type 7 (Hyndman & Fan 1996)', () => {
  it('gives what R’s quantile(c(1, 2, 4, 8, 16), type = 7) gives', () => {
    const sorted = Float64Array.of(1, 2, 4, 8, 16);
    expect([0.025, 0.1, 0.25, 0.5, 0.9, 0.975].map((p) => quantileType7(sorted, p))).toEqual(
      [1.1, 1.4, 2, 4, 12.8, 15.2].map((value) => expect.closeTo(value, 12)),
    );
  });

  it('an interpolation that touches +Infinity is +Infinity, a rank that meets a number is that number', () => {
    const sorted = Float64Array.of(1, 2, 3, Infinity, Infinity);
    expect(quantileType7(sorted, 0.5)).toBe(3);
    expect(quantileType7(sorted, 0.51)).toBe(Infinity);
    expect(quantileType7(sorted, 0.9)).toBe(Infinity);
  });
});

describe('type 1', () => {
  it('is the smallest count whose cumulative share is at least p', () => {
    const histogram = countInto(undefined, Int32Array.of(3, 3, 5, 9));
    const grown = countInto(histogram, Int32Array.of(1, 12, 5, 5));
    // 1, 3, 3, 5, 5, 5, 9, 12
    expect([0.125, 0.126, 0.375, 0.5, 0.75, 0.76, 1].map((p) => quantileType1(grown, 8, p))).toEqual([
      1, 3, 3, 5, 5, 9, 12,
    ]);
  });

  it('does not fall for the last bit of p · n', () => {
    const counts = Int32Array.from({ length: 1000 }, (_, place) => place + 1);
    const histogram = countInto(undefined, counts);
    for (const p of [0.025, 0.05, 0.1, 0.9, 0.95, 0.975])
      expect(quantileType1(histogram, 1000, p)).toBe(Math.round(1000 * p));
  });
});

describe('Monte Carlo error of the median', () => {
  it('is near the spread of the medians of many samples: 1 / (2 f √n), here 1/√n for the exponential', () => {
    const generator = createGenerator(4);
    const size = 400;
    const errors: number[] = [];
    const medians: number[] = [];
    for (let sample = 0; sample < 400; sample += 1) {
      generator.startAt(0, sample, 0);
      const values = new Float64Array(size);
      generator.fillExponential(values, size);
      values.sort();
      errors.push(medianError(values) ?? NaN);
      medians.push(quantileType7(values, 0.5));
    }
    const centre = medians.reduce((sum, value) => sum + value, 0) / medians.length;
    const spread = Math.sqrt(medians.reduce((sum, value) => sum + (value - centre) ** 2, 0) / medians.length);
    const average = errors.reduce((sum, value) => sum + value, 0) / errors.length;
    expect(spread).toBeCloseTo(1 / Math.sqrt(size), 2);
    expect(average / spread).toBeGreaterThan(0.9);
    expect(average / spread).toBeLessThan(1.25);
  });

  it('is not known where the interval reaches “never”', () => {
    expect(medianError(Float64Array.of(1, 2, Infinity, Infinity))).toBeNull();
  });
});
