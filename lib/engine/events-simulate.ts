import { DAYS_PER_MONTH } from './calendar';
import type { EventsModel } from './events-model';
import { ln } from './elementary';
import { createGammaVariate } from './gamma-variate';
import { type Generator, PURPOSE, type Purpose } from './generator';

/** Simulates the events draw by draw, in memory of its own that is used again. */
export interface EventsSimulator {
  /** Moments of the simulated events of the last draw, in no order; the first `count` places. */
  moments: Float64Array;
  /** Runs one draw, given the moments of the simulated randomisations, and returns how many events come before the horizon. */
  run(stream: number, draw: number, arrivals: Float64Array, arrivalCount: number): number;
}

interface SubjectPurposes {
  events: Purpose;
  dropout: Purpose;
  cure: Purpose;
}

const AT_RISK: SubjectPurposes = {
  events: PURPOSE.eventsOfSubjectsAtRisk,
  dropout: PURPOSE.dropoutOfSubjectsAtRisk,
  cure: PURPOSE.cureOfSubjectsAtRisk,
};
const NEW: SubjectPurposes = {
  events: PURPOSE.eventsOfNewSubjects,
  dropout: PURPOSE.dropoutOfNewSubjects,
  cure: PURPOSE.cureOfNewSubjects,
};

/**
 * Each subject at risk gets a time to event given survival to its last known event-free day; each new subject one from its own
 * randomisation. Dropout competes with a constant hazard: an event counts only if it comes before it, and before the end of a
 * fixed follow-up. A cured subject has none; the chance of being cured rises with the time already event-free,
 * π / (π + (1 − π) S₀(t)).
 */
export function createEventsSimulator(
  model: EventsModel,
  generator: Generator,
  limits: { newSubjects: number; horizon: number },
): EventsSimulator {
  const { family, atRisk, cureFraction, followUpMonths, dropout } = model;
  const present = atRisk.elapsed.length;
  const size = Math.max(present, limits.newSubjects);
  const moments = new Float64Array(present + limits.newSubjects);
  const months = new Float64Array(size);
  const lost = new Float64Array(size);
  const uniforms = new Float64Array(cureFraction > 0 ? size : 0);
  const lnElapsed = atRisk.elapsed.map(ln);
  const none = new Float64Array(limits.newSubjects);
  const lnNone = none.map(ln);
  const parameters = new Float64Array(family.parameterCount);
  const gamma = createGammaVariate(generator);
  let count = 0;

  function addEvents(
    stream: number,
    draw: number,
    purposes: SubjectPurposes,
    randomised: Float64Array,
    elapsed: Float64Array,
    lnElapsed: Float64Array,
    many: number,
    hazardOfLoss: number,
  ): void {
    if (many === 0) return;
    generator.startAt(stream, draw, purposes.events);
    generator.fillExponential(months, many);
    family.invert(parameters, elapsed, lnElapsed, months, many);
    if (hazardOfLoss > 0) {
      generator.startAt(stream, draw, purposes.dropout);
      generator.fillExponential(lost, many);
    }
    if (cureFraction > 0) {
      generator.startAt(stream, draw, purposes.cure);
      generator.fillUniform(uniforms, many);
    }
    for (let subject = 0; subject < many; subject += 1) {
      const month = months[subject] as number;
      if (month > followUpMonths) continue;
      const already = elapsed[subject] as number;
      if (hazardOfLoss > 0 && (lost[subject] as number) < (month - already) * hazardOfLoss) continue;
      if (cureFraction > 0) {
        const ill = (1 - cureFraction) * family.survival(parameters, already);
        if ((uniforms[subject] as number) * (cureFraction + ill) < cureFraction) continue;
      }
      const moment = (randomised[subject] as number) + month * DAYS_PER_MONTH;
      if (moment > limits.horizon) continue;
      moments[count] = moment;
      count += 1;
    }
  }

  return {
    moments,
    run(stream, draw, arrivals, arrivalCount) {
      count = 0;
      generator.startAt(stream, draw, PURPOSE.eventParameters);
      model.source.draw(generator, parameters);
      const hazardOfLoss = dropout.known ?? gamma(dropout.shape, dropout.rate);
      addEvents(stream, draw, AT_RISK, atRisk.randomised, atRisk.elapsed, lnElapsed, present, hazardOfLoss);
      addEvents(stream, draw, NEW, arrivals, none, lnNone, arrivalCount, hazardOfLoss);
      return count;
    },
  };
}
