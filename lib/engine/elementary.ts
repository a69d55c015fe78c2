/**
 * Natural logarithm and exponential by additions, multiplications and divisions alone, so that every machine and every
 * browser finds the same last bit: the language leaves the accuracy of `Math.log` and `Math.exp` to the implementer, and
 * a forecast must not depend on who runs it. They are written out, and not imported, because these are the engine's
 * hottest loops.
 *
 * Method: FDLIBM 5.3 `e_log.c` and `e_exp.c` (Sun Microsystems 1993: "Permission to use, copy, modify, and distribute
 * this software is freely granted, provided that this notice is preserved"). Error below 1 ulp.
 */

const DOUBLE = new Float64Array(1);
const WORDS = new Int32Array(DOUBLE.buffer);
DOUBLE[0] = 1;
/** Place of the word with sign and exponent: 1 on little-endian machines. */
const HIGH = WORDS[1] === 0x3ff00000 ? 1 : 0;

export const LN2 = Math.LN2;
const LN2_HIGH = 6.9314718036912381649e-1;
const LN2_LOW = 1.90821492927058770002e-10;
/** 2^k at place k + 1022. */
const POWERS_OF_TWO = Float64Array.from({ length: 2046 }, (_, place) => {
  DOUBLE[0] = 1;
  WORDS[HIGH] = (place + 1) << 20;
  return DOUBLE[0];
});
const TWO_54 = 18_014_398_509_481_984;

/**
 * Natural logarithm, ln x.
 *
 * @param x any number; 0 gives -Infinity, a negative number or NaN gives NaN
 */
export function ln(x: number): number {
  if (!(x > 0)) return x === 0 ? -Infinity : NaN;
  if (x === Infinity) return Infinity;
  DOUBLE[0] = x;
  const high = WORDS[HIGH] as number;
  // The ends of the range are moved inside it first.
  if (high < 0x00100000) return ln(x * TWO_54) - 54 * LN2;
  if (high >= 0x7fd00000) return ln(x * 0.25) + 2 * LN2;
  // x = 2^exponent (1 + f) with 1 + f between sqrt(1/2) and sqrt(2).
  const upper = ((high & 0x000fffff) + 0x95f64) & 0x100000;
  const exponent = (high >> 20) + (upper >> 20) - 1023;
  const f = x * (POWERS_OF_TWO[1022 - exponent] as number) - 1;
  const s = f / (2 + f);
  const z = s * s;
  const w = z * z;
  const even = w * (3.999999999940941908e-1 + w * (2.222219843214978396e-1 + w * 1.531383769920937332e-1));
  const odd =
    z *
    (6.66666666666673513e-1 +
      w * (2.857142874366239149e-1 + w * (1.818357216161805012e-1 + w * 1.479819860511658591e-1)));
  const halfSquare = 0.5 * f * f;
  return exponent * LN2_HIGH - (halfSquare - (s * (halfSquare + odd + even) + exponent * LN2_LOW) - f);
}

/**
 * Exponential, e^x.
 *
 * @param x any number; above 709.78 gives Infinity, below -745.13 gives 0
 */
export function exp(x: number): number {
  if (x > 709.782712893383973096) return Infinity;
  if (x < -745.13321910194110842) return 0;
  if (x !== x) return NaN;
  const power = Math.floor(x * 1.442695040888963387 + 0.5);
  const high = x - power * LN2_HIGH;
  const low = power * LN2_LOW;
  const r = high - low;
  const t = r * r;
  const c =
    r -
    t *
      (1.66666666666666019037e-1 +
        t *
          (-2.77777777770155933842e-3 +
            t * (6.61375632143793436117e-5 + t * (-1.6533902205465251539e-6 + t * 4.13813679705723846039e-8))));
  const y = 1 - (low - (r * c) / (2 - c) - high);
  if (power > -1022 && power < 1023) return y * (POWERS_OF_TWO[power + 1022] as number);
  // At both ends of the range in two steps, so that neither factor leaves it.
  const half = power >> 1;
  return y * (POWERS_OF_TWO[half + 1022] as number) * (POWERS_OF_TWO[power - half + 1022] as number);
}

/**
 * ln(1 + x), exact to the last bits for small x too (W. Kahan's correction of the rounding in 1 + x).
 *
 * @param x at least 0
 */
export function logOnePlus(x: number): number {
  const rounded = 1 + x;
  if (rounded === 1 || rounded === Infinity) return rounded === 1 ? x : Infinity;
  return (ln(rounded) * x) / (rounded - 1);
}
