import { SitePlanFigure } from '@/components/charts/site-plan-figure';
import type { SiteMonth } from '@/components/charts/site-plan-layout';
import { formatLongMonth } from '@/lib/format';
import type { MonthSheet } from '@/lib/site-log/schema';

/** Randomised since opening at each month's end; null is a gap. The month that is due is none yet, and is left out. */
function randomisedSoFar({ months }: MonthSheet): SiteMonth[] {
  let cumulative = 0;
  const points = months.map((entry) => {
    cumulative += entry.randomised ?? 0;
    return { month: entry.month, cumulative: entry.randomised === null ? null : cumulative };
  });
  return points.at(-1)?.cumulative === null ? points.slice(0, -1) : points;
}

/** The site's own enrolment against its plan; a month that is not logged is a gap in the line. */
export function SitePlan({ sheet }: { sheet: MonthSheet }) {
  const months = randomisedSoFar(sheet);
  const gaps = months.filter((entry) => entry.cumulative === null).map((entry) => formatLongMonth(entry.month));
  if (months.length === 0) return null;
  return (
    <section>
      <h3>{sheet.mayLog ? 'Your site' : 'The site'} against its plan</h3>
      <div className="mt-2">
        <SitePlanFigure
          months={months}
          plan={sheet.planned.map((point) => ({ month: point.monthEnd.slice(0, 7), cumulative: point.randomised }))}
          cap={sheet.site.cap}
        />
      </div>
      {gaps.length > 0 && (
        <p className="mt-1 text-13 text-ink-soft">
          {gaps.length === 1
            ? `${gaps[0]} is a gap, not a flat line.`
            : `${gaps.length} months are gaps, not a flat line.`}
        </p>
      )}
    </section>
  );
}
