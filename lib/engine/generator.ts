/**
 * Random numbers that depend on (seed, stream, draw, purpose) and on nothing else.
 *
 * Philox4x32-10 maps the counter (draw, stream, purpose, 0) under the key (seed) to 128 bits, a bijection, so that two
 * different places never share a starting state; those bits start xoshiro128**, which is fast enough for the hot loops.
 * Each purpose of each draw has its own sequence: two scenarios that differ in one part meet the same chance in all others.
 *
 * Salmon, Moraes, Dror & Shaw 2011, "Parallel random numbers: as easy as 1, 2, 3", SC11 (Philox; passes BigCrush).
 * Blackman & Vigna 2021, "Scrambled linear pseudorandom number generators", ACM TOMS 47:36 (xoshiro128** 1.1).
 */
import { EXPONENTIAL_TAIL, exponentialHeights, exponentialWidths } from './exponential-layers';
import { exp, ln } from './elementary';

const MULTIPLIER_0 = 0xd2511f53;
const MULTIPLIER_1 = 0xcd9e8d57;
const WEYL_0 = 0x9e3779b9;
const WEYL_1 = 0xbb67ae85;
const TWO_32 = 4_294_967_296;
const PER_TWO_32 = 1 / TWO_32;
const WIDTHS = exponentialWidths();
const HEIGHTS = exponentialHeights(WIDTHS);

/** High 32 bits of the 64-bit product of two unsigned 32-bit numbers. */
function multiplyHigh(a: number, b: number): number {
  const aLow = a & 0xffff;
  const aHigh = a >>> 16;
  const bLow = b & 0xffff;
  const bHigh = b >>> 16;
  const middle = aHigh * bLow + ((aLow * bLow) >>> 16);
  const carry = aLow * bHigh + (middle & 0xffff);
  return (aHigh * bHigh + Math.floor(middle / 65536) + Math.floor(carry / 65536)) >>> 0;
}

/**
 * Philox4x32-10: 128 bits from a 128-bit counter and a 64-bit key.
 *
 * @param counter,key words of 32 bits, the least significant first
 * @param out receives the four words, unsigned
 */
export function philox4x32(
  counter: readonly [number, number, number, number],
  key: readonly [number, number],
  out: Uint32Array,
): void {
  let c0 = counter[0] >>> 0;
  let c1 = counter[1] >>> 0;
  let c2 = counter[2] >>> 0;
  let c3 = counter[3] >>> 0;
  let k0 = key[0] >>> 0;
  let k1 = key[1] >>> 0;
  for (let round = 0; round < 10; round += 1) {
    const high0 = multiplyHigh(MULTIPLIER_0, c0);
    const high1 = multiplyHigh(MULTIPLIER_1, c2);
    const low0 = Math.imul(MULTIPLIER_0, c0) >>> 0;
    const low1 = Math.imul(MULTIPLIER_1, c2) >>> 0;
    c0 = (high1 ^ c1 ^ k0) >>> 0;
    c1 = low1;
    c2 = (high0 ^ c3 ^ k1) >>> 0;
    c3 = low0;
    k0 = (k0 + WEYL_0) >>> 0;
    k1 = (k1 + WEYL_1) >>> 0;
  }
  out[0] = c0;
  out[1] = c1;
  out[2] = c2;
  out[3] = c3;
}

/** What a sequence of a draw is for. A new purpose takes a new number, so that the others' chance stays as it was. */
export const PURPOSE = {
  enrolmentParameters: 0,
  siteRates: 1,
  activations: 2,
  arrivals: 3,
  arrivalSites: 4,
  eventsOfSubjectsAtRisk: 5,
  dropoutOfSubjectsAtRisk: 6,
  eventsOfNewSubjects: 7,
  dropoutOfNewSubjects: 8,
  cureOfSubjectsAtRisk: 9,
  cureOfNewSubjects: 10,
  eventParameters: 11,
} as const;
export type Purpose = (typeof PURPOSE)[keyof typeof PURPOSE];

export interface Generator {
  /** Goes to the start of one purpose's sequence of one draw. */
  startAt(stream: number, draw: number, purpose: Purpose): void;
  /** Puts the four words of the state in place; not all may be 0. */
  setState(words: ArrayLike<number>): void;
  /** The next 32 bits, unsigned. */
  nextWord(): number;
  /** Uniform on (0, 1), the ends excluded, in steps of 2^-32. */
  uniform(): number;
  /** Exponential with mean 1, by the ziggurat of Marsaglia & Tsang 2000, J Stat Softw 5(8). */
  exponential(): number;
  /** Fills the first `count` places with uniforms on (0, 1). */
  fillUniform(out: Float64Array, count: number): void;
  /** Fills the first `count` places with exponentials of mean 1. */
  fillExponential(out: Float64Array, count: number): void;
}

/**
 * A generator of one seed.
 *
 * @param seed whole number from 0 to 2^53 - 1
 * @throws RangeError where the seed is no such number
 */
export function createGenerator(seed: number): Generator {
  if (!Number.isSafeInteger(seed) || seed < 0) throw new RangeError('The seed is a whole number from 0 to 2^53 - 1.');
  const key: [number, number] = [seed % TWO_32, Math.floor(seed / TWO_32)];
  const counter: [number, number, number, number] = [0, 0, 0, 0];
  const words = new Uint32Array(4);
  const state = new Int32Array(4);

  function setState(from: ArrayLike<number>): void {
    for (let place = 0; place < 4; place += 1) state[place] = from[place] as number;
    // The one state from which the generator never moves; Philox gives it once in 2^128 counters.
    if (state[0] === 0 && state[1] === 0 && state[2] === 0 && state[3] === 0) state[0] = 1;
  }

  function nextWord(): number {
    const s0 = state[0] as number;
    const s1 = state[1] as number;
    let result = Math.imul(s1, 5);
    result = Math.imul((result << 7) | (result >>> 25), 9);
    const s2 = (state[2] as number) ^ s0;
    const s3 = (state[3] as number) ^ s1;
    state[1] = s1 ^ s2;
    state[0] = s0 ^ s3;
    state[2] = s2 ^ (s1 << 9);
    state[3] = (s3 << 11) | (s3 >>> 21);
    return result >>> 0;
  }

  function uniform(): number {
    return (nextWord() + 0.5) * PER_TWO_32;
  }

  /** The slow way of a layer: its wedge, or beyond the lowest one the tail, which is exponential again. */
  function outsideRectangle(layer: number, x: number): number {
    if (layer === 0) return EXPONENTIAL_TAIL - ln(uniform());
    const low = HEIGHTS[layer] as number;
    const high = HEIGHTS[layer + 1] as number;
    return low + (high - low) * uniform() < exp(-x) ? x : exponential();
  }

  function exponential(): number {
    const layer = nextWord() >>> 24;
    const x = uniform() * (WIDTHS[layer] as number);
    return x < (WIDTHS[layer + 1] as number) ? x : outsideRectangle(layer, x);
  }

  return {
    startAt(stream, draw, purpose) {
      counter[0] = draw;
      counter[1] = stream;
      counter[2] = purpose;
      philox4x32(counter, key, words);
      setState(words);
    },
    setState,
    nextWord,
    uniform,
    exponential,
    fillUniform(out, count) {
      for (let place = 0; place < count; place += 1) out[place] = uniform();
    },
    fillExponential(out, count) {
      for (let place = 0; place < count; place += 1) out[place] = exponential();
    },
  };
}
