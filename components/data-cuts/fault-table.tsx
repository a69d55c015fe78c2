import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatCount } from '@/lib/format';
import type { ListingFault } from '@/lib/subject-listings/schema';

interface FaultTableProps {
  faults: readonly ListingFault[];
  faultCount: number;
}

/** Every fault with where it stands, what stands there and what would be right. */
export function FaultTable({ faults, faultCount }: FaultTableProps) {
  const rest = faultCount - faults.length;
  return (
    <>
      <Table dense caption="Faults of the listing">
        <TableHead>
          <Row>
            <HeadCell num>Row</HeadCell>
            <HeadCell>Column</HeadCell>
            <HeadCell>Stands there</HeadCell>
            <HeadCell>What is wrong, and what would be right</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {faults.map(({ row, column, value, detail }) => (
            <Row key={`${row} ${column} ${detail}`}>
              <RowHead num>{formatCount(row)}</RowHead>
              <Cell className="whitespace-nowrap">{column ?? 'the whole row'}</Cell>
              <Cell className="break-all">{value === '' ? 'nothing' : value}</Cell>
              <Cell>{detail}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      {rest > 0 && <p className="mt-2 text-13 text-ink-soft">And {formatCount(rest)} more of these.</p>}
    </>
  );
}
