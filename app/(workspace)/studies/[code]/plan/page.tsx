import type { Metadata } from 'next';
import { NoPermission } from '@/components/shell/no-permission';
import { PlanBoard } from '@/components/studies/plan-board';
import { systemClock } from '@/lib/clock';
import { readStudy } from '@/lib/http/page';
import { getPlan } from '@/lib/studies/queries';

export const metadata: Metadata = { title: 'Plan' };

export default async function PlanPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const read = await readStudy(code, 'plan:read', async (scope, em) => ({
    personId: scope.actor.personId,
    plan: await getPlan(scope, null, { em, clock: systemClock }),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  return <PlanBoard initial={read.data.plan} personId={read.data.personId} />;
}
