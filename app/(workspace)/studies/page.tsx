import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { PageFrame } from '@/components/shell/page-frame';
import { PortfolioBoard } from '@/components/studies/portfolio-board';
import { PortfolioFind } from '@/components/studies/portfolio-find';
import { PortfolioHead } from '@/components/studies/portfolio-head';
import { PortfolioNumbers } from '@/components/studies/portfolio-numbers';
import { EmptyState } from '@/components/ui/empty-state';
import { Pagination } from '@/components/ui/pagination';
import { ButtonLink } from '@/components/ui/button-link';
import { systemClock } from '@/lib/clock';
import { transact } from '@/lib/db/transaction';
import { pageActor } from '@/lib/http/page';
import { getPersonHead, listStudies } from '@/lib/portfolio/queries';
import { portfolioQuery } from '@/lib/portfolio/schema';

export const metadata: Metadata = { title: 'Studies' };

type Search = Record<string, string | string[] | undefined>;

export default async function StudiesPage({ searchParams }: { searchParams: Promise<Search> }) {
  const actor = await pageActor();
  const typed = Object.fromEntries(
    Object.entries(await searchParams).filter(([, value]) => typeof value === 'string' && value !== ''),
  );
  const parsed = portfolioQuery.safeParse(typed);
  const query = parsed.success ? parsed.data : portfolioQuery.parse({});
  const { portfolio, head } = await transact({ personId: actor.personId }, async (em) => ({
    portfolio: await listStudies({ actor }, { query }, { em, clock: systemClock }),
    head: await getPersonHead({ actor }, em),
  }));
  const { items, page, size, total, all } = portfolio;
  // A coordinator of one site has nothing to choose from: their work is the month sheet.
  if (!head.hasList && items[0]) redirect(`/studies/${encodeURIComponent(items[0].code)}/log`);
  const hrefOf = (changed: Record<string, string>): string =>
    `?${new URLSearchParams({ ...query, page: '1', ...changed })}`;
  const shown = items.some((study) => study.published);
  return (
    <PageFrame forecast={shown} demonstration={items.some((study) => study.isDemonstration)}>
      <PortfolioHead
        portfolio={portfolio}
        order={query.order}
        isOwner={head.isOwner}
        orderHref={(order) => hrefOf({ order })}
      />
      {all > 1 && <PortfolioFind query={query} legend={items.some((study) => study.milestones.length > 0)} />}
      {all === 0 && (
        <EmptyState
          title="No study yet is yours"
          action={head.isOwner && <ButtonLink href="/organisation">Set up a study</ButtonLink>}
        >
          {head.isOwner
            ? 'Set one up, then invite its protocol statistician.'
            : 'When somebody gives you a role in a study, it stands here. Ask the study’s manager or your organisation’s owner.'}
        </EmptyState>
      )}
      {all > 0 && total === 0 && (
        <EmptyState title="No study matches">
          Nothing of yours has “{query.search}” in its code, title or sponsor. Try fewer letters.
        </EmptyState>
      )}
      {items.length > 0 && (
        <>
          <PortfolioBoard studies={items} today={portfolio.today} grouped={query.order === 'late'} />
          <Pagination
            page={page}
            pageSize={size}
            total={total}
            things="studies"
            hrefOf={(to) => hrefOf({ page: String(to) })}
          />
          <PortfolioNumbers studies={items} />
        </>
      )}
    </PageFrame>
  );
}
