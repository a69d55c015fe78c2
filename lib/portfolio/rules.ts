import { daysApart } from '../dates';
import { type PortfolioMilestone, type PortfolioOrder, type PortfolioStudy, type Standing, STANDINGS } from './schema';
import { STALE_AFTER_DAYS } from '../publications/rules';

export const LATE_BELOW = 0.2;
export const DOUBT_TO = 0.6;

/** When a milestone was or will be there: reached, median, else planned; none of these: last. */
function dayOf({ forecast, plannedOn }: PortfolioMilestone): string {
  return forecast?.reachedOn ?? forecast?.quantiles['0.5'] ?? plannedOn ?? '9999';
}

export function inOrderOfTime(milestones: readonly PortfolioMilestone[]): PortfolioMilestone[] {
  return [...milestones].sort((a, b) => dayOf(a).localeCompare(dayOf(b)) || a.code.localeCompare(b.code));
}

/** The milestone whose planned day comes first among those not reached yet. */
export function nextPlanned(milestones: readonly PortfolioMilestone[]): PortfolioStudy['next'] {
  const open = milestones
    .filter(
      ({ forecast, plannedOn }) =>
        plannedOn && forecast && !forecast.reachedOn && forecast.probabilityByPlanned !== null,
    )
    .sort((a, b) => a.plannedOn!.localeCompare(b.plannedOn!));
  const first = open[0];
  return first
    ? { name: first.name, plannedOn: first.plannedOn!, probability: first.forecast!.probabilityByPlanned! }
    : null;
}

export function standingOf(next: PortfolioStudy['next'], hasForecast: boolean): Standing {
  if (!hasForecast) return 'no-forecast';
  if (!next) return 'undated';
  if (next.probability < LATE_BELOW) return 'late';
  return next.probability <= DOUBT_TO ? 'in-doubt' : 'on-plan';
}

/** The soonest milestone still ahead of a study, by its median. */
export function soonestOf(milestones: readonly PortfolioMilestone[]): PortfolioMilestone | null {
  const ahead = milestones.filter(({ forecast }) => forecast && !forecast.reachedOn && forecast.quantiles['0.5']);
  return inOrderOfTime(ahead)[0] ?? null;
}

const byCode = (a: PortfolioStudy, b: PortfolioStudy): number =>
  a.code.localeCompare(b.code, 'en-GB', { numeric: true });

export function sortStudies(studies: readonly PortfolioStudy[], order: PortfolioOrder): PortfolioStudy[] {
  const soonest = (study: PortfolioStudy): string => {
    const first = soonestOf(study.milestones);
    return first ? dayOf(first) : '9999';
  };
  return [...studies].sort((a, b) => {
    if (order === 'code') return byCode(a, b);
    if (order === 'date') return soonest(a).localeCompare(soonest(b)) || byCode(a, b);
    const rank = STANDINGS.indexOf(a.standing) - STANDINGS.indexOf(b.standing);
    return rank || (a.next?.probability ?? 1) - (b.next?.probability ?? 1) || byCode(a, b);
  });
}

export function isStale(dataCutoff: string, today: string): boolean {
  return daysApart(dataCutoff, today) > STALE_AFTER_DAYS;
}
