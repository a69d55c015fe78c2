import { exp, ln, LN2, logOnePlus } from './elementary';
import { findMode } from './mode';
import { drawFromGrid, posteriorGrid } from './posterior-grid';
import type { SurvivalData } from './survival-data';
import { medianWithCure, type SurvivalFamily } from './survival-family';

/** Prior standard deviation of ln shape around the planned shape. */
const LN_SHAPE_SD = 0.5;

/**
 * Log likelihood of the Weibull, S(t) = exp(−(t/σ)^κ), in (ln median, ln κ): with (t/σ)^κ = ln 2 · (t/median)^κ,
 *
 *     Σ_events [ln κ + ln ln 2 + κ ln(t/median) − ln t] − ln 2 Σ_all (t/median)^κ
 *
 * and with a cured share π: events gain ln(1 − π), and censored times count ln(π + (1 − π) S(t)).
 * Sums that depend on κ alone are kept for the next call with the same κ.
 *
 * @param data times above 0, in one unit
 */
export function weibullLogLikelihood(
  data: SurvivalData,
  cureFraction: number,
): (lnMedian: number, lnShape: number) => number {
  const lnTimes = data.times.map(ln);
  let sumLnEvent = 0;
  for (let place = 0; place < lnTimes.length; place += 1) {
    sumLnEvent += (data.events[place] as number) * (lnTimes[place] as number);
  }
  const largest = lnTimes.length > 0 ? (lnTimes[lnTimes.length - 1] as number) : 0;
  const lnNotCured = ln(1 - cureFraction);
  let keptShape = NaN;
  let eventPowers = 0;
  let censoredPowers = 0;
  return (lnMedian, lnShape) => {
    const shape = exp(lnShape);
    if (lnShape !== keptShape) {
      // Powers of t over the longest time, so that none leaves the range of numbers.
      eventPowers = 0;
      censoredPowers = 0;
      for (let place = 0; place < lnTimes.length; place += 1) {
        const power = exp(shape * ((lnTimes[place] as number) - largest));
        eventPowers += (data.events[place] as number) * power;
        censoredPowers += (data.censored[place] as number) * power;
      }
      keptShape = lnShape;
    }
    const unit = LN2 * exp(shape * (largest - lnMedian));
    let sum =
      data.eventCount * (lnShape + ln(LN2) - shape * lnMedian + lnNotCured) +
      (shape - 1) * sumLnEvent -
      unit * eventPowers;
    if (cureFraction === 0) return sum - unit * censoredPowers;
    for (let place = 0; place < lnTimes.length; place += 1) {
      const many = data.censored[place] as number;
      if (many === 0) continue;
      const hazard = unit * exp(shape * ((lnTimes[place] as number) - largest));
      sum += many * ln(cureFraction + (1 - cureFraction) * exp(-hazard));
    }
    return sum;
  };
}

/**
 * Weibull: S(t) = exp(−(t/σ)^κ), σ = median / (ln 2)^(1/κ). Parameters of a draw: (ln median, ln κ).
 *
 * Prior: ln median ~ Normal(ln planned median, 1/√d0), flat where d0 = 0; ln κ ~ Normal(ln planned κ, 0.5). Posterior on the
 * two-dimensional grid.
 *
 * @see Ying & Heitjan 2008, Pharm Stat 7:107
 */
export const weibullFamily: SurvivalFamily = {
  name: 'weibull',
  parameterCount: 2,

  fit(data, cureFraction) {
    const maximum = cureFraction > 0 ? maximumWithCure(data, cureFraction) : profileMaximum(data);
    if (!maximum) return null;
    const { lnMedian, shape } = maximum;
    const scale = exp(lnMedian - ln(LN2) / shape);
    const logLikelihood = weibullLogLikelihood(data, cureFraction)(lnMedian, ln(shape));
    return {
      family: 'weibull',
      weight: 1,
      shape,
      scaleMonths: scale,
      medianMonths: medianWithCure(cureFraction, (hazard) => scale * exp(ln(hazard) / shape)),
      logLikelihood,
      aic: 4 - 2 * logLikelihood,
    };
  },

  source(plan, data) {
    const plannedLnMedian = ln(plan.medianMonths);
    const plannedLnShape = ln(plan.shape);
    if (plan.basis === 'plan') {
      return {
        logEvidence: null,
        draw(_generator, out) {
          out[0] = plannedLnMedian;
          out[1] = plannedLnShape;
        },
      };
    }
    if (plan.priorEvents + data.eventCount <= 0) {
      throw new RangeError('Without an event the posterior needs a plan with a weight above 0.');
    }
    const logLikelihood = weibullLogLikelihood(data, plan.cureFraction);
    const precision = plan.priorEvents;
    const constant =
      (precision > 0 ? 0.5 * ln(precision / (2 * Math.PI)) : 0) - ln(LN_SHAPE_SD) - 0.5 * ln(2 * Math.PI);
    const grid = posteriorGrid(
      (lnMedian, lnShape) => {
        const fromMedian = lnMedian - plannedLnMedian;
        const fromShape = (lnShape - plannedLnShape) / LN_SHAPE_SD;
        const squares = precision * fromMedian * fromMedian + fromShape * fromShape;
        return logLikelihood(lnMedian, lnShape) - 0.5 * squares + constant;
      },
      { x: plannedLnMedian, y: plannedLnShape },
    );
    return { logEvidence: grid.logIntegral, draw: (generator, out) => drawFromGrid(grid, generator, out) };
  },

  invert(parameters, elapsed, lnElapsed, exponentials, count) {
    const lnMedian = parameters[0] as number;
    const shape = exp(parameters[1] as number);
    const perShape = 1 / shape;
    for (let place = 0; place < count; place += 1) {
      const months = elapsed[place] as number;
      // In units of ln 2, where H(t) = (t/median)^κ.
      const added = (exponentials[place] as number) / LN2;
      if (months === 0) {
        exponentials[place] = exp(lnMedian + ln(added) * perShape);
        continue;
      }
      const past = exp(shape * ((lnElapsed[place] as number) - lnMedian));
      // As a multiple of the elapsed time while that is most of the hazard: the result can never fall before it.
      exponentials[place] =
        added < past
          ? months * exp(logOnePlus(added / past) * perShape)
          : Math.max(months, exp(lnMedian + ln(past + added) * perShape));
    }
  },

  survival: (parameters, months) =>
    months <= 0 ? 1 : exp(-LN2 * exp(exp(parameters[1] as number) * (ln(months) - (parameters[0] as number)))),
};

interface WeibullMaximum {
  lnMedian: number;
  shape: number;
}

/**
 * Root of the profile score in the shape, Σ t^κ ln t / Σ t^κ − 1/κ = mean of ln t over the events (its left side rises in κ),
 * by bisection on ln κ; then σ^κ = Σ t^κ / d.
 *
 * @returns null without events, or where every event falls on the longest time (the likelihood then rises for ever in κ)
 */
function profileMaximum(data: SurvivalData): WeibullMaximum | null {
  if (data.eventCount === 0 || data.times.length === 0) return null;
  const last = data.times.length - 1;
  if (data.eventCount === data.events[last]) return null;
  const lnTimes = data.times.map(ln);
  const largest = lnTimes[last] as number;
  let meanLnEvent = 0;
  for (let place = 0; place <= last; place += 1) {
    meanLnEvent += ((data.events[place] as number) * ((lnTimes[place] as number) - largest)) / data.eventCount;
  }
  const sums = (shape: number): { powers: number; weighted: number } => {
    let powers = 0;
    let weighted = 0;
    for (let place = 0; place <= last; place += 1) {
      const below = (lnTimes[place] as number) - largest;
      const power = ((data.events[place] as number) + (data.censored[place] as number)) * exp(shape * below);
      powers += power;
      weighted += power * below;
    }
    return { powers, weighted };
  };
  let low = ln(1e-6);
  let high = ln(1e6);
  for (let step = 0; step < 200 && high - low > 1e-15; step += 1) {
    const middle = (low + high) / 2;
    const shape = exp(middle);
    const { powers, weighted } = sums(shape);
    if (weighted / powers - 1 / shape < meanLnEvent) low = middle;
    else high = middle;
  }
  const shape = exp((low + high) / 2);
  const lnScale = largest + ln(sums(shape).powers / data.eventCount) / shape;
  return { lnMedian: lnScale + ln(LN2) / shape, shape };
}

function maximumWithCure(data: SurvivalData, cureFraction: number): WeibullMaximum | null {
  const start = profileMaximum(data);
  if (!start) return null;
  const mode = findMode(weibullLogLikelihood(data, cureFraction), { x: start.lnMedian, y: ln(start.shape) });
  return { lnMedian: mode.x, shape: exp(mode.y) };
}
