import type { Metadata } from 'next';
import { NoPermission } from '@/components/shell/no-permission';
import { MonthSheet } from '@/components/site-log/month-sheet';
import { systemClock } from '@/lib/clock';
import { readStudy } from '@/lib/http/page';
import { getMonthSheet } from '@/lib/site-log/queries';

export const metadata: Metadata = { title: 'Month sheet' };

export default async function MonthSheetPage({ params }: { params: Promise<{ code: string; site: string }> }) {
  const { code, site } = await params;
  const read = await readStudy(code, 'site-log:read', async (scope, em) => ({
    personId: scope.actor.personId,
    sheet: await getMonthSheet(scope, { params: { site: site } }, { em, clock: systemClock }),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { personId, sheet } = read.data;
  const path = sheet.mayLog
    ? [{ label: code }, { label: `Site ${sheet.site.code}` }, { label: 'Month sheet' }]
    : [
        { label: code, href: `/studies/${code}` },
        { label: 'Site log', href: `/studies/${code}/log` },
        { label: `Site ${sheet.site.code}` },
      ];
  return <MonthSheet code={code} personId={personId} initial={sheet} path={path} />;
}
