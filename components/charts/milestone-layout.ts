import type { MilestoneForecast } from '@/lib/engine/types';
import { nameOf } from '@/components/charts/figure-data';
import type { Frame } from '@/components/charts/figure-frame';
import { coreOf, hillOf, peakOf, type HillPoint } from '@/components/charts/figure-hill';
import { firstFree, textWidth, type Box, type Candidate } from '@/components/charts/figure-labels';
import { endOfDay, polyline } from '@/components/charts/figure-scale';
import { milestoneWaitsFor, milestoneWords } from '@/components/charts/milestone-words';

export interface Bracket {
  from: number;
  to: number;
  /** The late end lies beyond the horizon: the bracket is not closed. */
  open: boolean;
}

export interface MilestoneLayout {
  code: string;
  kind: MilestoneForecast['kind'];
  y: number;
  name: { x: number; y: number; text: string; waitsFor: string } | null;
  hill: { outline: string; core: string } | null;
  bracket: Bracket | null;
  /** The median, or the day it was reached. */
  markX: number | null;
  reached: boolean;
  diamond: { x: number; y: number } | null;
  label: { x: number; y: number; anchor: 'start' | 'end'; lines: string[]; marks: string } | null;
  earlier: { outline: string; bracket: Bracket | null } | null;
}

export interface MilestoneContext {
  frame: Frame;
  /** Pixels of hill per unit of density, by the hill's peak. */
  heightOf: (peak: number) => number;
  /** Boxes of text that are placed already; each label adds its own. */
  taken: Box[];
  /** Names and dates are left to the table where there are too many lines for them. */
  written: boolean;
  names: Readonly<Record<string, string>>;
  marks?: string;
  earlier?: { label: string; milestone: MilestoneForecast };
}

function hillPath(hill: readonly HillPoint[], y: number, frame: Frame, height: number): string {
  if (hill.length === 0) return '';
  const points = hill.map((point) => ({ x: frame.scale.x(point.day), y: y - point.density * height }));
  const inside = points.filter((point) => point.x >= frame.scale.left && point.x <= frame.scale.right);
  const first = inside[0];
  const last = inside[inside.length - 1];
  return first && last ? polyline([{ x: first.x, y }, ...inside, { x: last.x, y }]) : '';
}

export function bracketOf(milestone: MilestoneForecast, frame: Frame): Bracket | null {
  const low = milestone.quantiles['0.1'];
  if (milestone.reachedOn || low === null) return null;
  const high = milestone.quantiles['0.9'];
  const end = high === null ? Infinity : frame.scale.x(endOfDay(high));
  return { from: frame.scale.x(endOfDay(low)), to: Math.min(end, frame.scale.right), open: end > frame.scale.right };
}

/** One milestone on its line: name left, hill above, bracket below, its dates right of it where no band runs. */
export function milestoneLayout(milestone: MilestoneForecast, y: number, context: MilestoneContext): MilestoneLayout {
  const { frame, heightOf, taken, written, names, marks = '', earlier } = context;
  const { scale, size } = frame;
  const full = size === 'full';

  const waitsFor = full ? milestoneWaitsFor(milestone, names) : '';
  const name = written ? { x: scale.left + 4, y: y - 8, text: nameOf(milestone), waitsFor } : null;
  if (name) {
    taken.push({ x: name.x, y: y - 22, width: textWidth(name.text, true) + 6 + textWidth(waitsFor), height: 18 });
  }

  const hill = milestone.reachedOn ? [] : hillOf(milestone);
  const height = heightOf(peakOf(hill));
  const bracket = bracketOf(milestone, frame);
  const markOn = milestone.reachedOn ?? milestone.quantiles['0.5'];
  const markDay = markOn === null ? null : endOfDay(markOn);
  const markX = markDay === null || markDay > scale.to ? null : scale.x(markDay);
  const plannedX = milestone.plannedOn ? scale.x(endOfDay(milestone.plannedOn)) : null;
  const covers = plannedX !== null && markX !== null && Math.abs(plannedX - markX) < 9;
  const earlierHill = earlier ? hillOf(earlier.milestone) : [];

  return {
    code: milestone.code,
    kind: milestone.kind,
    y,
    name,
    hill:
      hill.length === 0
        ? null
        : { outline: hillPath(hill, y, frame, height), core: hillPath(coreOf(hill, milestone), y, frame, height) },
    bracket,
    markX,
    reached: milestone.reachedOn !== null,
    diamond:
      plannedX === null || plannedX < scale.left || plannedX > scale.right
        ? null
        : { x: plannedX, y: covers ? y - 12 : y },
    label: written && full ? placeLabel(milestone, y, bracket, markX, { ...context, marks }) : null,
    earlier: earlier
      ? {
          outline: hillPath(earlierHill, y, frame, heightOf(peakOf(earlierHill))),
          bracket: bracketOf(earlier.milestone, frame),
        }
      : null,
  };
}

interface LabelPlace {
  x: number;
  y: number;
  anchor: 'start' | 'end';
  /** How many of the lines stand there. */
  count: number;
}

function placeLabel(
  milestone: MilestoneForecast,
  y: number,
  bracket: Bracket | null,
  markX: number | null,
  { frame, taken, marks = '', earlier }: MilestoneContext,
): MilestoneLayout['label'] {
  const { scale } = frame;
  const { range, under } = milestoneWords(milestone);
  const second = earlier ? `${earlier.label}: ${milestoneWords(earlier.milestone).range}` : under;
  const lines = second ? [range, second] : [range];
  const marksWidth = marks ? textWidth(marks, true) + 8 : 0;
  const width = Math.max(
    ...lines.map((line, place) => textWidth(line, place === 0) + (place === lines.length - 1 ? marksWidth : 0)),
  );
  const earlierEnd = earlier ? (bracketOf(earlier.milestone, frame)?.to ?? 0) : 0;
  const start = bracket && !bracket.open ? Math.max(bracket.to, earlierEnd) + 8 : (markX ?? scale.right) + 10;
  const end = bracket ? bracket.from - 8 : (markX ?? scale.right) - 10;
  const down = bracket ? y + 16 : y + 18;

  const right = (count: number): Candidate<LabelPlace> => ({
    place: { x: start, y: down, anchor: 'start', count },
    box: { x: start, y: down - 13, width, height: 17 * count },
  });
  const above = (count: number): Candidate<LabelPlace> => ({
    place: { x: end, y: y - 5 - 17 * (count - 1), anchor: 'end', count },
    box: { x: end - width, y: y - 18 - 17 * (count - 1), width, height: 17 * count },
  });
  const below = (count: number): Candidate<LabelPlace> => ({
    place: { x: scale.right, y: y + 27, anchor: 'end', count },
    box: { x: scale.right - width, y: y + 14, width, height: 17 * count },
  });
  const candidates = bracket?.open
    ? [above(lines.length), below(lines.length), above(1)]
    : [right(lines.length), above(lines.length), right(1), above(1)];
  const found = firstFree(candidates, taken, { left: scale.left, right: frame.width });
  if (!found) return null;
  taken.push(found.box);
  const { x, y: top, anchor, count } = found.place;
  return { x, y: top, anchor, lines: lines.slice(0, count), marks };
}
