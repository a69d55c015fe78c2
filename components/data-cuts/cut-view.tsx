import Link from 'next/link';
import { Reconciliation } from '@/components/data-cuts/reconciliation';
import { StatusCounts } from '@/components/data-cuts/status-counts';
import { Notice } from '@/components/ui/notice';
import { Section } from '@/components/ui/section';
import type { CutView as Cut } from '@/lib/data-cuts/schema';
import { formatCount, formatDecimal } from '@/lib/format';

/** A data cut as it was accepted: counts, what the log had otherwise, the file and the runs from it. */
export function CutView({ code, cut }: { code: string; cut: Cut }) {
  const href = `/api/v1/studies/${encodeURIComponent(code)}/data-cuts/${cut.number}/file`;
  return (
    <>
      <div className="gap-x-5 md:grid md:grid-cols-2">
        <StatusCounts counts={cut.counts} />
        <dl className="mt-5 grid grid-cols-[auto_1fr] gap-x-5 gap-y-2 self-start md:mt-0">
          {cut.aggregate && (
            <>
              <dt className="text-ink-soft">Time at risk</dt>
              <dd>{formatDecimal(cut.aggregate.personMonths, 1)} months together</dd>
            </>
          )}
          {cut.file && (
            <>
              <dt className="text-ink-soft">File</dt>
              <dd>
                <a href={href}>{cut.file.name}</a>, {formatCount(cut.file.bytes)} bytes
              </dd>
              <dt className="text-ink-soft">SHA-256</dt>
              <dd className="text-13 break-all">{cut.file.sha256}</dd>
            </>
          )}
          <dt className="text-ink-soft">Runs from it</dt>
          <dd>
            {cut.runs.length === 0
              ? 'none yet'
              : cut.runs.map((number, place) => (
                  <span key={number}>
                    {place > 0 && ', '}
                    <Link href={`/studies/${code}/forecasts/${number}`}>{number}</Link>
                  </span>
                ))}
          </dd>
        </dl>
      </div>
      <Section title="Against the site log" aside="As it stood when the cut was accepted">
        {cut.differences.length === 0 ? (
          <p>{cut.kind === 'subjects' ? 'Listing' : 'Totals'} and log agreed.</p>
        ) : (
          <Reconciliation caption="Where the cut and the log differed" rows={cut.differences} />
        )}
        {cut.note && (
          <Notice className="mt-5" title={`Note of ${cut.acceptedBy}`}>
            <p className="whitespace-pre-line">{cut.note}</p>
          </Notice>
        )}
      </Section>
    </>
  );
}
