/**
 * Rates of many sites with their sum at hand: a complete binary tree of sums. A change or a choice takes log2(n) steps, and
 * because each node is the sum of its two children the total never drifts: when all rates are 0 it is exactly 0.
 */
export interface RateTree {
  /** Number of leaves, a power of two. */
  leaves: number;
  /** Node 1 is the root, node k has the children 2k and 2k + 1, leaf i is node `leaves` + i. */
  sums: Float64Array;
}

export function createRateTree(size: number): RateTree {
  let leaves = 1;
  while (leaves < size) leaves *= 2;
  return { leaves, sums: new Float64Array(2 * leaves) };
}

export function setRate(tree: RateTree, place: number, rate: number): void {
  const { sums } = tree;
  let node = tree.leaves + place;
  sums[node] = rate;
  while (node > 1) {
    node >>= 1;
    sums[node] = (sums[2 * node] as number) + (sums[2 * node + 1] as number);
  }
}

/** A place with probability proportional to its rate; the total is positive. */
export function choosePlace(tree: RateTree, uniform: number): number {
  const { sums, leaves } = tree;
  let rest = uniform * (sums[1] as number);
  let node = 1;
  while (node < leaves) {
    node *= 2;
    const left = sums[node] as number;
    // A right child of rate 0 is never entered, whatever rounding says.
    if (rest >= left && (sums[node + 1] as number) > 0) {
      rest -= left;
      node += 1;
    }
  }
  return node - leaves;
}
