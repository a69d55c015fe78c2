import { SitePlanFigure } from '@/components/charts/site-plan-figure';
import { formatLongMonth } from '@/lib/format';
import type { MonthSheet } from '@/lib/site-log/schema';

/** The site's own enrolment against its plan; a month that is not logged is a gap in the line. */
export function SitePlan({ sheet }: { sheet: MonthSheet }) {
  let cumulative = 0;
  const months = sheet.months.map((entry) => {
    cumulative += entry.randomised ?? 0;
    return { month: entry.month, cumulative: entry.randomised === null ? null : cumulative };
  });
  // The month that is due is not a gap yet.
  if (months.at(-1)?.cumulative === null) months.pop();
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
