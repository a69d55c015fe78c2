import { addDays } from '../dates';
import type { MilestoneForecast } from '../engine/types';
import { formatDate, formatDaysMoved, formatPercent, formatProbability, formatQuantity } from '../format';
import { inSentence, medianMoved, milestoneWords, nameOfMilestone, shareReachedBy } from '../publications/rules';
import type { AlertCondition } from './schema';

/** A milestone as one publication gave it. */
export interface PublishedMilestone {
  number: number;
  publishedOn: string;
  milestone: MilestoneForecast;
}

export interface RuleSituation {
  current: PublishedMilestone;
  /** Earlier publications of the milestone, newest first, as far back as the last alert's or the one before `current`. */
  before: readonly PublishedMilestone[];
  /** The publication of which the rule last spoke, under this same condition; null: it never did. */
  lastAlert: number | null;
  today: string;
}

/** A milestone that is near stays so until its chance falls short even two weeks further out: a wavering day is no news. */
const SLACK_WEEKS = 2;

function isNear(
  milestone: MilestoneForecast,
  { withinWeeks, probability }: { withinWeeks: number; probability: number },
  day: string,
): boolean {
  return milestone.reachedOn === null && shareReachedBy(milestone, addDays(day, withinWeeks * 7)) >= probability;
}

/** Whether a rule speaks now. Each condition speaks once and is then silent until what it says has stopped being so. */
export function ruleSpeaks(condition: AlertCondition, { current, before, lastAlert, today }: RuleSituation): boolean {
  if (lastAlert === current.number) return false;
  const previous = before[0] ?? null;
  if (condition.kind === 'slips') return slipped(condition.days, previous?.milestone ?? null, current.milestone);
  if (condition.kind === 'reached') {
    return current.milestone.reachedOn !== null && lastAlert === null && !previous?.milestone.reachedOn;
  }
  if (!isNear(current.milestone, condition, today)) return false;
  if (lastAlert === null) return true;
  const slack = { ...condition, withinWeeks: condition.withinWeeks + SLACK_WEEKS };
  // Within one publication a milestone only comes nearer; it can stop being near when a new one is published.
  return before.some(
    ({ number, milestone, publishedOn }) => number > lastAlert && !isNear(milestone, slack, publishedOn),
  );
}

/** A median that was there and is there no more has slipped further than any number of days. */
function slipped(days: number, previous: MilestoneForecast | null, current: MilestoneForecast): boolean {
  if (!previous || previous.reachedOn || current.reachedOn || !previous.quantiles['0.5']) return false;
  const moved = medianMoved(previous, current);
  return moved === null || moved >= days;
}

/** `interim analysis now Nov 2027 to Feb 2028, 16 days later`: the news itself, for a subject line. */
export function newsWords(condition: AlertCondition, { current, before, today }: RuleSituation): string {
  const { milestone } = current;
  const name = inSentence(nameOfMilestone(milestone));
  if (milestone.reachedOn) return `${name} reached on ${formatDate(milestone.reachedOn)}`;
  const { range, exact, isRange } = milestoneWords(milestone);
  const dated = isRange ? range : exact || range.toLowerCase();
  if (condition.kind === 'nears') {
    const share = shareReachedBy(milestone, addDays(today, condition.withinWeeks * 7));
    return `${name} nears, ${dated}: ${formatProbability(Math.min(1, share))} chance within ${formatQuantity(condition.withinWeeks, 'week')}`;
  }
  const moved = medianMoved(before[0]?.milestone, milestone);
  return moved === null ? `${name} now ${dated}` : `${name} now ${dated}, ${formatDaysMoved(moved)}`;
}

/** The same as a sentence, with where it comes from. */
export function headlineOf(condition: AlertCondition, situation: RuleSituation): string {
  const news = newsWords(condition, situation);
  const { current, before } = situation;
  const against = condition.kind === 'slips' && before[0] ? ` than in publication ${before[0].number}` : '';
  const ending = news.endsWith(' later') || news.endsWith(' earlier') ? against : '';
  const range = current.milestone.reachedOn === null ? `, ${formatPercent(0.8)} range` : '';
  const sentence = `${news}${ending} (publication ${current.number}${range})`;
  return `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}.`;
}

/** When a rule speaks, after "when": `the interim analysis slips by 14 days or more against the last publication`. */
export function conditionWords(condition: AlertCondition, milestoneName: string): string {
  const name = `the ${inSentence(milestoneName)}`;
  if (condition.kind === 'reached') return `${name} is reached`;
  if (condition.kind === 'slips')
    return `${name} slips by ${formatQuantity(condition.days, 'day')} or more against the last publication`;
  return `${name} is within ${formatQuantity(condition.withinWeeks, 'week')} with a chance of ${formatPercent(condition.probability)} or more`;
}
