import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { exp, ln, logOnePlus } from '@/lib/engine/elementary';

/** One unit in the last place, relative. */
const ULP = 2.3e-16;

describe('ln and exp without the machine’s own', () => {
  it('ln agrees with the standard one up to the last bit', () => {
    fc.assert(
      fc.property(fc.double({ min: 5e-324, noNaN: true, noDefaultInfinity: true }), (x) => {
        const standard = Math.log(x);
        expect(Math.abs(ln(x) - standard)).toBeLessThanOrEqual(ULP * Math.abs(standard));
      }),
      { seed: 1, numRuns: 5000 },
    );
  });

  it('ln keeps its digits near 1', () => {
    for (const x of [1e-3, 1e-8, 1e-15]) expect(Math.abs(ln(1 + x) / Math.log(1 + x) - 1)).toBeLessThan(ULP);
  });

  it('exp agrees with the standard one up to the last bit', () => {
    fc.assert(
      fc.property(fc.double({ min: -708, max: 709, noNaN: true }), (x) => {
        expect(Math.abs(exp(x) / Math.exp(x) - 1)).toBeLessThanOrEqual(ULP);
      }),
      { seed: 1, numRuns: 5000 },
    );
  });

  it('ends of the range', () => {
    expect(ln(0)).toBe(-Infinity);
    expect(ln(-1)).toBeNaN();
    expect(ln(NaN)).toBeNaN();
    expect(ln(Infinity)).toBe(Infinity);
    expect(ln(5e-324)).toBeCloseTo(Math.log(5e-324), 12);
    expect(exp(-Infinity)).toBe(0);
    expect(exp(-740)).toBe(Math.exp(-740));
    expect(exp(710)).toBe(Infinity);
    expect(exp(0)).toBe(1);
    expect(exp(NaN)).toBeNaN();
    expect(exp(-745.2)).toBe(0);
  });

  it('ln(1 + x) keeps its digits where 1 + x loses them', () => {
    for (const x of [0, 1e-300, 1e-17, 1e-9, 0.3, 7, 1e300]) {
      expect(Math.abs(logOnePlus(x) - Math.log1p(x))).toBeLessThanOrEqual(2 * ULP * Math.log1p(x));
    }
    expect(logOnePlus(Infinity)).toBe(Infinity);
  });
});
