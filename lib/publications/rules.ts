import { addDays, daysApart, monthEnd, monthOf, monthsFrom } from '../dates';
import type { Forecast, MilestoneForecast, Study } from '../engine/types';
import {
  cautionMark,
  formatDate,
  formatDateRange,
  formatDaysMoved,
  formatMonthRange,
  formatOrdinal,
  formatPercent,
  formatProbability,
  formatQuantity,
} from '../format';
import type { PublishedForecast } from './schema';

/** Data older than this are said to be old. */
export const STALE_AFTER_DAYS = 60;

/** When a milestone was or will be there, for the order on the page. */
const dayOf = ({ reachedOn, quantiles }: MilestoneForecast): string =>
  reachedOn ?? quantiles['0.5'] ?? quantiles['0.1'] ?? '9999';

export function inOrderOfTime(milestones: readonly MilestoneForecast[]): MilestoneForecast[] {
  return [...milestones].sort((a, b) => dayOf(a).localeCompare(dayOf(b)) || a.code.localeCompare(b.code));
}

/** The soonest milestone that is still ahead; the last one where all are reached. */
export function nextMilestone(milestones: readonly MilestoneForecast[]): MilestoneForecast | undefined {
  const ordered = inOrderOfTime(milestones);
  return ordered.find(({ reachedOn }) => reachedOn === null) ?? ordered.at(-1);
}

interface PublishedRun {
  number: number;
  forecast: Forecast;
  studyFile: Study;
}

type MonthlyTotals = { monthEnd: string; randomised: number; events: number }[];

/**
 * What of a run is published. Field by field, so that a new field of the forecast file stays unpublished until it is
 * named here; cautions in the sponsor's wording only.
 */
export function publishedForecast(
  study: PublishedForecast['study'],
  { number, forecast, studyFile }: PublishedRun,
  loggedTotals: MonthlyTotals,
): PublishedForecast {
  const { randomised, events } = forecast.observed;
  return {
    study,
    dataCutoff: forecast.dataCutoff,
    runNumber: number,
    observed: { randomised, events },
    observedMonthly: observedMonthly(forecast, studyFile, loggedTotals),
    milestones: forecast.milestones.map(publishedMilestone),
    monthly: forecast.monthly.map((row) => ({
      monthEnd: row.monthEnd,
      randomised: row.randomised,
      ...(row.events ? { events: row.events } : {}),
    })),
    cautions: forecast.cautions.map(({ code, sponsorText, milestones = [] }) => ({
      code,
      text: sponsorText,
      milestones,
    })),
    provenance: {
      engineVersion: forecast.engineVersion,
      studySha256: forecast.studySha256,
      seed: forecast.seed,
      draws: forecast.draws,
    },
  };
}

function publishedMilestone(milestone: MilestoneForecast): MilestoneForecast {
  const { code, name, kind, count, months, of, plannedOn, reachedOn } = milestone;
  return {
    code,
    ...(name === undefined ? {} : { name }),
    kind,
    ...(count === undefined ? {} : { count }),
    ...(months === undefined ? {} : { months }),
    ...(of === undefined ? {} : { of }),
    ...(plannedOn === undefined ? {} : { plannedOn }),
    reachedOn,
    probabilityReached: milestone.probabilityReached,
    probabilityByPlanned: milestone.probabilityByPlanned,
    quantiles: milestone.quantiles,
    monteCarloErrorDays: milestone.monteCarloErrorDays,
    density: milestone.density.map(({ from, share }) => ({ from, share })),
  };
}

/**
 * Study totals by month-end, from the run's own study file, so that they agree with what it observed whatever was
 * corrected since. Without subjects the log gives the events of the months before the cut-off.
 */
function observedMonthly(
  { dataCutoff, observed }: Forecast,
  { enrolment, events }: Study,
  loggedTotals: MonthlyTotals,
): PublishedForecast['observedMonthly'] {
  const subjects = events?.subjects;
  const randomisedBy = (day: string): number =>
    subjects
      ? subjects.filter((subject) => subject.randomisedOn <= day).length
      : enrolment.sites
          .flatMap((site) => site.monthly ?? [])
          .filter((row) => monthEnd(row.month) <= day)
          .reduce((sum, row) => sum + row.randomised, 0);
  const eventsBy = (day: string): number | null => {
    if (observed.events === null) return null;
    if (subjects) return subjects.filter(({ status, statusOn }) => status === 'event' && statusOn <= day).length;
    const logged = loggedTotals.filter((row) => row.monthEnd <= day).at(-1)?.events ?? 0;
    return Math.min(logged, observed.events);
  };
  const starts = subjects?.length
    ? subjects.map((subject) => monthOf(subject.randomisedOn))
    : enrolment.sites.flatMap((site) => (site.monthly ?? []).map((row) => row.month));
  const last = { monthEnd: dataCutoff, randomised: observed.randomised, events: observed.events };
  if (starts.length === 0) return [last];
  const first = starts.reduce((least, month) => (month < least ? month : least));
  const days = monthsFrom(first, monthOf(dataCutoff))
    .map(monthEnd)
    .filter((day) => day < dataCutoff);
  return [...days.map((day) => ({ monthEnd: day, randomised: randomisedBy(day), events: eventsBy(day) })), last];
}

/**
 * Milestone code -> the footnote marks of the cautions that touch it; a caution without milestones touches all. A day that
 * is known is no forecast, and needs none.
 */
export function cautionMarksOf({
  cautions,
  milestones,
}: Pick<PublishedForecast, 'cautions' | 'milestones'>): Record<string, string> {
  return Object.fromEntries(
    milestones.map(({ code, reachedOn }) => [
      code,
      cautions
        .flatMap((caution, place) =>
          !reachedOn && (caution.milestones.length === 0 || caution.milestones.includes(code))
            ? [cautionMark(place)]
            : [],
        )
        .join('\u00a0'),
    ]),
  );
}

export const nameOfMilestone = ({ code, name }: Pick<MilestoneForecast, 'code' | 'name'>): string => name ?? code;

/** `Interim analysis` within a sentence: `interim analysis`; an abbreviation keeps its capitals. */
export function inSentence(name: string): string {
  return /^\p{Lu}\p{Ll}/u.test(name) ? name.charAt(0).toLowerCase() + name.slice(1) : name;
}

/** What the milestone waits for: `288th event`, `12 months after the last patient in`, `final analysis and follow-up`. */
export function waitsFor(
  milestone: Pick<MilestoneForecast, 'kind' | 'count' | 'months' | 'of'>,
  all: readonly Pick<MilestoneForecast, 'code' | 'name'>[],
): string {
  if (milestone.kind === 'randomised') return `${formatOrdinal(milestone.count ?? 0)} randomisation`;
  if (milestone.kind === 'events') return `${formatOrdinal(milestone.count ?? 0)} event`;
  if (milestone.kind === 'follow-up')
    return `${formatQuantity(milestone.months ?? 0, 'month')} after the last patient in`;
  const names = (milestone.of ?? []).map((code) =>
    inSentence(nameOfMilestone(all.find((one) => one.code === code) ?? { code })),
  );
  return [names.slice(0, -1).join(', '), ...names.slice(-1)].filter(Boolean).join(' and ');
}

export interface MilestoneWords {
  /** Large: `Nov 2027 to Feb 2028`, `reached 12 Mar 2027`, `not reached in > 99 % of draws`. */
  range: string;
  /** Whether the range is the 80 % one; not so for a day that is known, or one that may never come. */
  isRange: boolean;
  /** Under it: `23 Nov 2027 to 3 Feb 2028; median 26 Dec 2027`. */
  exact: string;
  planned: string | null;
  /** Whether it was or will be reached by the planned day. */
  chance: string | null;
}

type Dated = Pick<
  MilestoneForecast,
  'reachedOn' | 'quantiles' | 'probabilityReached' | 'probabilityByPlanned' | 'plannedOn'
>;

/** A milestone's date in words: months large, days and median under it. */
export function milestoneWords(milestone: Dated): MilestoneWords {
  const { reachedOn, quantiles, plannedOn, probabilityByPlanned } = milestone;
  const planned = plannedOn ? formatDate(plannedOn) : null;
  if (reachedOn) {
    const late = plannedOn ? daysApart(plannedOn, reachedOn) : 0;
    return {
      range: `Reached ${formatDate(reachedOn)}`,
      isRange: false,
      exact: '',
      planned,
      chance: planned && (late === 0 ? 'on the planned day' : `${formatDaysMoved(late)} than planned`),
    };
  }
  const chance =
    planned && probabilityByPlanned !== null ? `${formatProbability(probabilityByPlanned)} chance by then` : null;
  const missing = notReached(milestone);
  if (quantiles['0.1'] === null) {
    return { range: 'Not reached', isRange: false, exact: missing ?? '', planned, chance };
  }
  const median = quantiles['0.5'] && `median ${formatDate(quantiles['0.5'])}`;
  const [from, to] = [quantiles['0.1'], quantiles['0.9']];
  return {
    range: formatMonthRange(from, to),
    isRange: true,
    exact: [formatDateRange(from, to), median, missing].filter(Boolean).join('; '),
    planned,
    chance,
  };
}

/** How often the count is never reached within the horizon; null where all but a few draws get there. */
function notReached({ probabilityReached }: Pick<MilestoneForecast, 'probabilityReached'>): string | null {
  const missing = Math.min(1, Math.max(0, 1 - probabilityReached));
  if (missing < 0.005) return null;
  return `not reached in ${missing === 1 ? formatPercent(1) : formatProbability(missing)} of draws`;
}

/** Days by which a milestone's median moved; null where one of the two has none or the day is known. */
export function medianMoved(earlier: Dated | null | undefined, later: Dated): number | null {
  if (!earlier || later.reachedOn || earlier.reachedOn) return null;
  const [before, after] = [earlier.quantiles['0.5'], later.quantiles['0.5']];
  return before && after ? daysApart(before, after) : null;
}

/** `16 days later than on 2 Mar`; the year where it is another than this publication's. */
export function movedWords(days: number, earlierOn: string, laterOn: string): string {
  const day =
    earlierOn.slice(0, 4) === laterOn.slice(0, 4)
      ? formatDate(earlierOn).replace(/ \d{4}$/, '')
      : formatDate(earlierOn);
  return days === 0 ? `unchanged since ${day}` : `${formatDaysMoved(days)} than on ${day}`;
}

export interface Quoted {
  number: number;
  publishedOn: string;
  content: PublishedForecast;
}

/** A sentence that says all that a date needs to be passed on: what, range, median, from which data, and that it is a forecast. */
export function quotation({ number, publishedOn, content }: Quoted, milestone: MilestoneForecast): string {
  const source = `publication ${number} of ${formatDate(publishedOn)}, from data to ${formatDate(content.dataCutoff)}`;
  const what = `${content.study.code}, ${inSentence(nameOfMilestone(milestone))} (${waitsFor(milestone, content.milestones)})`;
  if (milestone.reachedOn) return `${what}: reached on ${formatDate(milestone.reachedOn)} (${source}).`;
  const { exact, isRange } = milestoneWords(milestone);
  const cautions = content.cautions.length > 0 ? `, with ${formatQuantity(content.cautions.length, 'caution')}` : '';
  const dated = isRange ? `forecast for ${exact.replace(/;|$/, ` (${formatPercent(0.8)})$&`)}` : `forecast: ${exact}`;
  return `${what}: ${dated} (${source}${cautions}). A forecast is not a decision.`;
}

const REASON_LENGTH = 120;

/** What moved a date, in few words: the first sentence of the note. */
export function firstSentence(note: string): string {
  const sentence = /^.*?[.!?](?=\s|$)/s.exec(note.trim())?.[0] ?? note.trim();
  const line = sentence.replace(/\s+/g, ' ');
  return line.length <= REASON_LENGTH ? line : `${line.slice(0, REASON_LENGTH - 1).replace(/\s+\S*$/, '')}…`;
}

/** The share of draws in which a milestone is reached by the end of a day, from the weekly density, even within a week. */
export function shareReachedBy(milestone: MilestoneForecast, day: string): number {
  if (milestone.reachedOn) return milestone.reachedOn <= day ? 1 : 0;
  return milestone.density.reduce((sum, { from, share }) => {
    const days = daysApart(from, addDays(day, 1));
    return sum + share * Math.min(1, Math.max(0, days / 7));
  }, 0);
}
