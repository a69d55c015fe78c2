import Link from 'next/link';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatInstant } from '@/lib/format';
import { PLAN_REASON_NAMES, type PlanVersionHead } from '@/lib/studies/schema';

/** Who saved each version, when and why. */
export function VersionList({ versions }: { versions: readonly PlanVersionHead[] }) {
  return (
    <Table caption="Versions of the plan">
      <TableHead>
        <Row>
          <HeadCell>Version</HeadCell>
          <HeadCell>Saved</HeadCell>
          <HeadCell>By</HeadCell>
          <HeadCell>Why</HeadCell>
          <HeadCell>
            <span className="sr-only">Compare</span>
          </HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {versions.map(({ number, createdAt, createdBy, reasonKind, reason }) => (
          <Row key={number}>
            <RowHead className="font-title text-18">{number}</RowHead>
            <Cell className="whitespace-nowrap">{formatInstant(createdAt)} UTC</Cell>
            <Cell>{createdBy}</Cell>
            <Cell>
              {reasonKind && <b>{PLAN_REASON_NAMES[reasonKind]}</b>}
              {reasonKind && reason && ': '}
              {reason}
              {!reasonKind && !reason && <span className="text-ink-soft">before the first run</span>}
            </Cell>
            <Cell>{number > 1 && <Link href={`?from=${number - 1}&to=${number}`}>What it changed</Link>}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
