import Link from 'next/link';
import { Pagination } from '@/components/ui/pagination';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatDate } from '@/lib/format';
import type { PublicationLine } from '@/lib/publications/queries';

interface Props {
  code: string;
  lines: PublicationLine[];
  total: number;
  page: number;
  pageSize: number;
  /** The one on show. */
  shown: number;
}

/** Every publication stays readable as it was published. */
export function PublicationList({ code, lines, total, page, pageSize, shown }: Props) {
  const home = `/studies/${encodeURIComponent(code)}/timeline`;
  return (
    <Section id="publications" title="All publications" aside="Each as it was published; the newest stands">
      <Table caption="Publications of the study, newest first">
        <TableHead>
          <Row>
            <HeadCell>Publication</HeadCell>
            <HeadCell>Published</HeadCell>
            <HeadCell>Data to</HeadCell>
            <HeadCell>By</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {lines.map(({ number, publishedOn, dataCutoff, publishedBy }) => (
            <Row key={number}>
              <RowHead className="whitespace-nowrap">
                {number === shown ? (
                  <b>No. {number}, on show</b>
                ) : (
                  <Link href={number === total ? home : `${home}/${number}`}>No. {number}</Link>
                )}
              </RowHead>
              <Cell className="whitespace-nowrap">{formatDate(publishedOn)}</Cell>
              <Cell className="whitespace-nowrap">{formatDate(dataCutoff)}</Cell>
              <Cell>{publishedBy}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <Pagination
        page={page}
        pageSize={pageSize}
        total={total}
        things="publications"
        hrefOf={(to) => `?page=${to}#publications`}
      />
    </Section>
  );
}
