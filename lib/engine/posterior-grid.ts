import { type AliasTable, buildAliasTable, drawCell } from './alias-table';
import { exp, ln } from './elementary';
import type { Generator } from './generator';
import { findMode } from './mode';

const NODES = 61;
const MIDDLE = (NODES - 1) / 2;
const BORDER_MASS = 1e-6;
const START_REACH = 5;
const WIDEST = 200;

/**
 * A density of two variables on 61 x 61 cells. The rows lie along y; within a row the cells lie along x, around the line
 * on which x is most probable given y. (The axes of the normal approximation's Cholesky factor: a row has one y, so that a
 * log density may keep what depends on y alone.)
 */
export interface PosteriorGrid {
  /** y of each row's middle. */
  rows: Float64Array;
  /** x of the middle cell of each row. */
  rowCentres: Float64Array;
  /** Distance of neighbouring cells along x, and of neighbouring rows along y. */
  stepX: number;
  stepY: number;
  /** Slope of the rows' centres: how far x moves with y. */
  slope: number;
  /** Probability of each cell, row by row; they add up to 1. */
  weights: Float64Array;
  alias: AliasTable;
  /** Logarithm of the density's integral: the log marginal likelihood where the density is likelihood times proper prior. */
  logIntegral: number;
  mode: { x: number; y: number };
}

/**
 * Posterior of two parameters by quadrature: find the mode, take the Hessian, lay 61 x 61 cells over at least 5 standard
 * deviations on each side, normalise by log-sum-exp; a side whose border holds 10⁻⁶ of the mass or more is moved out.
 *
 * @param logDensity unnormalised log posterior of (x, y), each of order 1 (logarithms); called row by row, y constant in a row
 * @param start a point where the density is positive
 * @throws RangeError where the density does not fall off (an improper posterior)
 */
export function posteriorGrid(
  logDensity: (x: number, y: number) => number,
  start: { x: number; y: number },
): PosteriorGrid {
  const mode = findMode(logDensity, start);
  const sdY = Math.sqrt(mode.covariance.yy);
  const slope = mode.covariance.xy / mode.covariance.yy;
  const sdX = Math.sqrt(Math.max(mode.covariance.xx - slope * mode.covariance.xy, 1e-12));
  const reach = { left: START_REACH, right: START_REACH, below: START_REACH, above: START_REACH };
  for (;;) {
    const grid = layGrid(logDensity, mode, { sdX, sdY, slope }, reach);
    let moved = false;
    for (const side of ['left', 'right', 'below', 'above'] as const) {
      if (borderMass(grid.weights, side) < BORDER_MASS / 4) continue;
      reach[side] *= 1.5;
      moved = true;
      if (reach[side] > WIDEST) throw new RangeError('The posterior does not fall off: it has no proper distribution.');
    }
    if (!moved) return grid;
  }
}

type Reach = Record<'left' | 'right' | 'below' | 'above', number>;

function layGrid(
  logDensity: (x: number, y: number) => number,
  mode: { x: number; y: number; value: number },
  axes: { sdX: number; sdY: number; slope: number },
  reach: Reach,
): PosteriorGrid {
  const stepX = (axes.sdX * (reach.left + reach.right)) / (NODES - 1);
  const stepY = (axes.sdY * (reach.below + reach.above)) / (NODES - 1);
  const middleX = (axes.sdX * (reach.right - reach.left)) / 2;
  const middleY = mode.y + (axes.sdY * (reach.above - reach.below)) / 2;
  const rows = new Float64Array(NODES);
  const rowCentres = new Float64Array(NODES);
  const weights = new Float64Array(NODES * NODES);
  let largest = -Infinity;
  for (let row = 0; row < NODES; row += 1) {
    const y = middleY + (row - MIDDLE) * stepY;
    const centre = mode.x + axes.slope * (y - mode.y) + middleX;
    rows[row] = y;
    rowCentres[row] = centre;
    for (let column = 0; column < NODES; column += 1) {
      const value = logDensity(centre + (column - MIDDLE) * stepX, y);
      weights[row * NODES + column] = Number.isNaN(value) ? -Infinity : value;
      if (value > largest) largest = value;
    }
  }
  let total = 0;
  for (let cell = 0; cell < weights.length; cell += 1) {
    weights[cell] = exp((weights[cell] as number) - largest);
    total += weights[cell] as number;
  }
  for (let cell = 0; cell < weights.length; cell += 1) weights[cell] = (weights[cell] as number) / total;
  return {
    rows,
    rowCentres,
    stepX,
    stepY,
    slope: axes.slope,
    weights,
    alias: buildAliasTable(weights),
    logIntegral: largest + ln(total * stepX * stepY),
    mode: { x: mode.x, y: mode.y },
  };
}

function borderMass(weights: Float64Array, side: keyof Reach): number {
  let mass = 0;
  for (let place = 0; place < NODES; place += 1) {
    const row = side === 'below' ? 0 : side === 'above' ? NODES - 1 : place;
    const column = side === 'left' ? 0 : side === 'right' ? NODES - 1 : place;
    mass += weights[row * NODES + column] as number;
  }
  return mass;
}

/**
 * One draw of (x, y): a cell by the alias method, then a uniform place inside the cell.
 *
 * @param out receives x and y in its first two places
 */
export function drawFromGrid(grid: PosteriorGrid, generator: Generator, out: Float64Array): void {
  const cell = drawCell(grid.alias, generator);
  const row = Math.floor(cell / NODES);
  const column = cell - row * NODES;
  const aside = (generator.uniform() - 0.5) * grid.stepY;
  out[0] =
    (grid.rowCentres[row] as number) + grid.slope * aside + (column - MIDDLE + generator.uniform() - 0.5) * grid.stepX;
  out[1] = (grid.rows[row] as number) + aside;
}

/**
 * The cells' middles and probabilities, without those below 10⁻¹² of the mass: sums over them are the quadrature of the
 * posterior's expectations.
 */
export function cellsOf(grid: PosteriorGrid): { weights: Float64Array; x: Float64Array; y: Float64Array } {
  const heavy: number[] = [];
  grid.weights.forEach((weight, cell) => {
    if (weight > 1e-12) heavy.push(cell);
  });
  const rowOf = (cell: number): number => Math.floor(cell / NODES);
  return {
    weights: Float64Array.from(heavy, (cell) => grid.weights[cell] as number),
    x: Float64Array.from(
      heavy,
      (cell) => (grid.rowCentres[rowOf(cell)] as number) + (cell - rowOf(cell) * NODES - MIDDLE) * grid.stepX,
    ),
    y: Float64Array.from(heavy, (cell) => grid.rows[rowOf(cell)] as number),
  };
}
