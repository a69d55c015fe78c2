import type { ReactNode } from 'react';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { countryName } from '@/lib/countries';
import { formatCount, formatDate, formatDateRange, formatQuantity } from '@/lib/format';
import type { SitePreview } from '@/lib/site-lists/schema';

const day = (date: string | null): string => (date === null ? '' : formatDate(date));

/** What the list would add, before anything is stored. */
export function SiteListPreview({ preview, children }: { preview: SitePreview; children: ReactNode }) {
  const rest = preview.total - preview.rows.length;
  return (
    <Section title={`${formatQuantity(preview.total, 'site')} in ${preview.fileName}`} aside="Nothing is stored yet">
      <p>
        {formatCount(preview.open)} open, {formatCount(preview.toOpen)} to open, in{' '}
        {preview.countries.map(countryName).join(', ')}.
      </p>
      <div className="my-5 flex flex-wrap gap-3">{children}</div>
      <Table dense caption="Sites in the file">
        <TableHead>
          <Row>
            <HeadCell>Code</HeadCell>
            <HeadCell>Name</HeadCell>
            <HeadCell>City</HeadCell>
            <HeadCell>Country</HeadCell>
            <HeadCell>Planned window</HeadCell>
            <HeadCell>Activated</HeadCell>
            <HeadCell>Closed</HeadCell>
            <HeadCell num>Cap</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {preview.rows.map((site) => (
            <Row key={site.code}>
              <RowHead>{site.code}</RowHead>
              <Cell>{site.name}</Cell>
              <Cell>{site.city}</Cell>
              <Cell>{countryName(site.country)}</Cell>
              <Cell>
                {site.plannedEarliest &&
                  site.plannedLatest &&
                  `${formatDateRange(site.plannedEarliest, site.plannedLatest)}, likely ${day(site.plannedLikely)}`}
              </Cell>
              <Cell>{day(site.activatedOn)}</Cell>
              <Cell>{day(site.closedOn)}</Cell>
              <Cell num>{site.cap ?? ''}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      {rest > 0 && <p className="mt-2 text-13 text-ink-soft">And {formatQuantity(rest, 'more site', 'more sites')}.</p>}
    </Section>
  );
}
