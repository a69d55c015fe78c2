import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableFoot, TableHead } from '@/components/ui/table';
import type { CutCounts } from '@/lib/data-cuts/schema';
import { formatCount } from '@/lib/format';
import { SUBJECT_STATUSES } from '@/lib/subject-listings/schema';

const WORDS: Record<(typeof SUBJECT_STATUSES)[number], string> = {
  event: 'Event',
  'event-pending': 'Event that awaits adjudication',
  withdrawn: 'Withdrawn or lost to follow-up',
  completed: 'Completed follow-up without event',
  'at-risk': 'At risk',
};

/** Subjects by what became of them; pooled, whatever they were given. */
export function StatusCounts({ counts }: { counts: CutCounts }) {
  return (
    <Table caption="Subjects by status">
      <TableHead>
        <Row>
          <HeadCell>Status at the cut-off</HeadCell>
          <HeadCell num>Subjects</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {SUBJECT_STATUSES.filter((status) => counts.byStatus[status] > 0).map((status) => (
          <Row key={status}>
            <RowHead>{WORDS[status]}</RowHead>
            <Cell num>{formatCount(counts.byStatus[status])}</Cell>
          </Row>
        ))}
      </TableBody>
      <TableFoot>
        <Row>
          <RowHead>Together</RowHead>
          <Cell num>{formatCount(counts.subjects)}</Cell>
        </Row>
      </TableFoot>
    </Table>
  );
}
