import { exp, ln, LN2 } from './elementary';

/**
 * Median of the pooled time to event of a trial planned with two exponential arms: the t that solves
 *
 *     (S_control(t) + r · S_experimental(t)) / (1 + r) = 1/2,
 *     S_control(t) = exp(−h t),  S_experimental(t) = exp(−HR · h t),  h = ln 2 / control median
 *
 * by bisection on ln t between the medians of the two arms. It is the median of the MIXTURE, not a mean of the medians.
 *
 * @param controlMedianMonths planned median of the control arm, months, above 0
 * @param hazardRatio experimental over control, above 0
 * @param allocationRatio experimental : control, as in 2 for 2 : 1; above 0
 * @returns months
 * @throws RangeError where one of the three is not a finite number above 0
 */
export function pooledMedianMonths({
  controlMedianMonths,
  hazardRatio,
  allocationRatio,
}: {
  controlMedianMonths: number;
  hazardRatio: number;
  allocationRatio: number;
}): number {
  for (const [name, value] of Object.entries({ controlMedianMonths, hazardRatio, allocationRatio })) {
    if (!(value > 0 && value < Infinity)) throw new RangeError(`${name} is a finite number above 0.`);
  }
  const hazard = LN2 / controlMedianMonths;
  const survivors = (months: number): number =>
    (exp(-hazard * months) + allocationRatio * exp(-hazard * hazardRatio * months)) / (1 + allocationRatio);
  const experimental = controlMedianMonths / hazardRatio;
  let low = ln(Math.min(controlMedianMonths, experimental));
  let high = ln(Math.max(controlMedianMonths, experimental));
  for (let step = 0; step < 200 && high - low > 1e-15; step += 1) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) break;
    if (survivors(exp(middle)) > 0.5) low = middle;
    else high = middle;
  }
  return exp((low + high) / 2);
}
