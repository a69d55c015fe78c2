import Link from 'next/link';
import { ButtonLink } from '@/components/ui/button-link';
import { Mark } from '@/components/ui/mark';
import { type HeadFigure, PageHead } from '@/components/ui/page-head';
import {
  formatCount,
  formatDate,
  formatMonthRange,
  formatPercent,
  formatProbability,
  formatQuantity,
} from '@/lib/format';
import type { Portfolio, PortfolioOrder } from '@/lib/portfolio/schema';

interface PortfolioHeadProps {
  portfolio: Portfolio;
  order: PortfolioOrder;
  isOwner: boolean;
  orderHref: (order: PortfolioOrder) => string;
}

const ORDER_WORDS: Record<PortfolioOrder, string> = {
  late: 'Late ones first',
  date: 'Order by next date',
  code: 'Order by code',
};

function soonestFigure({ soonest }: Portfolio): HeadFigure | undefined {
  const forecast = soonest?.milestone.forecast;
  if (!soonest || !forecast) return undefined;
  const { name, plannedOn } = soonest.milestone;
  const chance = forecast.probabilityByPlanned;
  return {
    label: (
      <>
        <b>Next date</b>, {name}, {soonest.code}
      </>
    ),
    value: formatMonthRange(forecast.quantiles['0.1'], forecast.quantiles['0.9']),
    unit: formatPercent(0.8),
    below: (
      <>
        {forecast.quantiles['0.5'] && `Median ${formatDate(forecast.quantiles['0.5'])}.`}{' '}
        {plannedOn && (
          <>
            <Mark kind="planned" /> Planned {formatDate(plannedOn)}
            {chance !== null && `; ${formatProbability(chance)} chance that it falls by then`}.
          </>
        )}
      </>
    ),
  };
}

function standingWords({ stopped, stale }: Portfolio): string {
  return [
    stopped > 0 && `${formatQuantity(stopped, 'run')} stopped`,
    stale > 0 &&
      (stale === 1 ? 'one study’s data are over 60 days old' : `${stale} studies’ data are over 60 days old`),
  ]
    .filter(Boolean)
    .join('; ');
}

const SMALL = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten', 'Eleven', 'Twelve'];

function titleOf(all: number, forecasts: boolean): string {
  if (all === 0) return 'Studies';
  if (all === 1) return 'Your study';
  return `${SMALL[all] ?? formatCount(all)} studies${forecasts ? ' on one calendar' : ''}`;
}

export function PortfolioHead({ portfolio, order, isOwner, orderHref }: PortfolioHeadProps) {
  const { all, items } = portfolio;
  const forecasts = items.some((study) => study.published);
  const notes = standingWords(portfolio);
  return (
    <PageHead
      path={[{ label: 'Studies' }]}
      title={titleOf(all, forecasts)}
      figure={soonestFigure(portfolio)}
      action={
        (isOwner || forecasts) && (
          <>
            {isOwner && <ButtonLink href="/organisation#set-up">Set up a study</ButtonLink>}
            {forecasts && (
              <p className="text-13 text-ink-soft">
                {order === 'late' &&
                  'Late studies stand first: those whose next milestone is least likely to meet its planned date. '}
                {notes && `${notes.charAt(0).toUpperCase()}${notes.slice(1)}.`}
              </p>
            )}
            {all > 1 && forecasts && (
              <ul className="space-y-1 text-13">
                {(Object.keys(ORDER_WORDS) as PortfolioOrder[])
                  .filter((other) => other !== order)
                  .map((other) => (
                    <li key={other}>
                      <Link href={orderHref(other)}>{ORDER_WORDS[other]}</Link>
                    </li>
                  ))}
              </ul>
            )}
          </>
        )
      }
    />
  );
}
