import type { Metadata } from 'next';
import { AlertBoard } from '@/components/alerts/alert-board';
import { SentAlerts } from '@/components/alerts/sent-alerts';
import { NoPermission } from '@/components/shell/no-permission';
import { PageHead } from '@/components/ui/page-head';
import { listAlertRules, listSentAlerts } from '@/lib/alerts/queries';
import { sentAlertsQuery } from '@/lib/alerts/schema';
import { readStudy } from '@/lib/http/page';

export const metadata: Metadata = { title: 'Alerts' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function AlertsPage({ params, searchParams }: Props) {
  const { code } = await params;
  const asked = sentAlertsQuery.pick({ page: true }).safeParse({ page: (await searchParams).page });
  const query = sentAlertsQuery.parse(asked.success ? asked.data : {});
  const read = await readStudy(code, 'alerts:read', async (scope, em) => ({
    rules: await listAlertRules(scope, null, { em }),
    sent: await listSentAlerts(scope, { query }, { em }),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { rules, sent } = read.data;
  return (
    <>
      <PageHead
        path={[{ label: code, href: `/studies/${code}` }, { label: 'Alerts' }]}
        title="Alerts"
        lead="Rules look at what is published, and at nothing else. Each speaks once, and again only after what it said has stopped being so."
      />
      <AlertBoard code={code} initial={rules} />
      <SentAlerts {...sent} />
    </>
  );
}
