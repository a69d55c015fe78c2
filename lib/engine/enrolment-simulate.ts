import { activationMoment, OVERDUE_MEAN_DELAY_DAYS } from './activation';
import { DAYS_PER_MONTH } from './calendar';
import { exp, ln } from './elementary';
import type { EnrolmentModel } from './enrolment-model';
import { type EnrolmentSchedule, SWITCH } from './enrolment-schedule';
import { createGammaVariate } from './gamma-variate';
import { type Generator, PURPOSE } from './generator';
import { createMomentQueue, popMoment, pushMoment } from './moment-queue';
import { drawFromGrid } from './posterior-grid';
import { choosePlace, createRateTree, setRate } from './rate-tree';

/** Simulates enrolment draw by draw, in memory of its own that is used again. */
export interface EnrolmentSimulator {
  /** Moments of the simulated randomisations of the last draw, in the order of time; the first `count` places. */
  arrivals: Float64Array;
  /** Runs one draw and returns how many patients come before the horizon (at most up to the target). */
  run(stream: number, draw: number): number;
}

/**
 * Arrivals by superposition: between switches (activations, closures, ends of ramp-up, caps) and month changes the total
 * rate is constant, so each patient takes one exponential with mean 1, which is used up at the total rate; the site is then
 * drawn in proportion to the rates where a cap makes it matter.
 */
export function createEnrolmentSimulator(
  model: EnrolmentModel,
  schedule: EnrolmentSchedule,
  generator: Generator,
): EnrolmentSimulator {
  const sites = schedule.counts.length;
  const gamma = createGammaVariate(generator);
  const arrivals = new Float64Array(schedule.remaining);
  const exponentials = new Float64Array(schedule.remaining + 1);
  const rates = new Float64Array(sites);
  const room = new Float64Array(sites);
  const isOn = new Uint8Array(sites);
  const isSlow = new Uint8Array(sites);
  const tree = createRateTree(sites);
  const queue = createMomentQueue(2 * schedule.planned.length);
  const parameters = new Float64Array(2);
  const { switchAt, switchSite, switchKind, seasonAt, seasonMultiplier, planned, windows, rampFraction } = schedule;

  function drawRates(stream: number, draw: number): void {
    let mean = model.planned.meanPerMonth;
    let shape = model.planned.shape;
    if (model.grid) {
      generator.startAt(stream, draw, PURPOSE.enrolmentParameters);
      drawFromGrid(model.grid, generator, parameters);
      mean = exp(parameters[0] as number);
      shape = exp(parameters[1] as number);
    }
    generator.startAt(stream, draw, PURPOSE.siteRates);
    for (let site = 0; site < sites; site += 1) {
      const rate = shape / (mean * (schedule.ratios[site] as number)) + (schedule.exposures[site] as number);
      rates[site] = gamma(shape + (schedule.counts[site] as number), rate) / DAYS_PER_MONTH;
    }
  }

  function drawActivations(stream: number, draw: number): void {
    queue.size = 0;
    if (planned.length === 0) return;
    generator.startAt(stream, draw, PURPOSE.activations);
    for (let place = 0; place < planned.length; place += 1) {
      const uniform = generator.uniform();
      const window = windows[place];
      const moment = window ? activationMoment(window, uniform) : -OVERDUE_MEAN_DELAY_DAYS * ln(uniform);
      pushMoment(queue, moment, 2 * (planned[place] as number));
    }
  }

  function showRate(site: number): void {
    const rate = isOn[site] === 1 && (room[site] as number) > 0 ? (rates[site] as number) : 0;
    setRate(tree, site, isSlow[site] === 1 ? rate * rampFraction : rate);
  }

  /** The earliest moment of the queue happens: an activation, or the end of a ramp-up that followed one. */
  function takeFromQueue(): void {
    const moment = queue.moments[0] as number;
    const entry = popMoment(queue);
    const site = entry >> 1;
    if (entry % 2 === 1) {
      isSlow[site] = 0;
    } else if (moment < (schedule.closes[site] as number)) {
      isOn[site] = 1;
      if (schedule.rampDays > 0) pushMoment(queue, moment + schedule.rampDays, entry + 1);
    }
    showRate(site);
  }

  function takeSwitch(place: number): void {
    const site = switchSite[place] as number;
    const kind = switchKind[place];
    if (kind === SWITCH.fullSpeed) isSlow[site] = 0;
    else isOn[site] = kind === SWITCH.on ? 1 : 0;
    showRate(site);
  }

  /** A patient comes to a site; true where that fills it. */
  function takeRoom(site: number): boolean {
    const left = (room[site] as number) - 1;
    room[site] = left;
    if (left > 0) return false;
    setRate(tree, site, 0);
    return true;
  }

  function arrive(stream: number, draw: number): number {
    if (schedule.anyCap) generator.startAt(stream, draw, PURPOSE.arrivalSites);
    let moment = schedule.start;
    let count = 0;
    let nextSwitch = 0;
    let month = 0;
    let need = exponentials[0] as number;
    for (;;) {
      const switchMoment = nextSwitch < switchAt.length ? (switchAt[nextSwitch] as number) : Infinity;
      const queueMoment = queue.size > 0 ? (queue.moments[0] as number) : Infinity;
      const seasonMoment = month + 1 < seasonAt.length ? (seasonAt[month + 1] as number) : Infinity;
      const until = Math.min(switchMoment, queueMoment, seasonMoment, schedule.horizon);
      const season = seasonMultiplier[month] as number;
      let rate = (tree.sums[1] as number) * season;
      while (moment + need / rate < until) {
        moment += need / rate;
        arrivals[count] = moment;
        count += 1;
        if (count === schedule.remaining) return count;
        need = exponentials[count] as number;
        if (schedule.anyCap && takeRoom(choosePlace(tree, generator.uniform()))) {
          rate = (tree.sums[1] as number) * season;
        }
      }
      // What is left of the exponential is spent at the rates that follow.
      need = Math.max(0, need - rate * (until - moment));
      moment = until;
      if (until === schedule.horizon) return count;
      if (until === switchMoment) takeSwitch(nextSwitch++);
      else if (until === queueMoment) takeFromQueue();
      else month += 1;
    }
  }

  return {
    arrivals,
    run(stream, draw) {
      if (schedule.remaining === 0 || sites === 0) return 0;
      drawRates(stream, draw);
      drawActivations(stream, draw);
      generator.startAt(stream, draw, PURPOSE.arrivals);
      generator.fillExponential(exponentials, schedule.remaining + 1);
      isOn.fill(0);
      isSlow.set(schedule.startsSlow);
      room.set(schedule.room);
      tree.sums.fill(0);
      return arrive(stream, draw);
    },
  };
}
