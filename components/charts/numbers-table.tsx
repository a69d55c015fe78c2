'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Disclosure } from '@/components/ui/disclosure';
import { Mark } from '@/components/ui/mark';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { CountForecast, MonthlyRow } from '@/lib/engine/types';
import { formatCount, formatCountRange, formatDate, formatPercent } from '@/lib/format';

const SHOWN_AT_FIRST = 8;

const BANDS = [
  { share: 0.5, low: '0.25', high: '0.75' },
  { share: 0.8, low: '0.1', high: '0.9' },
  { share: 0.95, low: '0.025', high: '0.975' },
] as const;

function CountCells({ count }: { count: CountForecast | undefined }) {
  if (!count) return <Cell colSpan={4} />;
  return (
    <>
      <Cell num className="font-600">
        {formatCount(count.quantiles['0.5'])}
      </Cell>
      {BANDS.map((band) => (
        <Cell key={band.share} num className="whitespace-nowrap">
          {formatCountRange(count.quantiles[band.low], count.quantiles[band.high])}
        </Cell>
      ))}
    </>
  );
}

interface NumbersTableProps {
  monthly: readonly MonthlyRow[];
  /** Where the same numbers come as a file. */
  csvHref?: string;
  open?: boolean;
}

/** The numbers of the forecast figure, month by month, right under it. */
export function NumbersTable({ monthly, csvHref, open }: NumbersTableProps) {
  const [all, setAll] = useState(false);
  const rows = all ? monthly : monthly.slice(0, SHOWN_AT_FIRST);
  const events = monthly.some((row) => row.events);
  return (
    <Disclosure open={open}>
      <Table dense caption="Cumulative counts at each month’s end, median and bands">
        <TableHead>
          <Row>
            <HeadCell rowSpan={2}>Month end</HeadCell>
            <HeadCell colSpan={4} scope="colgroup" className="border-b-0">
              <Mark kind="patients" /> Randomised, cumulative
            </HeadCell>
            {events && (
              <HeadCell colSpan={4} scope="colgroup" className="border-b-0">
                <Mark kind="events" /> Events, cumulative
              </HeadCell>
            )}
          </Row>
          <Row>
            {(events ? ['randomised', 'events'] : ['randomised']).map((kind) => [
              <HeadCell key={`${kind}-median`} num>
                Median
              </HeadCell>,
              ...BANDS.map((band) => (
                <HeadCell key={`${kind}-${band.share}`} num>
                  {formatPercent(band.share)}
                </HeadCell>
              )),
            ])}
          </Row>
        </TableHead>
        <TableBody>
          {rows.map((row) => (
            <Row key={row.monthEnd}>
              <RowHead className="whitespace-nowrap">{formatDate(row.monthEnd)}</RowHead>
              <CountCells count={row.randomised} />
              {events && <CountCells count={row.events} />}
            </Row>
          ))}
        </TableBody>
      </Table>
      <div className="mt-3 flex flex-wrap items-center gap-3">
        {monthly.length > SHOWN_AT_FIRST && (
          <Button variant="second" size="small" onClick={() => setAll(!all)}>
            {all ? `Show the first ${SHOWN_AT_FIRST} months` : `Show all ${monthly.length} months`}
          </Button>
        )}
        {csvHref && (
          <a href={csvHref} className="text-13">
            Download as CSV
          </a>
        )}
      </div>
    </Disclosure>
  );
}
