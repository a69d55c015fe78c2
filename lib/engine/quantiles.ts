/**
 * Type 7 quantile of Hyndman & Fan 1996, Am Stat 50:361: linear between order statistics, h = (n - 1) p.
 *
 * @param sorted values in ascending order, at least one; +Infinity stands for "never"
 * @param p from 0 to 1
 * @returns the quantile; an interpolation that touches +Infinity is +Infinity
 */
export function quantileType7(sorted: Float64Array, p: number): number {
  const place = (sorted.length - 1) * p;
  const below = Math.floor(place);
  const lower = sorted[below] as number;
  const share = place - below;
  if (share === 0) return lower;
  const upper = sorted[below + 1] as number;
  return upper === Infinity ? Infinity : lower + share * (upper - lower);
}

/**
 * Monte Carlo error of the median, in the units of the values: half the width between the order statistics at ranks
 * n/2 - sqrt(n)/2 and n/2 + sqrt(n)/2 (rounded outwards), between which the true median lies with about 68 % because the
 * number of draws below it is binomial(n, 1/2). It reads like a standard error.
 *
 * @param sorted values in ascending order, at least one
 * @returns null where the interval reaches +Infinity
 * @see David & Nagaraja 2003, Order Statistics, 3rd ed., section 7.1
 */
export function medianError(sorted: Float64Array): number | null {
  const count = sorted.length;
  const spread = Math.sqrt(count) / 2;
  const low = sorted[Math.max(0, Math.floor(count / 2 - spread) - 1)] as number;
  const high = sorted[Math.min(count - 1, Math.ceil(count / 2 + spread))] as number;
  return high === Infinity ? null : (high - low) / 2;
}

/** How often each whole number occurred. */
export interface CountHistogram {
  /** The number that the first place stands for. */
  from: number;
  frequencies: Float64Array;
}

/**
 * Type 1 quantile of Hyndman & Fan 1996: the smallest count whose cumulative share is at least p.
 *
 * @param total sum of the frequencies
 * @param p above 0, up to 1
 */
export function quantileType1(histogram: CountHistogram, total: number, p: number): number {
  // The product may miss a whole number by its last bits, in either direction.
  const wanted = p * total - total * 1e-12;
  let cumulative = 0;
  for (let place = 0; place < histogram.frequencies.length; place += 1) {
    cumulative += histogram.frequencies[place] as number;
    if (cumulative >= wanted) return histogram.from + place;
  }
  return histogram.from + histogram.frequencies.length - 1;
}

/** Adds counts to a histogram, which grows as needed. */
export function countInto(histogram: CountHistogram | undefined, counts: Int32Array): CountHistogram {
  let lowest = Infinity;
  let highest = -Infinity;
  for (const count of counts) {
    if (count < lowest) lowest = count;
    if (count > highest) highest = count;
  }
  let grown = histogram ?? { from: lowest, frequencies: new Float64Array(highest - lowest + 1) };
  const last = grown.from + grown.frequencies.length - 1;
  if (lowest < grown.from || highest > last) {
    const from = Math.min(lowest, grown.from);
    const frequencies = new Float64Array(Math.max(highest, last) - from + 1);
    frequencies.set(grown.frequencies, grown.from - from);
    grown = { from, frequencies };
  }
  for (const count of counts) {
    const place = count - grown.from;
    grown.frequencies[place] = (grown.frequencies[place] as number) + 1;
  }
  return grown;
}
