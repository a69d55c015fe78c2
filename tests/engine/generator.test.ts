import { describe, expect, it } from 'vitest';
import { createGenerator, philox4x32, PURPOSE } from '@/lib/engine/generator';
import { mean, shareTolerance, shareUpTo, variance } from '@/tests/reference/closed-forms';

const WORD = 0xffffffff;

describe('philox4x32-10', () => {
  // Known-answer vectors of the Random123 library, tests/kat_vectors (Salmon, Moraes, Dror & Shaw 2011).
  it.each([
    { counter: [0, 0, 0, 0], key: [0, 0], out: '6627e8d5 e169c58d bc57ac4c 9b00dbd8' },
    { counter: [WORD, WORD, WORD, WORD], key: [WORD, WORD], out: '408f276d 41c83b0e a20bc7c6 6d5451fd' },
    {
      counter: [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344],
      key: [0xa4093822, 0x299f31d0],
      out: 'd16cfe09 94fdcceb 5001e420 24126ea1',
    },
  ])('gives the published words for counter $counter', ({ counter, key, out }) => {
    const words = new Uint32Array(4);
    philox4x32(counter as [number, number, number, number], key as [number, number], words);
    expect(Array.from(words, (word) => word.toString(16).padStart(8, '0')).join(' ')).toBe(out);
  });
});

describe('xoshiro128**', () => {
  it('gives the words of the reference implementation 1.1 from the state 1, 2, 3, 4 (as in rand_xoshiro’s tests)', () => {
    const generator = createGenerator(0);
    generator.setState([1, 2, 3, 4]);
    const words = Array.from({ length: 10 }, () => generator.nextWord());
    expect(words).toEqual([
      11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597, 4258142804,
    ]);
  });
});

describe('sequences', () => {
  const start = (seed: number, stream: number, draw: number, purpose: 0 | 1): number[] => {
    const generator = createGenerator(seed);
    generator.startAt(stream, draw, purpose);
    return Array.from({ length: 4 }, () => generator.nextWord());
  };

  it('depend on seed, stream, draw and purpose, and on nothing else', () => {
    expect(start(7, 3, 2, 1)).toEqual(start(7, 3, 2, 1));
    const others = [
      start(8, 3, 2, 1),
      start(7, 4, 2, 1),
      start(7, 3, 1, 1),
      start(7, 3, 2, 0),
      start(7 + 2 ** 32, 3, 2, 1),
    ];
    const all = [start(7, 3, 2, 1), ...others].map(String);
    expect(new Set(all).size).toBe(all.length);
  });

  it('refuse a seed that is no whole number from 0', () => {
    expect(() => createGenerator(-1)).toThrow(RangeError);
    expect(() => createGenerator(0.5)).toThrow(RangeError);
  });

  it('no two purposes share a number', () => {
    const numbers = Object.values(PURPOSE);
    expect(new Set(numbers).size).toBe(numbers.length);
  });
});

describe('variates', () => {
  const DRAWS = 200_000;

  it('uniforms stay inside (0, 1) and fill it evenly', () => {
    const generator = createGenerator(1);
    generator.startAt(0, 0, 0);
    const values = new Float64Array(DRAWS);
    generator.fillUniform(values, DRAWS);
    expect(Math.min(...values.slice(0, 1000))).toBeGreaterThan(0);
    const bins = new Float64Array(100);
    for (const value of values) bins[Math.floor(value * 100)] = (bins[Math.floor(value * 100)] as number) + 1;
    const chiSquared = bins.reduce((sum, count) => sum + (count - DRAWS / 100) ** 2 / (DRAWS / 100), 0);
    // 0.01 % and 99.99 % points of chi-squared with 99 degrees of freedom.
    expect(chiSquared).toBeGreaterThan(54);
    expect(chiSquared).toBeLessThan(160);
  });

  it('exponentials have mean 1, variance 1 and the tail e^-x, also beyond the lowest layer of the ziggurat', () => {
    const generator = createGenerator(1);
    generator.startAt(0, 1, 0);
    const values = new Float64Array(DRAWS);
    generator.fillExponential(values, DRAWS);
    expect(Math.abs(mean(values) - 1)).toBeLessThan(4 / Math.sqrt(DRAWS));
    expect(Math.abs(variance(values) - 1)).toBeLessThan(4 * Math.sqrt(8 / DRAWS));
    for (const x of [0.001, 0.01, 0.1, 0.5, 1, 2, 4, 6, 7.5, 8, 9]) {
      const below = -Math.expm1(-x);
      expect(Math.abs(shareUpTo(values, x) - below)).toBeLessThan(shareTolerance(below, DRAWS));
    }
  });
});
