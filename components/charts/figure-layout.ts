import { nameOf, type FigureData } from '@/components/charts/figure-data';
import { figureFrame, type Frame } from '@/components/charts/figure-frame';
import { hillOf, hillScale, peakOf } from '@/components/charts/figure-hill';
import { textWidth, type Box } from '@/components/charts/figure-labels';
import { earlierOf, panelLayout, type PanelLayout } from '@/components/charts/panel-layout';
import { milestoneLayout, type MilestoneLayout } from '@/components/charts/milestone-layout';
import { formatDate } from '@/lib/format';

export interface FigureLayout {
  frame: Frame;
  patients: PanelLayout;
  events: PanelLayout | null;
  strips: MilestoneLayout[];
  cutoffLabels: { x: number; text: string; anchor: 'start' | 'end' }[];
}

function cutoffLabels(data: FigureData, { cutoffX, size, scale }: Frame): FigureLayout['cutoffLabels'] {
  if (cutoffX === null) return [];
  const on = formatDate(data.cutoff);
  const before = `observed to ${on}`;
  if (size === 'full' && cutoffX - 8 - textWidth(before) >= scale.left) {
    return [
      { x: cutoffX - 7, text: before, anchor: 'end' },
      { x: cutoffX + 7, text: 'forecast', anchor: 'start' },
    ];
  }
  const text = `cut-off ${on}`;
  return cutoffX + textWidth(text) < scale.right
    ? [{ x: cutoffX + 4, text, anchor: 'start' }]
    : [{ x: cutoffX - 4, text, anchor: 'end' }];
}

/** All of the figure's geometry for one width: pure, so that it can be tested and drawn anywhere. */
export function figureLayout(data: FigureData, width: number, compact = false): FigureLayout {
  const frame = figureFrame(data, width, compact);
  const { measures } = frame;
  const unreached = [...data.milestones, ...(data.earlier?.milestones ?? [])].filter(
    (milestone) => !milestone.reachedOn,
  );
  const peaks = unreached.map((milestone) => peakOf(hillOf(milestone)));
  const heightOf = hillScale(peaks, measures.hillPerUnit, measures.hillRoom);
  const names = Object.fromEntries(
    data.milestones.map((milestone) => [milestone.code, nameOf(milestone).toLowerCase()]),
  );
  const taken: Box[] = [];
  const context = { frame, heightOf, taken, names };
  const patients = panelLayout(data, 'randomised', frame.patients, context);
  const events = frame.events ? panelLayout(data, 'events', frame.events, context) : null;
  const strips = frame.strips.flatMap(({ code, y }) => {
    const milestone = data.milestones.find((one) => one.code === code);
    if (!milestone) return [];
    const marks = data.cautionMarks?.[code];
    return [milestoneLayout(milestone, y, { ...context, written: true, marks, earlier: earlierOf(data, milestone) })];
  });
  return { frame, patients, events, strips, cutoffLabels: cutoffLabels(data, frame) };
}
