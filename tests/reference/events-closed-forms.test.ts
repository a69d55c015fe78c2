import { describe, expect, it } from 'vitest';
import { DAYS_PER_MONTH } from '@/lib/engine/calendar';
import { createEventCounter } from '@/lib/engine/event-counter';
import type { EventsModel } from '@/lib/engine/events-model';
import { createEventsSimulator } from '@/lib/engine/events-simulate';
import { exponentialFamily } from '@/lib/engine/family-exponential';
import { weibullFamily } from '@/lib/engine/family-weibull';
import { createGenerator, PURPOSE } from '@/lib/engine/generator';
import { totals } from '@/lib/engine/survival-data';
import type { EventPlan, SurvivalFamily } from '@/lib/engine/survival-family';
import { checkValue, checkValues } from './check-values';
import { mean, shareTolerance, shareUpTo, variance } from './closed-forms';

function eventPlan(change: Partial<EventPlan>): EventPlan {
  return { medianMonths: 12, shape: 1, cureFraction: 0, basis: 'plan', priorEvents: 0, cutsMonths: [], ...change };
}

function modelOf(
  family: SurvivalFamily,
  plan: EventPlan,
  elapsed: readonly number[],
  change: Partial<EventsModel> = {},
): EventsModel {
  const data = totals(0, 0);
  return {
    family,
    source: family.source(plan, data),
    data,
    dropout: { known: 0, shape: NaN, rate: NaN },
    cureFraction: plan.cureFraction,
    followUpMonths: Infinity,
    atRisk: {
      elapsed: Float64Array.from(elapsed),
      randomised: Float64Array.from(elapsed, (months) => -months * DAYS_PER_MONTH),
    },
    observedEvents: new Float64Array(0),
    observed: { events: 0, withdrawn: 0, atRisk: elapsed.length },
    longestFollowUp: null,
    ...change,
  };
}

/** Simulated events of each draw, months after the cut-off. */
function simulateEvents(model: EventsModel, draws: number, horizonMonths: number): Float64Array[] {
  const generator = createGenerator(3);
  const simulator = createEventsSimulator(model, generator, {
    newSubjects: 0,
    horizon: horizonMonths * DAYS_PER_MONTH,
  });
  return Array.from({ length: draws }, (_, draw) => {
    const count = simulator.run(0, draw, new Float64Array(0), 0);
    return simulator.moments.slice(0, count).map((moment) => moment / DAYS_PER_MONTH);
  });
}

type Weibull = { family: string; parameters: { shape: number; scale: number; rate: number }; t: number; s: number };

describe('residual life of a subject at risk', () => {
  const DRAWS = 40_000;
  const cases = checkValues<Weibull, { prob: number; quantiles: number[]; mean_residual: number }>(
    'C-residual-',
  ).filter(({ inputs }) => inputs.family !== undefined);

  it.each(cases)('$id: inversion gives the residual quantiles ($source)', ({ inputs, expected }) => {
    const { family, parameters } = familyOf(inputs);
    [0.1, 0.5, 0.9].forEach((p, place) => {
      const months = Float64Array.of(-Math.log1p(-p));
      family.invert(parameters, Float64Array.of(inputs.t), Float64Array.of(Math.log(inputs.t)), months, 1);
      const residual = (months[0] as number) - inputs.t;
      expect(Math.abs(residual / (expected.quantiles[place] as number) - 1)).toBeLessThan(1e-9);
    });
  });

  it.each(cases)('$id: simulated events in the next months ($source)', ({ inputs, expected }) => {
    const { family, plan } = familyOf(inputs);
    const counts = simulateEvents(modelOf(family, plan, [inputs.t]), DRAWS, inputs.s).map(({ length }) => length);
    expect(Math.abs(mean(counts) - expected.prob)).toBeLessThan(shareTolerance(expected.prob, DRAWS));
  });

  it('control: a Weibull subject that is treated as new at the cut-off fails the check above', () => {
    const wrong = cases
      .filter(({ inputs }) => inputs.family === 'weibull')
      .map(({ inputs, expected }) => {
        const { family, plan } = familyOf(inputs);
        const counts = simulateEvents(modelOf(family, plan, [0]), 4000, inputs.s).map(({ length }) => length);
        return Math.abs(mean(counts) - expected.prob) > shareTolerance(expected.prob, 4000);
      });
    expect(wrong.length).toBeGreaterThan(1);
    expect(wrong).not.toContain(false);
  });

  it('with a cured share: the chance of being cured rises with the time event-free (R)', () => {
    const { inputs, expected } = checkValue<
      { pi: number; shape: number; scale: number; t: number; s: number },
      { prob: number; prob_ever: number }
    >('C-residual-cure');
    const median = inputs.scale * Math.LN2 ** (1 / inputs.shape);
    const plan = eventPlan({ medianMonths: median, shape: inputs.shape, cureFraction: inputs.pi });
    const model = modelOf(weibullFamily, plan, [inputs.t]);
    const soon = simulateEvents(model, DRAWS, inputs.s).map(({ length }) => length);
    const ever = simulateEvents(model, DRAWS, 1e5).map(({ length }) => length);
    expect(Math.abs(mean(soon) - expected.prob)).toBeLessThan(shareTolerance(expected.prob, DRAWS));
    expect(Math.abs(mean(ever) - expected.prob_ever)).toBeLessThan(shareTolerance(expected.prob_ever, DRAWS));
  });

  function familyOf(inputs: Weibull): { family: SurvivalFamily; plan: EventPlan; parameters: Float64Array } {
    const { shape, scale, rate } = inputs.parameters;
    const exponential = inputs.family === 'exponential';
    const plan = exponential
      ? eventPlan({ medianMonths: Math.LN2 / rate })
      : eventPlan({ medianMonths: scale * Math.LN2 ** (1 / shape), shape });
    return {
      family: exponential ? exponentialFamily : weibullFamily,
      plan,
      parameters: exponential ? Float64Array.of(rate) : Float64Array.of(Math.log(plan.medianMonths), Math.log(shape)),
    };
  }
});

describe('time to the k-th event', () => {
  it('85 at risk, gamma posterior of the hazard, 30 more events (R)', () => {
    const { inputs, expected } = checkValue<
      { r: number; d: number; TT: number; a: number; b: number; k: number; probs: number[] },
      { mean: number; quantiles: number[] }
    >('C-kth-exp-gamma');
    // Prior Gamma(a, b): a events at a hazard of a / b.
    const plan = eventPlan({ basis: 'data', priorEvents: inputs.a, medianMonths: (Math.LN2 * inputs.b) / inputs.a });
    const model = modelOf(exponentialFamily, plan, Array<number>(inputs.r).fill(7), {
      source: exponentialFamily.source(plan, totals(inputs.d, inputs.TT)),
    });
    const draws = 20_000;
    const counter = createEventCounter(new Float64Array(0), {
      earliest: 0,
      latest: 600 * DAYS_PER_MONTH,
      most: inputs.r,
    });
    const times = simulateEvents(model, draws, 600).map((moments) => {
      counter.load(
        moments.map((months) => months * DAYS_PER_MONTH),
        moments.length,
      );
      return counter.momentOf(inputs.k) / DAYS_PER_MONTH;
    });
    expect(Math.abs(mean(times) - expected.mean)).toBeLessThan(4 * Math.sqrt(variance(times) / draws));
    inputs.probs.forEach((p, place) => {
      expect(Math.abs(shareUpTo(times, expected.quantiles[place] as number) - p)).toBeLessThan(
        shareTolerance(p, draws),
      );
    });
  });

  const weibullCase = checkValue<
    {
      elapsed: number[];
      shape: number;
      scale: number;
      dropout_rate: number;
      h: number;
      new_patient_rate: number;
      accrual_continues_for: number;
      need: number;
      probs: number[];
    },
    Record<'expected_existing' | 'variance_existing' | 'expected_total' | 'prob_at_least_need', number> & {
      time_quantiles: number[];
      wrong_if_restarted_at_zero: number;
    }
  >('C-events-poisbin');

  function weibullModel(elapsed: readonly number[]): EventsModel {
    const { inputs } = weibullCase;
    const plan = eventPlan({ medianMonths: inputs.scale * Math.LN2 ** (1 / inputs.shape), shape: inputs.shape });
    return modelOf(weibullFamily, plan, elapsed, { dropout: { known: inputs.dropout_rate, shape: NaN, rate: NaN } });
  }

  it('20 Weibull subjects at risk with competing dropout: mean and variance of the count are Poisson-binomial (R)', () => {
    const { inputs, expected } = weibullCase;
    const draws = 40_000;
    const counts = simulateEvents(weibullModel(inputs.elapsed), draws, inputs.h).map(({ length }) => length);
    expect(Math.abs(mean(counts) - expected.expected_existing)).toBeLessThan(
      4 * Math.sqrt(expected.variance_existing / draws),
    );
    expect(Math.abs(variance(counts) / expected.variance_existing - 1)).toBeLessThan(4 * Math.sqrt(2 / draws));
    // Control: restarted at zero (and without dropout) the mean is the one that the reference gives for that mistake.
    const atZero = { ...weibullModel(inputs.elapsed.map(() => 0)), dropout: { known: 0, shape: NaN, rate: NaN } };
    const restarted = simulateEvents(atZero, draws, inputs.h);
    const wrong = mean(restarted.map(({ length }) => length));
    expect(Math.abs(wrong - expected.wrong_if_restarted_at_zero)).toBeLessThan(0.05);
    expect(Math.abs(wrong - expected.expected_existing)).toBeGreaterThan(2);
  });

  it('with new patients on top: count and time of the 8th event (R)', () => {
    const { inputs, expected } = weibullCase;
    const draws = 40_000;
    const generator = createGenerator(9);
    const chance = createGenerator(10);
    const most = 60;
    const simulator = createEventsSimulator(weibullModel(inputs.elapsed), generator, {
      newSubjects: most,
      horizon: 60 * DAYS_PER_MONTH,
    });
    const counter = createEventCounter(new Float64Array(0), {
      earliest: 0,
      latest: 60 * DAYS_PER_MONTH,
      most: most + inputs.elapsed.length,
    });
    const arrivals = new Float64Array(most);
    const counts: number[] = [];
    const times: number[] = [];
    for (let draw = 0; draw < draws; draw += 1) {
      chance.startAt(0, draw, PURPOSE.arrivals);
      let count = 0;
      for (let month = 0; ;) {
        month += chance.exponential() / inputs.new_patient_rate;
        if (month > inputs.accrual_continues_for) break;
        arrivals[count++] = month * DAYS_PER_MONTH;
      }
      const events = simulator.run(0, draw, arrivals, count);
      counter.load(simulator.moments, events);
      times.push(counter.momentOf(inputs.need) / DAYS_PER_MONTH);
      counts.push(simulator.moments.subarray(0, events).filter((moment) => moment <= inputs.h * DAYS_PER_MONTH).length);
    }
    expect(Math.abs(mean(counts) - expected.expected_total)).toBeLessThan(4 * Math.sqrt(variance(counts) / draws));
    const reached = expected.prob_at_least_need;
    expect(Math.abs(1 - shareUpTo(counts, inputs.need - 1) - reached)).toBeLessThan(shareTolerance(reached, draws));
    inputs.probs.forEach((p, place) => {
      expect(Math.abs(shareUpTo(times, expected.time_quantiles[place] as number) - p)).toBeLessThan(
        shareTolerance(p, draws),
      );
    });
  });
});
