import Link from 'next/link';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import type { CutHead } from '@/lib/data-cuts/schema';
import { formatCount, formatDate, formatInstant, formatQuantity } from '@/lib/format';

/** Data cuts, newest first; none of them ever changes. */
export function CutList({ code, cuts }: { code: string; cuts: readonly CutHead[] }) {
  return (
    <Table caption="Data cuts, newest first">
      <TableHead>
        <Row>
          <HeadCell>Cut</HeadCell>
          <HeadCell>Data to</HeadCell>
          <HeadCell>Of</HeadCell>
          <HeadCell num>Subjects</HeadCell>
          <HeadCell num>Events</HeadCell>
          <HeadCell num>Withdrawn</HeadCell>
          <HeadCell num>At risk</HeadCell>
          <HeadCell>Against the log</HeadCell>
          <HeadCell>Accepted</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {cuts.map((cut) => (
          <Row key={cut.number}>
            <RowHead>
              <Link href={`/studies/${code}/data-cuts/${cut.number}`}>Data cut {cut.number}</Link>
            </RowHead>
            <Cell className="whitespace-nowrap">{formatDate(cut.cutoffOn)}</Cell>
            <Cell>{cut.kind === 'subjects' ? 'a listing' : 'totals'}</Cell>
            <Cell num>{formatCount(cut.counts.subjects)}</Cell>
            <Cell num>{formatCount(cut.counts.byStatus.event)}</Cell>
            <Cell num>{formatCount(cut.counts.byStatus.withdrawn)}</Cell>
            <Cell num>{formatCount(cut.counts.byStatus['at-risk'])}</Cell>
            <Cell>{againstLog(cut)}</Cell>
            <Cell>
              {formatInstant(cut.acceptedAt)}
              <SubLine>{cut.acceptedBy}</SubLine>
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

function againstLog({ differences, kind }: CutHead): string {
  if (differences === 0) return 'agrees';
  return kind === 'aggregate'
    ? 'differs, with a note'
    : `differs at ${formatQuantity(differences, 'site')}, with a note`;
}
