import Link from 'next/link';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatDate, formatDateRange, formatInstant, formatPercent } from '@/lib/format';
import { type FirstMilestone, type Run, RUN_STATUS_NAMES } from '@/lib/forecasts/schema';

function rangeOf({ reachedOn, low, high }: FirstMilestone): string {
  if (reachedOn) return `Reached ${formatDate(reachedOn)}`;
  return low === null ? 'Not reached' : formatDateRange(low, high);
}

/** Runs, newest first; each stays as it was. */
export function RunList({ code, runs }: { code: string; runs: readonly Run[] }) {
  return (
    <Table caption="Forecast runs, newest first">
      <TableHead>
        <Row>
          <HeadCell>Run</HeadCell>
          <HeadCell>Data to</HeadCell>
          <HeadCell>First milestone, {formatPercent(0.8)}</HeadCell>
          <HeadCell>Median</HeadCell>
          <HeadCell>Asked for</HeadCell>
          <HeadCell>State</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {runs.map((run) => (
          <Row key={run.number}>
            <RowHead>
              <Link href={`/studies/${code}/forecasts/${run.number}`}>Run {run.number}</Link>
            </RowHead>
            <Cell className="whitespace-nowrap">{formatDate(run.cutoffOn)}</Cell>
            <Cell>
              {run.first && (
                <>
                  <b>{rangeOf(run.first)}</b>
                  <SubLine>{run.first.name}</SubLine>
                </>
              )}
            </Cell>
            <Cell className="whitespace-nowrap">
              {run.first?.median && !run.first.reachedOn ? formatDate(run.first.median) : ''}
            </Cell>
            <Cell>
              {formatInstant(run.requestedAt)}
              <SubLine>{run.requestedBy}</SubLine>
            </Cell>
            <Cell>{run.publication === null ? RUN_STATUS_NAMES[run.status] : `published as ${run.publication}`}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
