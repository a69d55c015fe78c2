import type { Metadata } from 'next';
import { NoPermission } from '@/components/shell/no-permission';
import { SiteListUpload } from '@/components/sites/site-list-upload';
import { PageHead } from '@/components/ui/page-head';
import { readStudy } from '@/lib/http/page';
import { LIST_COLUMNS, MOST_LISTED_SITES } from '@/lib/site-lists/schema';
import { formatCount } from '@/lib/format';

export const metadata: Metadata = { title: 'Upload a site list' };

export default async function UploadSitesPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const read = await readStudy(code, 'sites:change', async () => null);
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  return (
    <>
      <PageHead
        path={[
          { label: code, href: `/studies/${code}` },
          { label: 'Sites', href: `/studies/${code}/sites` },
          { label: 'Upload' },
        ]}
        title="Upload a site list"
        lead={
          <p className="max-w-measure">
            One row for each site, at most {formatCount(MOST_LISTED_SITES)}. The first row names the columns:{' '}
            {LIST_COLUMNS.join(', ')}. The first four are needed, and either the window or the day of activation. Dates
            like 2027-03-14 or 14 Mar 2027, countries by their two letters. You see what would be added before anything
            is stored.
          </p>
        }
      />
      <SiteListUpload code={code} />
    </>
  );
}
