import type { Metadata } from 'next';
import { CutList } from '@/components/data-cuts/cut-list';
import { NoPermission } from '@/components/shell/no-permission';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { Pagination } from '@/components/ui/pagination';
import { listCuts } from '@/lib/data-cuts/queries';
import { formatDate, formatQuantity } from '@/lib/format';
import { pageQuery } from '@/lib/http/params';
import { readStudy } from '@/lib/http/page';

export const metadata: Metadata = { title: 'Data cuts' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function DataCutsPage({ params, searchParams }: Props) {
  const { code } = await params;
  const asked = pageQuery.safeParse({ page: (await searchParams).page });
  const query = asked.success ? asked.data : pageQuery.parse({});
  const read = await readStudy(code, 'data-cuts:read', async (scope, em) => ({
    cuts: await listCuts(scope, { query }, { em }),
    latest: (await listCuts(scope, { query: { page: 1, size: 1 } }, { em })).items[0],
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { cuts, latest } = read.data;
  const home = `/studies/${code}/data-cuts`;
  const upload = <ButtonLink href={`${home}/upload`}>Upload a data cut</ButtonLink>;
  return (
    <>
      <PageHead
        path={[{ label: code, href: `/studies/${code}` }, { label: 'Data cuts' }]}
        title="Data cuts"
        figure={
          latest && {
            label: (
              <>
                <b>Newest data cut</b>, number {latest.number}
              </>
            ),
            value: formatDate(latest.cutoffOn),
            below: (
              <p>
                {formatQuantity(latest.counts.subjects, 'subject')},{' '}
                {formatQuantity(latest.counts.byStatus.event, 'event')}
              </p>
            ),
          }
        }
        action={latest && upload}
      />
      {latest ? (
        <>
          <CutList code={code} cuts={cuts.items} />
          <Pagination
            page={cuts.page}
            pageSize={cuts.size}
            total={cuts.total}
            things="data cuts"
            hrefOf={(page) => `${home}?page=${page}`}
          />
        </>
      ) : (
        <EmptyState title="No data cut yet" action={upload}>
          A data cut says who was randomised and what became of them, up to a day. Without one a forecast knows nothing
          of events.
        </EmptyState>
      )}
    </>
  );
}
