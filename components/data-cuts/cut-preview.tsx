import type { ReactNode } from 'react';
import { FaultTable } from '@/components/data-cuts/fault-table';
import { Reconciliation } from '@/components/data-cuts/reconciliation';
import { StatusCounts } from '@/components/data-cuts/status-counts';
import { Disclosure } from '@/components/ui/disclosure';
import { Notice } from '@/components/ui/notice';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { CutPreview as Preview } from '@/lib/data-cuts/schema';
import { formatCount, formatDate, formatQuantity } from '@/lib/format';

interface CutPreviewProps {
  preview: Preview;
  /** The note and the buttons; they follow what has to be known for them. */
  children: ReactNode;
}

/** What the listing holds, what is wrong with it and where the log has otherwise, before anything is stored. */
export function CutPreview({ preview, children }: CutPreviewProps) {
  if (preview.faultCount > 0) {
    return (
      <Section
        title={`${formatQuantity(preview.faultCount, 'thing')} to put right in ${preview.fileName}`}
        aside={`${formatQuantity(preview.rows, 'row')} read; nothing is stored`}
      >
        <Notice tone="stop" live title="The file was not taken">
          Put it right where it comes from, and choose it again. Corrected rows belong in the source, not in a copy.
        </Notice>
        <div className="mt-5">
          <FaultTable faults={preview.faults} faultCount={preview.faultCount} />
        </div>
      </Section>
    );
  }
  const differing = preview.sites.filter((site) => !site.agrees);
  return (
    <Section
      title={`${formatQuantity(preview.counts.subjects, 'subject')} in ${preview.fileName}`}
      aside={`Data to ${formatDate(preview.cutoffOn)}${preview.form === 'adtte' ? ', ADaM columns' : ''}; nothing is stored yet`}
    >
      <div className="gap-x-5 md:grid md:grid-cols-2">
        <StatusCounts counts={preview.counts} />
        <div className="mt-5 md:mt-0">
          <h3>Against the site log</h3>
          {differing.length === 0 ? (
            <p className="mt-1">Listing and log agree at every site, in all months that are logged.</p>
          ) : (
            <>
              <p className="my-1 text-caution">
                They differ at {formatQuantity(differing.length, 'site')} of {formatCount(preview.sites.length)}.
              </p>
              <Reconciliation caption="Sites where listing and log differ" rows={differing} />
            </>
          )}
        </div>
      </div>
      <div className="mt-5">{children}</div>
      <Disclosure title={`Show all ${formatQuantity(preview.sites.length, 'site')}`} className="mt-5">
        <Reconciliation caption="Listing and log at every site" rows={preview.sites} totals />
      </Disclosure>
      <Disclosure title={`Show the first ${formatQuantity(preview.subjects.length, 'row')}`}>
        <Table dense caption="First rows of the listing, as they were read">
          <TableHead>
            <Row>
              <HeadCell>Subject</HeadCell>
              <HeadCell>Site</HeadCell>
              <HeadCell>Randomised on</HeadCell>
              <HeadCell>Status</HeadCell>
              <HeadCell>Status on</HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            {preview.subjects.map((subject) => (
              <Row key={subject.id}>
                <RowHead>{subject.id}</RowHead>
                <Cell>{subject.site}</Cell>
                <Cell>{formatDate(subject.randomisedOn)}</Cell>
                <Cell>{subject.status}</Cell>
                <Cell>{formatDate(subject.statusOn)}</Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </Disclosure>
    </Section>
  );
}
