import { OVERDUE_MEAN_DELAY_DAYS } from './activation';
import { DAYS_PER_MONTH } from './calendar';
import type { EventsModel } from './events-model';
import { weibullFamily } from './family-weibull';
import type { PreparedForecast } from './forecast';
import type { PreparedMilestone } from './milestones';
import { quantileType7 } from './quantiles';
import type { Caution, ForecastFit } from './types';

const FEW_EVENTS = 10;
const NOT_REACHED_SHARE = 0.05;
const EXTRAPOLATION = 2;
/** 99 % point of the chi-squared distribution with 1 degree of freedom. */
const CHI_SQUARED_99 = 6.6348966;
const NAMES_SHOWN = 12;

/**
 * Everything that a reader of the forecast has to know before leaning on it.
 *
 * @param samples per milestone, the draws' moments in ascending order
 */
export function raiseCautions(
  prepared: PreparedForecast,
  samples: readonly Float64Array[],
  fit: ForecastFit,
): Caution[] {
  return [
    ...siteCautions(prepared),
    ...(prepared.events ? eventCautions(prepared, prepared.events, samples, fit) : []),
    ...outOfReach(prepared),
    ...notReached(prepared, samples),
  ];
}

function siteCautions({ study, schedule, enrolment }: PreparedForecast): Caution[] {
  // With the target met nobody is simulated, whatever the sites' state.
  if (schedule.remaining === 0) return [];
  const cautions: Caution[] = [];
  const { sites } = study.enrolment;
  const overdue = schedule.overdueSites.map((place) => sites[place]?.code ?? '');
  if (overdue.length > 0) {
    const one = overdue.length === 1;
    const rest = `${one ? 'has' : 'have'} not opened although the planned window has passed; the forecast lets ${one ? 'it' : 'each'} open ${OVERDUE_MEAN_DELAY_DAYS} days after the data cut-off on average.`;
    cautions.push({
      code: 'overdue-sites',
      text: `${one ? 'Site' : 'Sites'} ${listed(overdue)} ${rest}`,
      sponsorText: `${counted(overdue.length, 'site')} ${rest}`,
    });
  }
  const unlogged = sites.filter(
    ({ cap, randomised }, place) =>
      (enrolment.calendars[place]?.unlogged.length ?? 0) > 0 && (cap ?? Infinity) > (randomised ?? 0),
  );
  if (unlogged.length > 0) {
    const rest = `not logged every month up to the data cut-off; patients of those months are simulated, not counted as none.`;
    cautions.push({
      code: 'unlogged-months',
      text: `${unlogged.length === 1 ? 'Site' : 'Sites'} ${listed(unlogged.map(({ code }) => code))} ${unlogged.length === 1 ? 'has' : 'have'} ${rest}`,
      sponsorText: `${counted(unlogged.length, 'site')} ${unlogged.length === 1 ? 'has' : 'have'} ${rest}`,
    });
  }
  return cautions;
}

function eventCautions(
  prepared: PreparedForecast,
  events: EventsModel,
  samples: readonly Float64Array[],
  fit: ForecastFit,
): Caution[] {
  const touched = codesTouchedBy(prepared, ({ milestone }) => milestone.kind === 'events');
  if (touched.length === 0) return [];
  const cautions: Caution[] = [];
  const { model } = prepared.study.events ?? {};
  const observed = events.observed.events;
  const add = (code: string, text: string, codes = touched): void => {
    cautions.push({ code, text, sponsorText: text, milestones: codes });
  };
  if (model?.basis === 'data') {
    if (observed < FEW_EVENTS) {
      add(
        'few-events',
        `The time to event is estimated from ${counted(observed, 'event')}, fewer than ${FEW_EVENTS}; dates that wait for events may move much as more come in.`,
      );
    }
    if (model.priorEvents > observed) {
      add(
        'prior-outweighs-data',
        `The planned median weighs as much as ${counted(model.priorEvents, 'event')}, more than the ${observed} observed; dates that wait for events follow the plan more than the data.`,
      );
    }
    const far = prepared.milestones.list.filter(
      ({ milestone, reachedDay }, place) =>
        milestone.kind === 'events' && reachedDay === null && reachesBeyondData(events, samples[place] as Float64Array),
    );
    if (far.length > 0) {
      add(
        'extrapolation',
        `Reaching ${listed(far.map(nameOf))} takes times on study of more than twice the longest follow-up so far (${months(events.longestFollowUp ?? 0)} months); what happens there is the model's, not the data's.`,
        codesTouchedBy(prepared, (milestone) => far.includes(milestone)),
      );
    }
  }
  if (exponentialFails(events, fit)) {
    add(
      'poor-fit',
      'The exponential does not fit the events so far: a Weibull fits better than chance would allow (likelihood-ratio test, p < 0.01), so the rate of events changes with time on study.',
    );
  }
  return cautions;
}

/** At the median date, has somebody been on study for more than twice the longest follow-up so far? */
function reachesBeyondData(events: EventsModel, sorted: Float64Array): boolean {
  const median = quantileType7(sorted, 0.5);
  if (events.longestFollowUp === null || median === Infinity) return false;
  const { randomised } = events.atRisk;
  let earliest = 0;
  for (const moment of randomised) earliest = Math.min(earliest, moment);
  const longest = Math.min((median - earliest) / DAYS_PER_MONTH, events.followUpMonths);
  return longest > EXTRAPOLATION * events.longestFollowUp;
}

function exponentialFails(events: EventsModel, fit: ForecastFit): boolean {
  const exponential = fit.events?.find(({ family }) => family === 'exponential');
  if (!exponential || !events.data.hasTimes || events.cureFraction > 0) return false;
  const weibull = weibullFamily.fit(events.data, 0);
  return weibull !== null && 2 * (weibull.logLikelihood - exponential.logLikelihood) > CHI_SQUARED_99;
}

/** Milestones that ask for more than the target or the subjects can give, in any draw. */
function outOfReach(prepared: PreparedForecast): Caution[] {
  const { events, milestones, schedule } = prepared;
  const cautions: Caution[] = [];
  for (const { milestone, reachedDay } of milestones.list) {
    if (reachedDay !== null) continue;
    if (milestone.kind === 'randomised' && milestone.count > Math.max(milestones.target, milestones.randomised)) {
      const text = `${quoted(milestone)} asks for ${number(milestone.count)} randomised, and enrolment stops at ${number(milestones.target)}.`;
      cautions.push({ code: 'out-of-reach', text, sponsorText: text, milestones: [milestone.code] });
    }
    if (milestone.kind === 'events' && events) {
      const most = events.observed.events + events.atRisk.elapsed.length + schedule.remaining;
      if (milestone.count > most) {
        const text = `${quoted(milestone)} asks for ${number(milestone.count)} events, and observed events, subjects at risk and those still to come give ${number(most)} at most.`;
        cautions.push({ code: 'out-of-reach', text, sponsorText: text, milestones: [milestone.code] });
      }
    }
  }
  return cautions;
}

function notReached(prepared: PreparedForecast, samples: readonly Float64Array[]): Caution[] {
  const { horizonMonths } = prepared.study.simulation;
  return prepared.milestones.list.flatMap(({ milestone }, place) => {
    const sample = samples[place] as Float64Array;
    const missing = sample.filter((moment) => moment === Infinity).length / sample.length;
    if (missing <= NOT_REACHED_SHARE) return [];
    const text = `${quoted(milestone)} is not reached within ${counted(horizonMonths, 'month')} of the data cut-off in ${percent(missing)} of draws.`;
    return [{ code: 'not-reached', text, sponsorText: text, milestones: [milestone.code] }];
  });
}

/** Codes of the milestones still to come that are such, or are made of such. */
function codesTouchedBy({ milestones }: PreparedForecast, isSuch: (milestone: PreparedMilestone) => boolean): string[] {
  const touched = new Set<number>();
  for (const place of milestones.order) {
    const prepared = milestones.list[place] as PreparedMilestone;
    if (prepared.reachedDay !== null) continue;
    if (isSuch(prepared) || prepared.parts.some((part) => touched.has(part))) touched.add(place);
  }
  return milestones.list.filter((_, place) => touched.has(place)).map(({ milestone }) => milestone.code);
}

function nameOf({ milestone }: PreparedMilestone): string {
  return quoted(milestone);
}

function quoted({ name, code }: { name?: string; code: string }): string {
  return `“${name ?? code}”`;
}

function counted(count: number, noun: string): string {
  return `${number(count)} ${noun}${count === 1 ? '' : 's'}`;
}

/** 12,345 */
function number(value: number): string {
  const [whole = '', fraction] = String(value).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}

function months(value: number): string {
  return (Math.round(value * 10) / 10).toFixed(1);
}

function percent(share: number): string {
  if (share > 0 && share < 0.01) return '< 1\u00a0%';
  if (share < 1 && share > 0.99) return '> 99\u00a0%';
  return `${Math.round(share * 100)}\u00a0%`;
}

function listed(names: readonly string[]): string {
  const shown = names.slice(0, NAMES_SHOWN);
  const more = names.length - shown.length;
  if (more > 0) return `${shown.join(', ')} and ${more} more`;
  const last = shown[shown.length - 1] ?? '';
  return shown.length > 1 ? `${shown.slice(0, -1).join(', ')} and ${last}` : last;
}
