import gamma from '@stdlib/random-base-gamma';
import type { Generator } from './generator';

/**
 * Gamma variates on a given generator: Marsaglia & Tsang 2000, ACM TOMS 26:363, as `@stdlib/random-base-gamma` has it.
 *
 * @returns a function of (shape, rate), both positive: one variate with mean shape / rate. For a very small shape it may
 *   underflow to 0.
 */
export function createGammaVariate(generator: Generator): (shape: number, rate: number) => number {
  return gamma.factory({ prng: generator.uniform });
}
