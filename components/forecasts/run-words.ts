import type { Caution, Forecast, MilestoneForecast } from '@/lib/engine/types';
import { formatCount, formatInstant, formatPercent, formatQuantity } from '@/lib/format';
import type { Run } from '@/lib/forecasts/schema';
import { cautionMarksOf } from '@/lib/publications/rules';

/** Footnote marks by milestone: what a caution does not name a milestone for touches all. */
export function marksOf({ cautions, milestones }: Pick<Forecast, 'cautions' | 'milestones'>): Record<string, string> {
  const named = cautions.map(({ code, text, milestones: touched = [] }: Caution) => ({
    code,
    text,
    milestones: touched,
  }));
  return cautionMarksOf({ cautions: named, milestones });
}

/** The date that the page is headed by: the first milestone that is still to come. */
export function headMilestone(milestones: readonly MilestoneForecast[]): MilestoneForecast {
  return milestones.find((milestone) => milestone.reachedOn === null) ?? milestones[0]!;
}

/** `Run 8, 5 Apr 2027, 10:12, by Ines Calder. 10,000 draws, seed 1.` */
export function runSentence(run: Run): string {
  const asked = `Run ${run.number}, ${formatInstant(run.requestedAt)}, by ${run.requestedBy}.`;
  return `${asked} ${formatQuantity(run.draws, 'draw')}, seed ${run.seed}.`;
}

/** `1 to 2 days`: the error that the number of draws leaves in the medians; null where there is none to speak of. */
export function simulationError(milestones: readonly MilestoneForecast[]): string | null {
  const errors = milestones.flatMap(({ monteCarloErrorDays }) =>
    monteCarloErrorDays === null ? [] : [Math.max(1, Math.round(monteCarloErrorDays))],
  );
  if (errors.length === 0) return null;
  const [least, most] = [Math.min(...errors), Math.max(...errors)];
  return least === most ? formatQuantity(most, 'day') : `${formatCount(least)} to ${formatQuantity(most, 'day')}`;
}

/** A monthly hazard as a share: `0.4 %`. */
export const formatMonthlyShare = (perMonth: number): string => formatPercent(perMonth, 1);
