import type { Generator } from './generator';

/** Cells with given probabilities, drawn in constant time. */
export interface AliasTable {
  /** Chance that a cell keeps a draw that falls on it. */
  keep: Float64Array;
  /** The cell that takes the draw otherwise. */
  alias: Int32Array;
}

/**
 * Alias table of a discrete distribution.
 *
 * @param weights not negative, with a positive sum; they need not add up to 1
 * @throws RangeError where no weight is positive
 * @see Walker 1977, ACM TOMS 3:253; Vose 1991, IEEE Trans Softw Eng 17:972
 */
export function buildAliasTable(weights: Float64Array): AliasTable {
  const size = weights.length;
  let total = 0;
  for (const weight of weights) total += weight;
  if (!(total > 0)) throw new RangeError('A discrete distribution has at least one positive weight.');
  const keep = new Float64Array(size);
  const alias = new Int32Array(size);
  const small = new Int32Array(size);
  const large = new Int32Array(size);
  let smallCount = 0;
  let largeCount = 0;
  for (let cell = 0; cell < size; cell += 1) {
    const share = ((weights[cell] as number) * size) / total;
    keep[cell] = share;
    alias[cell] = cell;
    if (share < 1) small[smallCount++] = cell;
    else large[largeCount++] = cell;
  }
  while (smallCount > 0 && largeCount > 0) {
    const less = small[--smallCount] as number;
    const more = large[largeCount - 1] as number;
    alias[less] = more;
    const left = (keep[more] as number) - (1 - (keep[less] as number));
    keep[more] = left;
    if (left < 1) {
      largeCount -= 1;
      small[smallCount++] = more;
    }
  }
  // What rounding leaves on either pile is 1 up to the last bit.
  while (largeCount > 0) keep[large[--largeCount] as number] = 1;
  while (smallCount > 0) keep[small[--smallCount] as number] = 1;
  return { keep, alias };
}

/** One cell of the table; takes two uniforms. */
export function drawCell(table: AliasTable, generator: Generator): number {
  const size = table.keep.length;
  const cell = Math.floor(generator.uniform() * size);
  return generator.uniform() < (table.keep[cell] as number) ? cell : (table.alias[cell] as number);
}
