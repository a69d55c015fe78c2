import gammaln from '@stdlib/math-base-special-gammaln';

/**
 * Closed forms that the simulator has to agree with, written out plainly and independently of the engine.
 */

/** P(N <= n), N negative binomial: Poisson with a Gamma(shape, rate) mean per unit of time, over `time`. */
export function negativeBinomialCdf(n: number, shape: number, rate: number, time: number): number {
  const logKeep = Math.log(rate / (rate + time));
  const logAdd = Math.log(time / (rate + time));
  let sum = 0;
  for (let k = 0; k <= n; k += 1) {
    sum += Math.exp(gammaln(shape + k) - gammaln(shape) - gammaln(k + 1) + shape * logKeep + k * logAdd);
  }
  return sum;
}

/** Smallest n with P(N <= n) >= p. */
export function negativeBinomialQuantile(p: number, shape: number, rate: number, time: number): number {
  let n = 0;
  while (negativeBinomialCdf(n, shape, rate, time) < p) n += 1;
  return n;
}

/** Distribution function of the time to n more at a total rate ~ Gamma(shape, rate): Pearson VI, here by its duality. */
export function waitingTimeCdf(time: number, n: number, shape: number, rate: number): number {
  return time <= 0 ? 0 : 1 - negativeBinomialCdf(n - 1, shape, rate, time);
}

export function waitingTimeQuantile(p: number, n: number, shape: number, rate: number): number {
  return bisect((time) => waitingTimeCdf(time, n, shape, rate) - p, 0, (1000 * n * rate) / shape);
}

/** P(N >= k), N Poisson with that mean. */
export function poissonUpper(k: number, mean: number): number {
  let below = 0;
  for (let n = 0; n < k; n += 1) below += Math.exp(n * Math.log(mean) - mean - gammaln(n + 1));
  return 1 - below;
}

export function bisect(rising: (x: number) => number, low: number, high: number): number {
  for (let step = 0; step < 200; step += 1) {
    const middle = (low + high) / 2;
    if (rising(middle) < 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

export function mean(values: ArrayLike<number>): number {
  return Array.from(values).reduce((sum, value) => sum + value, 0) / values.length;
}

export function variance(values: ArrayLike<number>): number {
  const centre = mean(values);
  return Array.from(values).reduce((sum, value) => sum + (value - centre) ** 2, 0) / (values.length - 1);
}

/** Share of values at most x. */
export function shareUpTo(values: ArrayLike<number>, x: number): number {
  return Array.from(values).filter((value) => value <= x).length / values.length;
}

/** Four standard errors of a share among that many draws: what chance gives once in 16,000 tests. */
export function shareTolerance(p: number, draws: number): number {
  return 4 * Math.sqrt((p * (1 - p)) / draws) + 1 / draws;
}
