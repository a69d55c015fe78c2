import type { MilestoneForecast } from '@/lib/engine/types';
import { formatCount, formatDate, formatDateRange, formatPercent, formatProbability } from '@/lib/format';

/** The share of draws that never get there, in words; null where all but a few do. */
export function notReachedWords(milestone: Pick<MilestoneForecast, 'probabilityReached'>): string | null {
  const missing = 1 - milestone.probabilityReached;
  if (missing < 0.005) return null;
  return `not reached in ${missing > 0.99 && missing < 1 ? formatProbability(missing) : formatPercent(missing)} of draws`;
}

/** Range first, then what belongs under it: the median, or how often the count is never reached. */
export function milestoneWords(milestone: MilestoneForecast): { range: string; under: string } {
  if (milestone.reachedOn) return { range: `reached ${formatDate(milestone.reachedOn)}`, under: '' };
  const { quantiles } = milestone;
  const missing = notReachedWords(milestone);
  if (quantiles['0.1'] === null) return { range: missing ?? 'not reached', under: '' };
  const range = formatDateRange(quantiles['0.1'], quantiles['0.9']);
  if (quantiles['0.9'] === null && missing) return { range, under: missing };
  return { range, under: quantiles['0.5'] ? `median ${formatDate(quantiles['0.5'])}` : (missing ?? '') };
}

/** What the milestone waits for, beside its name: "288 events", "12 months after the last patient". */
export function milestoneWaitsFor(milestone: MilestoneForecast, names?: Readonly<Record<string, string>>): string {
  if (milestone.kind === 'randomised') return `${formatCount(milestone.count ?? 0)} randomised`;
  if (milestone.kind === 'events') return `${formatCount(milestone.count ?? 0)} events`;
  if (milestone.kind === 'follow-up') {
    return `last patient in and ${milestone.months === 1 ? 'a month' : `${milestone.months ?? 0} months`}`;
  }
  const parts = (milestone.of ?? []).map((code) => names?.[code] ?? code);
  return parts.length > 1 ? `${parts.slice(0, -1).join(', ')} and ${parts[parts.length - 1]}` : (parts[0] ?? '');
}

/** One sentence for those who hear the figure. */
export function milestoneSentence(milestone: MilestoneForecast): string {
  const { range, under } = milestoneWords(milestone);
  const eighty = milestone.reachedOn || milestone.quantiles['0.1'] === null ? '' : ` (${formatPercent(0.8)})`;
  return `${milestone.name ?? milestone.code}: ${range}${eighty}${under ? `, ${under}` : ''}.`;
}
