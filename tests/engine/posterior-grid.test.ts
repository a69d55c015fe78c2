import { describe, expect, it } from 'vitest';
import { createGenerator } from '@/lib/engine/generator';
import { findMode } from '@/lib/engine/mode';
import { cellsOf, drawFromGrid, posteriorGrid } from '@/lib/engine/posterior-grid';
import { mean, variance } from '@/tests/reference/closed-forms';

/** Log density of two correlated normals, with its constant: the integral is 1. */
function normal(x: number, y: number): number {
  const [u, v, r] = [(x - 2) / 0.3, (y + 1) / 1.5, 0.7];
  return (
    -(u * u - 2 * r * u * v + v * v) / (2 * (1 - r * r)) - Math.log(2 * Math.PI * 0.3 * 1.5 * Math.sqrt(1 - r * r))
  );
}

describe('mode', () => {
  it('finds the peak and the covariance of two correlated normals', () => {
    const mode = findMode(normal, { x: 0, y: 0 });
    expect(mode.x).toBeCloseTo(2, 9);
    expect(mode.y).toBeCloseTo(-1, 9);
    expect(mode.covariance.xx).toBeCloseTo(0.09, 6);
    expect(mode.covariance.xy).toBeCloseTo(0.7 * 0.3 * 1.5, 5);
    expect(mode.covariance.yy).toBeCloseTo(2.25, 4);
  });
});

describe('posterior grid', () => {
  it('integral, means and variances of two correlated normals', () => {
    const grid = posteriorGrid(normal, { x: 0, y: 0 });
    const { weights, x, y } = cellsOf(grid);
    const moment = (values: Float64Array, power: number): number =>
      weights.reduce((sum, weight, cell) => sum + weight * (values[cell] as number) ** power, 0);
    expect(grid.logIntegral).toBeCloseTo(0, 5);
    expect(moment(x, 1)).toBeCloseTo(2, 6);
    expect(moment(y, 1)).toBeCloseTo(-1, 5);
    expect(Math.sqrt(moment(x, 2) - moment(x, 1) ** 2)).toBeCloseTo(0.3, 5);
    expect(Math.sqrt(moment(y, 2) - moment(y, 1) ** 2)).toBeCloseTo(1.5, 4);
  });

  it('draws have the grid’s means, variances and correlation', () => {
    const grid = posteriorGrid(normal, { x: 0, y: 0 });
    const generator = createGenerator(2);
    generator.startAt(0, 0, 0);
    const draws = 40_000;
    const [xs, ys, out] = [new Float64Array(draws), new Float64Array(draws), new Float64Array(2)];
    for (let draw = 0; draw < draws; draw += 1) {
      drawFromGrid(grid, generator, out);
      xs[draw] = out[0] as number;
      ys[draw] = out[1] as number;
    }
    expect(Math.abs(mean(xs) - 2)).toBeLessThan(4 * (0.3 / Math.sqrt(draws)));
    expect(Math.abs(mean(ys) + 1)).toBeLessThan(4 * (1.5 / Math.sqrt(draws)));
    expect(Math.abs(variance(xs) / 0.09 - 1)).toBeLessThan(4 * Math.sqrt(2 / draws) + 0.003);
    expect(Math.abs(variance(ys) / 2.25 - 1)).toBeLessThan(4 * Math.sqrt(2 / draws) + 0.003);
    const together = mean(xs.map((value, draw) => (value - 2) * ((ys[draw] as number) + 1)));
    expect(Math.abs(together / (0.3 * 1.5) - 0.7)).toBeLessThan(0.02);
  });

  it('moves a side out where the density has a long tail there, until the border holds next to nothing', () => {
    // ln of an exponential variate: falls like e^x to the left.
    const grid = posteriorGrid((x, y) => x - Math.exp(x) - 0.5 * y * y - 0.5 * Math.log(2 * Math.PI), { x: 0, y: 0 });
    expect(grid.logIntegral).toBeCloseTo(0, 3);
    const left = Array.from({ length: 61 }, (_, row) => grid.weights[row * 61] as number);
    expect(left.reduce((sum, weight) => sum + weight, 0)).toBeLessThan(1e-6);
  });

  it('refuses a density that does not fall off', () => {
    expect(() => posteriorGrid((x, y) => -0.5 * y * y - Math.exp(-x), { x: 0, y: 0 })).toThrow(RangeError);
  });
});
