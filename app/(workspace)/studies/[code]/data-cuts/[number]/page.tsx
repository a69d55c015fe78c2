import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { CutView } from '@/components/data-cuts/cut-view';
import { NoPermission } from '@/components/shell/no-permission';
import { ButtonLink } from '@/components/ui/button-link';
import { PageHead } from '@/components/ui/page-head';
import { getCut } from '@/lib/data-cuts/queries';
import { cutParams } from '@/lib/data-cuts/schema';
import { formatInstant, formatLongDate } from '@/lib/format';
import { readStudy } from '@/lib/http/page';

interface Props {
  params: Promise<{ code: string; number: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Data cut ${(await params).number}` };
}

export default async function DataCutPage({ params }: Props) {
  const asked = cutParams.safeParse(await params);
  if (!asked.success) notFound();
  const { code, number } = asked.data;
  const read = await readStudy(code, 'data-cuts:read', (scope, em) => getCut(scope, { params: { number } }, { em }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const cut = read.data;
  return (
    <>
      <PageHead
        path={[
          { label: code, href: `/studies/${code}` },
          { label: 'Data cuts', href: `/studies/${code}/data-cuts` },
          { label: `Data cut ${number}` },
        ]}
        title={`Data to ${formatLongDate(cut.cutoffOn)}`}
        lead={
          <p>
            Data cut {number}, accepted {formatInstant(cut.acceptedAt)} by {cut.acceptedBy}. It stays as it is; a better
            listing is another cut.
          </p>
        }
        action={<ButtonLink href={`/studies/${code}/forecasts/new?cut=${number}`}>Run a forecast</ButtonLink>}
      />
      <CutView code={code} cut={cut} />
    </>
  );
}
