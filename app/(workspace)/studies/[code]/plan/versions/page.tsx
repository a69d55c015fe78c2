import type { Metadata } from 'next';
import { NoPermission } from '@/components/shell/no-permission';
import { PlanDifferences } from '@/components/studies/plan-differences';
import { VersionChoice } from '@/components/studies/version-choice';
import { VersionList } from '@/components/studies/version-list';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/page-head';
import { Section } from '@/components/ui/section';
import { systemClock } from '@/lib/clock';
import { NotFoundError } from '@/lib/errors';
import { formatInstant, formatQuantity } from '@/lib/format';
import { readStudy } from '@/lib/http/page';
import { comparePlanVersions, getPlan } from '@/lib/studies/queries';
import { comparisonQuery, type PlanComparison } from '@/lib/studies/schema';

export const metadata: Metadata = { title: 'Versions of the plan' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<{ from?: string; to?: string }>;
}

export default async function PlanVersionsPage({ params, searchParams }: Props) {
  const { code } = await params;
  const asked = await searchParams;
  const read = await readStudy(code, 'plan:read', async (scope, em) => {
    const plan = await getPlan(scope, null, { em, clock: systemClock });
    const latest = plan.current?.number ?? 0;
    const query = comparisonQuery.safeParse({
      from: asked.from ?? Math.max(1, latest - 1),
      to: asked.to ?? Math.max(1, latest),
    });
    const comparison =
      query.success && latest > 1
        ? await comparePlanVersions(scope, { query: query.data }, { em }).catch(refusal)
        : query.success
          ? null
          : 'Versions go by their numbers, from 1 up.';
    return { plan, comparison };
  });
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { plan, comparison } = read.data;
  const home = `/studies/${encodeURIComponent(code)}`;
  return (
    <>
      <PageHead
        path={[{ label: code, href: home }, { label: 'Plan', href: `${home}/plan` }, { label: 'Versions' }]}
        title="Versions of the plan"
        lead={
          plan.current
            ? `${formatQuantity(plan.current.number, 'version')}. None of them changes any more; forecasts name the one that they ran on.`
            : undefined
        }
      />
      {plan.versions.length === 0 ? (
        <EmptyState title="No version is saved yet">
          The plan is a draft until it is saved for the first time.
        </EmptyState>
      ) : (
        <>
          {plan.versions.length > 1 && (
            <Section title="What changed">
              <VersionChoice versions={plan.versions} comparison={isComparison(comparison) ? comparison : null} />
              {isComparison(comparison) ? <Comparison comparison={comparison} /> : <Refused words={comparison} />}
            </Section>
          )}
          <Section title="All versions" aside="Newest first">
            <VersionList versions={plan.versions} />
          </Section>
        </>
      )}
    </>
  );
}

function refusal(error: unknown): string {
  if (error instanceof NotFoundError) return error.message;
  throw error;
}

function isComparison(comparison: PlanComparison | string | null): comparison is PlanComparison {
  return comparison !== null && typeof comparison !== 'string';
}

function Refused({ words }: { words: string | null }) {
  return words ? (
    <Notice tone="stop" title="Not compared">
      {words}
    </Notice>
  ) : null;
}

function Comparison({ comparison: { from, to, differences } }: { comparison: PlanComparison }) {
  if (differences.length === 0) return <p className="mt-5">The two say the same.</p>;
  return (
    <div className="mt-5">
      <PlanDifferences
        differences={differences}
        caption={`${formatQuantity(differences.length, 'field')} differ${differences.length === 1 ? 's' : ''}. Version ${to.number} was saved ${formatInstant(to.createdAt)} UTC by ${to.createdBy}.`}
        old={`Version ${from.number}`}
        now={`Version ${to.number}`}
      />
    </div>
  );
}
