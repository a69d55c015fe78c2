/** A small seeded generator for invented data only (mulberry32); the engine has its own, tested one. */
export class DemoRandom {
  #state: number;

  constructor(seed: number) {
    this.#state = seed >>> 0;
  }

  uniform(): number {
    this.#state = (this.#state + 0x6d2b79f5) >>> 0;
    let t = this.#state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  }

  between(least: number, most: number): number {
    return least + Math.floor(this.uniform() * (most - least + 1));
  }

  pick<T>(items: readonly T[]): T {
    return items[Math.floor(this.uniform() * items.length)]!;
  }

  poisson(mean: number): number {
    const limit = Math.exp(-mean);
    let count = 0;
    for (let product = this.uniform(); product > limit; product *= this.uniform()) count += 1;
    return count;
  }

  exponential(mean: number): number {
    return -mean * Math.log(1 - this.uniform());
  }

  /** Gamma with an integer or half-integer shape, as a sum of exponentials and half a squared normal: enough for a demonstration. */
  gamma(shape: number, mean: number): number {
    let total = 0;
    for (let i = 0; i < Math.floor(shape); i += 1) total += this.exponential(1);
    if (shape % 1 !== 0) {
      const normal = Math.sqrt(-2 * Math.log(1 - this.uniform())) * Math.cos(2 * Math.PI * this.uniform());
      total += (normal * normal) / 2;
    }
    return (total * mean) / shape;
  }
}
