import { Fragment } from 'react';
import { StripAxisHead } from '@/components/charts/bracket-strip';
import { stripAxisOf } from '@/components/charts/strip-axis';
import { PortfolioRow } from '@/components/studies/portfolio-row';
import { formatPercent } from '@/lib/format';
import type { PortfolioStudy, Standing } from '@/lib/portfolio/schema';

const GROUPS: Record<Standing, [title: string, rest: string]> = {
  late: ['Late', `under ${formatPercent(0.2)} chance of the next planned date`],
  'in-doubt': ['In doubt', `20 to ${formatPercent(0.6)}`],
  'on-plan': ['On plan', `over ${formatPercent(0.6)}`],
  undated: ['No planned date ahead', ''],
  'no-forecast': ['No forecast published', ''],
  'no-view': ['Without forecasts', 'your role sees none here'],
};

interface PortfolioBoardProps {
  studies: readonly PortfolioStudy[];
  today: string;
  /** Under headings by standing; other orders are one list. */
  grouped: boolean;
}

/** One row per study under one time axis, whose rules run unbroken from row to row. */
export function PortfolioBoard({ studies, today, grouped }: PortfolioBoardProps) {
  const axis = stripAxisOf(
    studies.map((study) => study.milestones),
    today,
  );
  const drawn = studies.some((study) => study.milestones.length > 0);
  return (
    <table className="w-full border-collapse max-md:block max-md:[&>tbody]:block max-md:[&>thead]:hidden">
      <caption className="sr-only">Studies, each milestone as the range that holds 80 % of its forecast</caption>
      <thead className="sticky top-0 z-10 bg-paper">
        <tr className="text-left text-13 text-ink-soft">
          <th scope="col" className="w-[264px] border-b border-rule-strong pb-2 align-bottom">
            Study
          </th>
          <th scope="col" className="relative border-b border-rule-strong p-0 align-bottom">
            {drawn ? <StripAxisHead axis={axis} today={today} /> : <span className="sr-only">Milestones</span>}
          </th>
          <th scope="col" className="w-[140px] border-b border-rule-strong pb-2 pl-4 text-right align-bottom">
            {drawn && 'Chance of next planned date'}
          </th>
        </tr>
      </thead>
      <tbody>
        {studies.map((study, place) => {
          const [title, rest] = GROUPS[study.standing];
          const opens = grouped && study.standing !== studies[place - 1]?.standing;
          return (
            <Fragment key={`${study.organisationName}/${study.code}`}>
              {opens && (drawn || place > 0) && (
                <tr className="max-md:block">
                  <th colSpan={3} scope="rowgroup" className="border-b border-ink pt-5 pb-1.5 text-left max-md:block">
                    {title} <span className="font-400 text-ink-soft">{rest}</span>
                  </th>
                </tr>
              )}
              <PortfolioRow study={study} axis={axis} today={today} />
            </Fragment>
          );
        })}
      </tbody>
    </table>
  );
}
