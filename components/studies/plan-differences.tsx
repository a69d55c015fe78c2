import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { PlanDifference } from '@/lib/studies/schema';

interface PlanDifferencesProps {
  differences: readonly PlanDifference[];
  caption: string;
  /** What the two columns are. */
  old: string;
  now: string;
}

/** Field by field, old beside new. */
export function PlanDifferences({ differences, caption, old, now }: PlanDifferencesProps) {
  return (
    <Table dense caption={caption} captionShown>
      <TableHead>
        <Row>
          <HeadCell>What</HeadCell>
          <HeadCell>{old}</HeadCell>
          <HeadCell>{now}</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {differences.map((difference) => (
          <Row key={difference.field}>
            <RowHead>{difference.label}</RowHead>
            <Cell className="text-ink-soft">{difference.old}</Cell>
            <Cell className="font-600">{difference.new}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
