import Link from 'next/link';
import { BracketStrip } from '@/components/charts/bracket-strip';
import type { StripAxis } from '@/components/charts/strip-axis';
import { joinClasses } from '@/components/ui/join-classes';
import { daysApart } from '@/lib/dates';
import { formatCount, formatDate, formatProbability, formatQuantity } from '@/lib/format';
import { isStale } from '@/lib/portfolio/rules';
import type { PortfolioStudy } from '@/lib/portfolio/schema';

interface PortfolioRowProps {
  study: PortfolioStudy;
  axis: StripAxis;
  today: string;
}

const CELL = 'border-b border-rule align-top max-md:block max-md:border-0';

export function PortfolioRow({ study, axis, today }: PortfolioRowProps) {
  return (
    <tr className="max-md:block max-md:border-b max-md:border-rule max-md:pb-3">
      <th scope="row" className={joinClasses(CELL, 'py-3 pr-4 text-left font-400')}>
        <Link
          href={`/studies/${encodeURIComponent(study.code)}`}
          className="font-title text-18 font-500 no-underline hover:underline"
        >
          {study.code}
        </Link>
        <span className="block text-13">{study.title}</span>
        <StudyLines study={study} today={today} />
      </th>
      <td className={joinClasses(CELL, 'relative pt-2.5')}>
        {study.milestones.length > 0 && <BracketStrip axis={axis} today={today} milestones={study.milestones} />}
        {study.site && <SiteLine study={study} />}
        {study.role === 'owner' && <OwnerLine study={study} />}
      </td>
      <td className={joinClasses(CELL, 'pt-2.5 pb-3 md:pl-4 md:text-right')}>
        <Chance study={study} />
      </td>
    </tr>
  );
}

function countWords({ counts }: PortfolioStudy): string | null {
  if (!counts) return null;
  const words = ({ reached, of }: { reached: number; of: number | null }, things: string): string =>
    of !== null && reached >= of
      ? `all ${formatCount(of)} ${things}`
      : `${formatCount(reached)}${of === null ? '' : ` of ${formatCount(of)}`} ${things}`;
  const both = [words(counts.randomised, 'patients'), counts.events && words(counts.events, 'events')]
    .filter(Boolean)
    .join(', ');
  return both.charAt(0).toUpperCase() + both.slice(1);
}

function StudyLines({ study, today }: { study: PortfolioStudy; today: string }) {
  const { published, run, planSavedOn } = study;
  const counts = countWords(study);
  const stale = published && isStale(published.dataCutoff, today);
  return (
    <span className="block text-13 text-ink-soft">
      {counts && <span className="block">{counts}</span>}
      {published && (
        <span className={joinClasses('block', stale && 'text-caution')}>
          Data to {formatDate(published.dataCutoff)}
          {stale ? `: ${daysApart(published.dataCutoff, today)} days old` : `, published ${formatDate(published.on)}`}
        </span>
      )}
      {published && published.cautions > 0 && (
        <Link href={`/studies/${encodeURIComponent(study.code)}/timeline`} className="block text-caution">
          {formatQuantity(published.cautions, 'caution')}
        </Link>
      )}
      {run && run.status !== 'failed' && <span className="block">Run {run.number} not published</span>}
      {!published && planSavedOn && <span className="block">Plan saved {formatDate(planSavedOn)}</span>}
    </span>
  );
}

function SiteLine({ study }: { study: PortfolioStudy }) {
  const { site } = study;
  if (!site) return null;
  return (
    <p className="py-1">
      Site {site.code}, {site.name}, {site.city}.{' '}
      <Link href={`/studies/${encodeURIComponent(study.code)}/log`}>Open the month sheet</Link>
      {site.monthsDue > 0 && <span className="text-caution">, {formatQuantity(site.monthsDue, 'month')} due</span>}
    </p>
  );
}

function OwnerLine({ study }: { study: PortfolioStudy }) {
  const home = `/studies/${encodeURIComponent(study.code)}`;
  return (
    <p className="py-1">
      For {study.sponsorName}. <Link href={`${home}/people`}>People</Link> · <Link href={`${home}/audit`}>Audit</Link>
    </p>
  );
}

function Chance({ study }: { study: PortfolioStudy }) {
  const { next, run, standing } = study;
  if (run?.status === 'failed') {
    return (
      <>
        <span className="block font-600 text-stop">Stopped</span>
        <span className="block text-13 text-ink-soft">
          Run {run.number}
          {run.reason && `: ${run.reason}`}{' '}
          <Link href={`/studies/${encodeURIComponent(study.code)}/forecasts/${run.number}`}>See why</Link>
        </span>
      </>
    );
  }
  if (next) {
    return (
      <>
        <span className="block font-title text-24">{formatProbability(next.probability)}</span>
        <span className="block text-13 text-ink-soft">
          {next.name} by {formatDate(next.plannedOn)}
        </span>
      </>
    );
  }
  if (standing !== 'no-forecast') return null;
  return (
    <>
      <span aria-hidden="true" className="block">
        –
      </span>
      <span className="block text-13 text-ink-soft">nothing published yet</span>
    </>
  );
}
