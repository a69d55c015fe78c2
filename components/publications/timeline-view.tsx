import Link from 'next/link';
import { ForecastFigure } from '@/components/charts/forecast-figure';
import { NumbersTable } from '@/components/charts/numbers-table';
import { PublicationList } from '@/components/publications/publication-list';
import { QuoteSentences } from '@/components/publications/quote-sentences';
import { TimelineCautions } from '@/components/publications/timeline-cautions';
import { TimelineEntries } from '@/components/publications/timeline-entries';
import { TimelineHistory } from '@/components/publications/timeline-history';
import { Notice } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/page-head';
import { Section } from '@/components/ui/section';
import { formatDate, formatQuantity } from '@/lib/format';
import type { Timeline } from '@/lib/publications/queries';
import { cautionMarksOf, inOrderOfTime, quotation, STALE_AFTER_DAYS } from '@/lib/publications/rules';

interface Props {
  code: string;
  timeline: Timeline;
  page: number;
  pageSize: number;
  mayAcknowledge: boolean;
}

/** One publication as its readers see it: dates first, cautions beside them, then figure, history and the words to quote. */
export function TimelineView({ code, timeline, page, pageSize, mayAcknowledge }: Props) {
  const { publication, dataAge } = timeline;
  const { content, number, publishedBy, supersededBy } = publication;
  const publishedOn = publication.publishedAt.slice(0, 10);
  const home = `/studies/${encodeURIComponent(code)}`;
  const { randomised, events } = content.observed;
  const seen = [
    `${formatQuantity(randomised, 'patient')} randomised`,
    ...(events === null ? [] : [formatQuantity(events, 'event')]),
  ];
  return (
    <>
      <div className="md:grid md:grid-cols-[minmax(0,1fr)_288px] md:gap-x-8">
        <div>
          <PageHead
            path={[
              { label: code, href: home },
              { label: 'Timeline', href: `${home}/timeline` },
              { label: formatDate(publishedOn) },
            ]}
            title={content.study.title}
            lead={`Publication ${number}, ${formatDate(publishedOn)}, by ${publishedBy}, protocol statistician. Data to ${formatDate(content.dataCutoff)}.`}
          />
          {supersededBy && (
            <Notice tone="caution" title="Superseded" className="mb-5">
              Publication {supersededBy.number} of {formatDate(supersededBy.publishedAt.slice(0, 10))} has taken its
              place. <Link href={`${home}/timeline`}>Open the one that stands</Link>.
            </Notice>
          )}
          {!supersededBy && dataAge > STALE_AFTER_DAYS && (
            <Notice tone="caution" title={`Data are ${formatQuantity(dataAge, 'day')} old.`} className="mb-5">
              The last data are of {formatDate(content.dataCutoff)}. What has happened since is not in this forecast.
            </Notice>
          )}
          <TimelineEntries publication={publication} previous={timeline.previous} />
        </div>
        <div className="-mx-4 mt-5 md:col-start-2 md:row-span-2 md:row-start-1 md:mx-0 md:mt-5">
          <TimelineCautions code={code} publication={publication} mayAcknowledge={mayAcknowledge} />
        </div>
        <section className="mt-5">
          <h2>The statistician’s note</h2>
          <p className="my-2 max-w-[58ch] font-title text-18 whitespace-pre-line">{publication.note}</p>
          <p className="text-13 text-ink-soft">
            {publishedBy}, {formatDate(publishedOn)}
          </p>
        </section>
      </div>
      <Section
        title={events === null ? 'Patients' : 'Patients and events'}
        aside={`${seen.join(', ')} by ${formatDate(content.dataCutoff)}`}
      >
        <ForecastFigure
          cutoff={content.dataCutoff}
          observed={content.observedMonthly.map(({ monthEnd, ...counts }) => ({ on: monthEnd, ...counts }))}
          monthly={content.monthly}
          milestones={content.milestones}
          cautionMarks={cautionMarksOf(content)}
        />
        <NumbersTable monthly={content.monthly} />
      </Section>
      <TimelineHistory {...timeline} />
      <Section title="A sentence to quote" aside="Each with its range, its source and what it is">
        <QuoteSentences
          sentences={inOrderOfTime(content.milestones).map((milestone) => ({
            code: milestone.code,
            text: quotation({ number, publishedOn, content }, milestone),
          }))}
        />
      </Section>
      <PublicationList
        code={code}
        lines={timeline.lines}
        total={timeline.total}
        page={page}
        pageSize={pageSize}
        shown={number}
      />
    </>
  );
}
