import { exp, ln, LN2 } from './elementary';
import { createGammaVariate } from './gamma-variate';
import gammaln from '@stdlib/math-base-special-gammaln';
import type { Generator } from './generator';
import type { SurvivalFamily } from './survival-family';

/**
 * Exponential: S(t) = exp(−h t), h per month.
 *
 * Posterior, conjugate: h ~ Gamma(d0 + d, d0 / h_planned + T), d events in T person-months, h_planned = ln 2 / planned
 * median, d0 the weight of the plan in events. Needs the totals d and T only.
 *
 * @see Bagiella & Heitjan 2001, Stat Med 20:2055
 */
export const exponentialFamily: SurvivalFamily = {
  name: 'exponential',
  parameterCount: 1,

  fit({ eventCount, exposure }) {
    if (!(exposure > 0)) return null;
    const rate = eventCount / exposure;
    const logLikelihood = eventCount > 0 ? eventCount * ln(rate) - eventCount : 0;
    return {
      family: 'exponential',
      weight: 1,
      ratePerMonth: rate,
      medianMonths: rate > 0 ? LN2 / rate : null,
      logLikelihood,
      aic: 2 - 2 * logLikelihood,
    };
  },

  source(plan, { eventCount, exposure }) {
    const planned = LN2 / plan.medianMonths;
    if (plan.basis === 'plan') {
      return {
        logEvidence: null,
        draw(_generator, out) {
          out[0] = planned;
        },
      };
    }
    const priorShape = plan.priorEvents;
    const priorRate = plan.priorEvents / planned;
    const shape = priorShape + eventCount;
    const rate = priorRate + exposure;
    if (!(shape > 0)) throw new RangeError('Without an event the posterior needs a plan with a weight above 0.');
    const prior = priorShape > 0 ? priorShape * ln(priorRate) - gammaln(priorShape) : 0;
    let owner: Generator | null = null;
    let gamma: (shape: number, rate: number) => number = () => NaN;
    return {
      logEvidence: prior + gammaln(shape) - shape * ln(rate),
      draw(generator, out) {
        if (generator !== owner) {
          gamma = createGammaVariate(generator);
          owner = generator;
        }
        out[0] = gamma(shape, rate);
      },
    };
  },

  invert(parameters, elapsed, _lnElapsed, exponentials, count) {
    const mean = 1 / (parameters[0] as number);
    for (let place = 0; place < count; place += 1) {
      exponentials[place] = (elapsed[place] as number) + (exponentials[place] as number) * mean;
    }
  },

  survival: (parameters, months) => exp(-(parameters[0] as number) * months),
};
