import { describe, expect, it } from 'vitest';
import { pooledMedianMonths } from '@/lib/engine/plan';

describe('median of the pooled time to event', () => {
  it('without an effect it is the control’s', () => {
    expect(pooledMedianMonths({ controlMedianMonths: 14, hazardRatio: 1, allocationRatio: 2 })).toBeCloseTo(14, 12);
  });

  it('hazard ratio 1/2, 1 : 1: with u = exp(−h t / 2), u² + u = 1, so t = −2 ln((√5 − 1)/2) / h', () => {
    const exact = (-2 * Math.log((Math.sqrt(5) - 1) / 2) * 12) / Math.LN2;
    expect(pooledMedianMonths({ controlMedianMonths: 12, hazardRatio: 0.5, allocationRatio: 1 })).toBeCloseTo(
      exact,
      10,
    );
  });

  it('half of the mixture survives it, and it is not the weighted mean of the medians', () => {
    const plan = { controlMedianMonths: 18, hazardRatio: 0.7, allocationRatio: 2 };
    const median = pooledMedianMonths(plan);
    const hazard = Math.LN2 / 18;
    expect((Math.exp(-hazard * median) + 2 * Math.exp(-hazard * 0.7 * median)) / 3).toBeCloseTo(0.5, 12);
    expect(Math.abs(median - (18 + (2 * 18) / 0.7) / 3)).toBeGreaterThan(0.2);
  });

  it('holds with a hazard ratio above 1 and at extremes', () => {
    expect(pooledMedianMonths({ controlMedianMonths: 10, hazardRatio: 4, allocationRatio: 1 })).toBeGreaterThan(2.5);
    expect(pooledMedianMonths({ controlMedianMonths: 1e-3, hazardRatio: 1e-3, allocationRatio: 1e-6 })).toBeCloseTo(
      1e-3,
      6,
    );
  });

  it.each([
    { controlMedianMonths: 0, hazardRatio: 0.7, allocationRatio: 1 },
    { controlMedianMonths: 12, hazardRatio: -1, allocationRatio: 1 },
    { controlMedianMonths: 12, hazardRatio: 0.7, allocationRatio: Infinity },
    { controlMedianMonths: NaN, hazardRatio: 0.7, allocationRatio: 1 },
  ])('refuses $controlMedianMonths, $hazardRatio, $allocationRatio', (plan) => {
    expect(() => pooledMedianMonths(plan)).toThrow(RangeError);
  });
});
