import type { AuditChange } from '../audit/record';
import { countryName } from '../countries';
import { unsupportedParts } from '../engine/supported';
import type { Milestone, MilestoneForecast } from '../engine/types';
import type { FieldFault } from '../errors';
import { formatCount, formatDate, formatProbability, formatQuantity } from '../format';
import { milestoneFaults } from '../study-file/milestone-checks';
import type { Plan, PlanDifference, PlanSection } from './schema';

/** Sections as far as they are there, for rules that look across them. */
export type PartialPlan = { [S in keyof Plan]?: Plan[S] | undefined };

const SECTION_TITLES: Record<keyof Plan, string> = {
  enrolment: 'Target and rates',
  events: 'Events model',
  milestones: 'Milestones',
  simulation: 'Simulation',
};

/** What keeps sections that are each in order from being one plan. Pointers lead into the plan. */
export function planFaults(plan: PartialPlan): FieldFault[] {
  const missing = (Object.keys(SECTION_TITLES) as (keyof Plan)[]).filter((section) => plan[section] === undefined);
  return [
    ...missing.map((section) => ({
      pointer: `/${section}`,
      detail: `${SECTION_TITLES[section]}: nothing is saved yet. Fill in this section and save it.`,
    })),
    ...milestoneFaultsOf(plan),
    ...(missing.length === 0 ? engineFaults(plan as Plan) : []),
  ];
}

/** What the engine would refuse at the first run is refused here already. Weights are its business once there are data. */
function engineFaults({ enrolment, events, milestones, simulation }: Plan): FieldFault[] {
  return unsupportedParts({
    format: 'kalends-study/1',
    study: { code: '', title: '' },
    dataCutoff: '2000-01-01',
    enrolment: { ...enrolment, sites: [] },
    ...(events && { events: { ...events, model: { ...events.model, basis: 'plan' } } }),
    milestones,
    simulation,
  });
}

/** Events that no model tells of, and counts that enrolment never reaches. */
function milestoneFaultsOf({ milestones = [], events, enrolment }: PartialPlan): FieldFault[] {
  const target = enrolment?.target;
  const beyond = milestones.flatMap((milestone, place) =>
    milestone.kind !== 'randomised' || target === undefined || milestone.count <= target
      ? []
      : [
          {
            pointer: `/milestones/${place}/count`,
            detail: `Enrolment stops at the target of ${formatCount(target)}. Put the count at ${formatCount(target)} or less, or raise the target.`,
          },
        ],
  );
  return events === undefined ? beyond : [...beyond, ...milestoneFaults({ milestones, events })];
}

interface PlanLine {
  field: string;
  label: string;
  value: string;
}

const MONTH_NAMES = 'January February March April May June July August September October November December'.split(' ');
const NONE = 'none';

/** A quantity that may be a fraction, to its last digit: two versions that differ must read differently. */
export function planQuantity(count: number, one: string): string {
  return Number.isInteger(count) ? formatQuantity(count, one) : `${count} ${one}s`;
}

/** A share as the per cent that was typed. */
export function planPercent(share: number): string {
  return `${Number((share * 100).toPrecision(12))}\u00a0%`;
}

const months = (count: number): string => planQuantity(count, 'month');
const basisWords = (basis: 'plan' | 'data'): string =>
  basis === 'plan' ? 'known, as planned' : 'estimated from the data';

function enrolmentLines({ enrolment }: Plan): PlanLine[] {
  const { target, rate, countryRates = [], seasonality, rampUp, ageing, calendar = [], countryCaps = [] } = enrolment;
  const line = (field: string, label: string, value: string): PlanLine => ({
    field: `enrolment.${field}`,
    label,
    value,
  });
  return [
    line('target', 'Patients to randomise', formatCount(target)),
    line('rate.meanPerMonth', 'Mean rate of a site', `${rate.meanPerMonth} a month`),
    line('rate.cv', 'Spread between sites (CV)', String(rate.cv)),
    line('rate.basis', 'Rates', basisWords(rate.basis)),
    ...countryRates.map((row) =>
      line(`countryRates.${row.country}`, `Mean rate in ${countryName(row.country)}`, `${row.meanPerMonth} a month`),
    ),
    ...MONTH_NAMES.map((month, place) =>
      line(`seasonality.${place + 1}`, `Season, ${month}`, `${seasonality?.[place] ?? 1} of the usual rate`),
    ),
    line(
      'rampUp',
      'First months of a site',
      rampUp ? `${months(rampUp.months)} at ${planPercent(rampUp.fraction)} of its rate` : NONE,
    ),
    line(
      'ageing',
      'Slowing with age',
      ageing ? `to ${planPercent(ageing.floor)} over ${months(ageing.months)}, ${basisWords(ageing.basis)}` : NONE,
    ),
    ...calendar.map((pause) =>
      line(
        `calendar.${pause.from}.${pause.to}`,
        `${formatDate(pause.from)} to ${formatDate(pause.to)}`,
        `${planPercent(pause.multiplier)} of the rate ${pauseWhere(pause)}`,
      ),
    ),
    ...countryCaps.map((row) =>
      line(`countryCaps.${row.country}`, `At most in ${countryName(row.country)}`, formatQuantity(row.cap, 'patient')),
    ),
  ];
}

function pauseWhere({ countries, sites }: { countries?: string[]; sites?: string[] }): string {
  if (countries?.length) return `in ${countries.map(countryName).join(', ')}`;
  return sites?.length ? `at ${sites.join(', ')}` : 'everywhere';
}

function eventsLines({ events }: Plan): PlanLine[] {
  if (!events) return [{ field: 'events', label: 'Events model', value: NONE }];
  const { model, dropout, followUpMonths, adjudication } = events;
  const line = (field: string, label: string, value: string): PlanLine => ({ field: `events.${field}`, label, value });
  return [
    { field: 'events', label: 'Events model', value: 'given' },
    line('model.family', 'Family', model.family === 'weibull' ? 'Weibull' : model.family),
    line('model.medianMonths', 'Median time to event', months(model.medianMonths)),
    line('model.shape', 'Shape', model.shape === undefined ? '1, not given' : String(model.shape)),
    line('model.cureFraction', 'Never have the event', planPercent(model.cureFraction ?? 0)),
    line('model.basis', 'Time to event', basisWords(model.basis)),
    line('model.priorEvents', 'Weight of the plan', planQuantity(model.priorEvents, 'event')),
    line('dropout.perMonth', 'Loss to follow-up', `${planPercent(dropout.perMonth)} a month`),
    line('dropout.basis', 'Loss to follow-up', basisWords(dropout.basis)),
    line('dropout.priorEvents', 'Weight of the planned loss', planQuantity(dropout.priorEvents, 'patient')),
    line(
      'followUpMonths',
      'Each patient is followed for',
      followUpMonths ? months(followUpMonths) : 'until the study ends',
    ),
    line(
      'adjudication',
      'Adjudication',
      adjudication
        ? `${formatCount(adjudication.confirmed)} confirmed, ${formatCount(adjudication.refuted)} refuted, ${adjudication.medianLagDays} days`
        : NONE,
    ),
  ];
}

/** What a milestone waits for, in words. */
export function milestoneWaits(milestone: Milestone): string {
  if (milestone.kind === 'randomised')
    return formatQuantity(milestone.count, 'patient randomised', 'patients randomised');
  if (milestone.kind === 'events') return formatQuantity(milestone.count, 'event');
  if (milestone.kind === 'follow-up') return `${months(milestone.months)} after the last patient in`;
  return milestone.kind === 'all-of' ? `all of ${milestone.of.join(', ')}` : '';
}

function milestoneLines({ milestones }: Plan): PlanLine[] {
  return milestones.flatMap((milestone) => {
    const line = (field: string, label: string, value: string): PlanLine => ({
      field: `milestones.${milestone.code}.${field}`,
      label: `${milestone.code}, ${label}`,
      value,
    });
    return [
      line('name', 'name', milestone.name ?? milestone.code),
      line('waits', 'falls due at', milestoneWaits(milestone)),
      line('plannedOn', 'planned for', milestone.plannedOn ? formatDate(milestone.plannedOn) : NONE),
    ];
  });
}

function simulationLines({ simulation: { draws, seed, horizonMonths } }: Plan): PlanLine[] {
  return [
    { field: 'simulation.draws', label: 'Draws', value: formatCount(draws) },
    { field: 'simulation.seed', label: 'Seed', value: String(seed) },
    { field: 'simulation.horizonMonths', label: 'Horizon', value: months(horizonMonths) },
  ];
}

const SECTION_LINES: Record<PlanSection, (plan: Plan) => PlanLine[]> = {
  enrolment: enrolmentLines,
  milestones: milestoneLines,
  events: eventsLines,
  simulation: simulationLines,
};

function differencesOf(before: readonly PlanLine[], after: readonly PlanLine[]): PlanDifference[] {
  const old = new Map(before.map((line) => [line.field, line]));
  const now = new Map(after.map((line) => [line.field, line]));
  return [...new Set([...now.keys(), ...old.keys()])]
    .map((field) => ({
      field,
      label: (now.get(field) ?? old.get(field))!.label,
      old: old.get(field)?.value ?? NONE,
      new: now.get(field)?.value ?? NONE,
    }))
    .filter((difference) => difference.old !== difference.new);
}

/** Field by field, in the plan's own order, with both values in words. */
export function comparePlans(before: Plan, after: Plan): PlanDifference[] {
  const linesOf = (plan: Plan): PlanLine[] => Object.values(SECTION_LINES).flatMap((lines) => lines(plan));
  return differencesOf(linesOf(before), linesOf(after));
}

/** The same for one section; what is not there yet (undefined) has no lines. */
export function compareSections(section: PlanSection, before: unknown, after: unknown): PlanDifference[] {
  const linesOf = (value: unknown): PlanLine[] =>
    value === undefined ? [] : SECTION_LINES[section]({ [section]: value } as unknown as Plan);
  return differencesOf(linesOf(before), linesOf(after));
}

/** Every leaf by its path; milestones go by their code and countries by theirs, so that a moved row is no change. */
function leavesOf(value: unknown, path: string, into: Map<string, unknown>): Map<string, unknown> {
  if (Array.isArray(value) && value.some((item) => typeof item === 'object')) {
    value.forEach((item: Record<string, unknown>, place) =>
      leavesOf(item, `${path}.${item.code ?? item.country ?? place + 1}`, into),
    );
  } else if (typeof value === 'object' && value !== null && !Array.isArray(value)) {
    for (const [key, inner] of Object.entries(value)) leavesOf(inner, path ? `${path}.${key}` : key, into);
  } else into.set(path, value);
  return into;
}

/** The leaves in which two states differ, with raw values, for the trail. */
export function planChanges(before: unknown, after: unknown, path = ''): AuditChange[] {
  const old = leavesOf(before ?? {}, path, new Map());
  const now = leavesOf(after ?? {}, path, new Map());
  return [...new Set([...now.keys(), ...old.keys()])]
    .map((field) => ({ field, old: old.get(field) ?? null, new: now.get(field) ?? null }))
    .filter((change) => JSON.stringify(change.old) !== JSON.stringify(change.new));
}

/** Whether two values say the same, however their members are ordered (`jsonb` orders them anew). */
export function sameValue(one: unknown, other: unknown): boolean {
  return planChanges({ value: one ?? null }, { value: other ?? null }).length === 0;
}

/** A short code out of a milestone's name: `Interim analysis` -> `IA`, with a number where that is taken. */
export function milestoneCode(name: string, taken: readonly string[]): string {
  const words =
    name
      .normalize('NFD')
      .replace(/\p{M}/gu, '')
      .match(/[A-Za-z]+|\d+/g) ?? [];
  const initials = words
    .map((word) => (/\d/.test(word) ? word : word.charAt(0).toUpperCase()))
    .join('')
    .slice(0, 12);
  const base = initials || 'M';
  for (let place = 1; ; place += 1) {
    const code = place === 1 && initials ? base : `${base}${place}`;
    if (!taken.includes(code)) return code;
  }
}

/** Under this share of futures a plan that misses its own date gets a caution. */
export const DOUBTFUL_BELOW = 0.2;

/** A plan that on its own figures hardly meets its own date deserves a second look: a caution, never an error. */
export function secondLook(milestone: MilestoneForecast): string | null {
  const { plannedOn, probabilityByPlanned, quantiles } = milestone;
  if (!plannedOn || probabilityByPlanned === null || probabilityByPlanned >= DOUBTFUL_BELOW) return null;
  const even = quantiles['0.5'];
  return (
    `${milestone.name ?? milestone.code}: on its own figures the plan meets ${formatDate(plannedOn)} in ${formatProbability(probabilityByPlanned)} of futures. ` +
    (even
      ? `A date with an even chance is ${formatDate(even)}.`
      : 'In most futures it is not reached within the horizon.')
  );
}
