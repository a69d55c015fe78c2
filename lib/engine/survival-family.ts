import { ln } from './elementary';
import type { Generator } from './generator';
import type { SurvivalData } from './survival-data';
import type { Basis, EventsFit, EventsPart, Family } from './types';

/** The plan of the time to event, times in months. */
export interface EventPlan {
  medianMonths: number;
  /** Planned shape where the family has one. */
  shape: number;
  /** Share of subjects who never have an event. */
  cureFraction: number;
  basis: Basis;
  /** Weight of the planned median, as a number of events. */
  priorEvents: number;
  cutsMonths: readonly number[];
}

export function planOf({ model }: EventsPart): EventPlan {
  return {
    medianMonths: model.medianMonths,
    shape: model.shape ?? 1,
    cureFraction: model.cureFraction ?? 0,
    basis: model.basis,
    priorEvents: model.priorEvents,
    cutsMonths: model.cutsMonths ?? [],
  };
}

/** Where each draw's parameters come from. */
export interface ParameterSource {
  /** Writes one draw's parameters into the first places of `out`, in the family's own order. */
  draw(generator: Generator, out: Float64Array): void;
  /** Log marginal likelihood of the data under likelihood times prior; null: basis "plan". */
  logEvidence: number | null;
}

/**
 * One family of distributions of the time from randomisation to the event of those who are not cured. All numbers in months.
 * A new family is a file with this shape, and its name in `families.ts`.
 */
export interface SurvivalFamily {
  name: Exclude<Family, 'average'>;
  /** Places that a draw's parameters take. */
  parameterCount: number;
  /** Maximum likelihood without prior; null where the data have no finite maximum or no subject. */
  fit(data: SurvivalData, cureFraction: number): EventsFit | null;
  /** Posterior given plan and data, or the plan itself under basis "plan". */
  source(plan: EventPlan, data: SurvivalData): ParameterSource;
  /**
   * Times to event given that none came by `elapsed`, by inversion of the cumulative hazard H: the time t with
   * H(t) = H(elapsed) + e, e exponential with mean 1. In H nothing is lost where S itself is tiny.
   *
   * @param elapsed months already event-free, 0 for a new subject; first `count` places
   * @param lnElapsed their logarithms, which the families would otherwise take in each draw
   * @param exponentials in its first `count` places the e; overwritten with the times t, each at least `elapsed`
   */
  invert(
    parameters: Float64Array,
    elapsed: Float64Array,
    lnElapsed: Float64Array,
    exponentials: Float64Array,
    count: number,
  ): void;
  /** S(t) of those who are not cured. */
  survival(parameters: Float64Array, months: number): number;
}

/**
 * Median of S = π + (1 − π) S₀ from the quantile function of S₀; null where half are cured or more.
 *
 * @param timeAtHazard inverse of the cumulative hazard of S₀
 */
export function medianWithCure(cureFraction: number, timeAtHazard: (hazard: number) => number): number | null {
  if (cureFraction >= 0.5) return null;
  return timeAtHazard(-ln((0.5 - cureFraction) / (1 - cureFraction)));
}
