import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableFoot, TableHead } from '@/components/ui/table';
import type { SiteDifference } from '@/lib/data-cuts/schema';
import { formatCount, formatSigned } from '@/lib/format';

interface ReconciliationProps {
  caption: string;
  rows: readonly SiteDifference[];
  /** Sums under the rows, where the rows are all sites. */
  totals?: boolean;
}

const differenceOf = ({ listed, notLogged, logged }: SiteDifference): number => listed - notLogged - logged;

/** Listing and log side by side. What was randomised in months that are not logged is no difference. */
export function Reconciliation({ caption, rows, totals = false }: ReconciliationProps) {
  const sum = (field: 'listed' | 'logged' | 'notLogged'): number => rows.reduce((total, row) => total + row[field], 0);
  return (
    <Table dense caption={caption}>
      <TableHead>
        <Row>
          <HeadCell>Site</HeadCell>
          <HeadCell num>Listed</HeadCell>
          <HeadCell num>of them in months not logged</HeadCell>
          <HeadCell num>Logged</HeadCell>
          <HeadCell num>Difference</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {rows.map((row) => (
          <Row key={row.site ?? 'study'}>
            <RowHead>{row.site ?? 'The study'}</RowHead>
            <Cell num>{formatCount(row.listed)}</Cell>
            <Cell num>{row.notLogged === 0 ? '' : formatCount(row.notLogged)}</Cell>
            <Cell num>{formatCount(row.logged)}</Cell>
            <Cell num className={differenceOf(row) === 0 ? undefined : 'font-600 text-caution'}>
              {formatSigned(differenceOf(row))}
            </Cell>
          </Row>
        ))}
      </TableBody>
      {totals && (
        <TableFoot>
          <Row>
            <RowHead>Together</RowHead>
            <Cell num>{formatCount(sum('listed'))}</Cell>
            <Cell num>{formatCount(sum('notLogged'))}</Cell>
            <Cell num>{formatCount(sum('logged'))}</Cell>
            <Cell num>{formatSigned(sum('listed') - sum('notLogged') - sum('logged'))}</Cell>
          </Row>
        </TableFoot>
      )}
    </Table>
  );
}
