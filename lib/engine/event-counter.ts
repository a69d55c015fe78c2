/**
 * Finds the k-th of many events without sorting them: events are counted by day, the day of the k-th is looked up in the
 * running sums, and only the events of that day are compared.
 */
export interface EventCounter {
  /** Takes in the simulated events of one draw; observed ones are always in it. */
  load(moments: Float64Array, count: number): void;
  /** Moment of the k-th event, observed ones included; Infinity where there are not that many. k counts from 1. */
  momentOf(k: number): number;
  /** How many events fall up to the end of a day, a whole moment not before the earliest simulated one. */
  countAt(day: number): number;
}

/**
 * @param observed moments of the observed events, ascending, none after the cut-off (0)
 * @param bounds earliest moment that a simulated event may have, latest one, and how many there are at most
 */
export function createEventCounter(
  observed: Float64Array,
  bounds: { earliest: number; latest: number; most: number },
): EventCounter {
  const first = Math.floor(Math.min(bounds.earliest, 0));
  const days = Math.ceil(bounds.latest) - first + 1;
  const before = observed.reduce((sum, moment) => sum + (moment < first ? 1 : 0), 0);
  const base = new Int32Array(days);
  for (const moment of observed) {
    if (moment >= first) base[Math.ceil(moment) - first] = (base[Math.ceil(moment) - first] as number) + 1;
  }
  const upTo = new Int32Array(days);
  const sameDay = new Float64Array(bounds.most + observed.length);
  let loaded: Float64Array = new Float64Array(0);
  let loadedCount = 0;

  return {
    load(moments, count) {
      loaded = moments;
      loadedCount = count;
      upTo.set(base);
      for (let place = 0; place < count; place += 1) {
        const day = Math.ceil(moments[place] as number) - first;
        upTo[day] = (upTo[day] as number) + 1;
      }
      let sum = before;
      for (let day = 0; day < days; day += 1) {
        sum += upTo[day] as number;
        upTo[day] = sum;
      }
    },
    momentOf(k) {
      if (k <= before) return observed[k - 1] as number;
      if (k > (upTo[days - 1] as number)) return Infinity;
      const day = firstAtLeast(upTo, k);
      const rank = k - (day > 0 ? (upTo[day - 1] as number) : before);
      let many = 0;
      for (let place = 0; place < loadedCount; place += 1) {
        const moment = loaded[place] as number;
        if (Math.ceil(moment) - first === day) sameDay[many++] = moment;
      }
      for (const moment of observed) if (Math.ceil(moment) - first === day) sameDay[many++] = moment;
      return selectRank(sameDay, many, rank);
    },
    countAt: (day) => upTo[Math.min(day - first, days - 1)] as number,
  };
}

function firstAtLeast(ascending: Int32Array, value: number): number {
  let low = 0;
  let high = ascending.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((ascending[middle] as number) >= value) high = middle;
    else low = middle + 1;
  }
  return low;
}

/**
 * The value of a rank among the first `count` places, which it reorders (Hoare's selection, C. A. R. Hoare 1961, CACM 4:321).
 *
 * @param rank from 1
 */
export function selectRank(values: Float64Array, count: number, rank: number): number {
  let low = 0;
  let high = count - 1;
  const wanted = rank - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1] as number;
    let left = low;
    let right = high;
    while (left <= right) {
      while ((values[left] as number) < pivot) left += 1;
      while ((values[right] as number) > pivot) right -= 1;
      if (left <= right) {
        const kept = values[left] as number;
        values[left] = values[right] as number;
        values[right] = kept;
        left += 1;
        right -= 1;
      }
    }
    if (wanted <= right) high = right;
    else if (wanted >= left) low = left;
    else break;
  }
  return values[wanted] as number;
}
