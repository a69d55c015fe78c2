import type { FigureData } from '@/components/charts/figure-data';
import { hasEvents } from '@/components/charts/figure-data';
import { Mark } from '@/components/ui/mark';
import { formatPercent } from '@/lib/format';

/** How to read the figure, in words. */
export function FigureLegend({ data }: { data: FigureData }) {
  const planned = data.plan !== undefined || data.milestones.some((milestone) => milestone.plannedOn);
  return (
    <figcaption className="mt-2 flex flex-wrap gap-x-5 gap-y-1 text-13 text-ink-soft">
      {data.observed.length > 0 && (
        <span>{hasEvents(data) ? 'Heavy and double lines: observed.' : 'Heavy line: observed.'}</span>
      )}
      <span>
        Dark band {formatPercent(0.5)}, light band {formatPercent(0.8)}, dotted edge {formatPercent(0.95)}.
      </span>
      <span>A hill on a line is the distribution of its date; the bracket under it holds {formatPercent(0.8)}.</span>
      {planned && (
        <span>
          <Mark kind="planned" /> planned{data.plan ? ', as are dashes' : ''}
        </span>
      )}
      {data.earlier && <span>Dashed outline: {data.earlier.label}.</span>}
    </figcaption>
  );
}
