import { numberTyped } from '@/components/ui/number-typed';
import type { Milestone, MilestoneKind } from '@/lib/engine/types';
import { milestoneCode } from '@/lib/studies/rules';

export interface MilestoneTyped {
  /** The code of a milestone that was saved, which stays; a new row's own mark until it gets one. */
  key: string;
  name: string;
  kind: MilestoneKind;
  count: string;
  months: string;
  /** Keys of the rows that it waits for. */
  of: string[];
  plannedOn: string;
}

export interface MilestonesTyped {
  rows: MilestoneTyped[];
}

const NEW = 'new ';

export function newMilestone(place: number, given: Partial<MilestoneTyped> = {}): MilestoneTyped {
  return { key: `${NEW}${place}`, name: '', kind: 'events', count: '', months: '', of: [], plannedOn: '', ...given };
}

/** What a study begins with: nearly every one waits for its last patient and for two counts of events. */
export const EMPTY_MILESTONES: MilestonesTyped = {
  rows: [
    newMilestone(1, { name: 'Last patient in', kind: 'randomised' }),
    newMilestone(2, { name: 'Interim analysis' }),
    newMilestone(3, { name: 'Final analysis' }),
  ],
};

export function milestonesTyped(saved: readonly Milestone[] | null): MilestonesTyped {
  if (!saved) return EMPTY_MILESTONES;
  return {
    rows: saved.map((milestone) => ({
      key: milestone.code,
      name: milestone.name ?? milestone.code,
      kind: milestone.kind,
      count: 'count' in milestone ? String(milestone.count) : '',
      months: 'months' in milestone ? String(milestone.months) : '',
      of: 'of' in milestone ? milestone.of : [],
      plannedOn: milestone.plannedOn ?? '',
    })),
  };
}

/** Saved rows keep their codes, since alerts and publications speak of them; new ones get one out of their name. */
export function milestoneCodes(rows: readonly MilestoneTyped[]): Map<string, string> {
  const codes = new Map(rows.filter((row) => !row.key.startsWith(NEW)).map((row) => [row.key, row.key]));
  for (const row of rows) if (!codes.has(row.key)) codes.set(row.key, milestoneCode(row.name, [...codes.values()]));
  return codes;
}

export function milestonesValue({ rows }: MilestonesTyped): unknown {
  const codes = milestoneCodes(rows);
  return rows.map((row) => ({
    code: codes.get(row.key),
    name: row.name.trim(),
    kind: row.kind,
    ...((row.kind === 'randomised' || row.kind === 'events') && { count: numberTyped(row.count) }),
    ...(row.kind === 'follow-up' && { months: numberTyped(row.months) }),
    ...(row.kind === 'all-of' && { of: row.of.flatMap((key) => codes.get(key) ?? []) }),
    plannedOn: row.plannedOn || null,
  }));
}

/** Faults of the list stand at its first name; those of a code at the name that it comes from. */
export function milestonesField(path: string): string {
  if (path === '') return 'rows.0.name';
  return `rows.${path}`.replace(/\.code$/, '.name').replace(/\.of\.\d+$/, '.of');
}
