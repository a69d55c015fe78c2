import Link from 'next/link';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import { joinClasses } from '@/components/ui/join-classes';
import { countryName } from '@/lib/countries';
import { formatDate, formatMonth, formatQuantity } from '@/lib/format';
import type { LogOverview, OverviewRow, OverviewState } from '@/lib/site-log/schema';

/** A word for each state, and a mark of its own shape: never colour alone. */
const STATES: Record<OverviewState, { word: string; look: string }> = {
  reported: { word: 'reported', look: 'text-ink-soft' },
  incomplete: { word: 'incomplete', look: 'font-600 text-caution' },
  missing: { word: 'not logged', look: 'bg-caution-paper font-600 text-caution' },
  closed: { word: '–', look: 'text-ink-soft' },
};

/** Sites by code against the last months: who has reported, who has begun, who has not. */
export function LogOverviewTable({ code, overview }: { code: string; overview: LogOverview }) {
  return (
    <Table caption="Sites and the last months: reported, incomplete or not logged">
      <TableHead>
        <Row>
          <HeadCell>Site</HeadCell>
          <HeadCell num>Randomised</HeadCell>
          {overview.months.map((month) => (
            <HeadCell key={month}>{formatMonth(month)}</HeadCell>
          ))}
          <HeadCell>Since opening</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {overview.items.map((site) => (
          <Row key={site.code}>
            <RowHead className="text-13">
              <Link
                href={`/studies/${code}/log/${encodeURIComponent(site.code)}`}
                className="no-underline hover:underline"
              >
                <b className="mr-1 text-15">{site.code}</b> {site.name}, {site.city}
              </Link>
              <SubLine>
                {countryName(site.country)},{' '}
                {site.closedOn ? `closed ${formatDate(site.closedOn)}` : `open since ${formatDate(site.activatedOn)}`}
              </SubLine>
            </RowHead>
            <Cell num>{site.randomised}</Cell>
            {site.states.map((state, place) => (
              <Cell
                key={overview.months[place]}
                className={joinClasses('text-13 whitespace-nowrap', STATES[state].look)}
              >
                {STATES[state].word}
                {state === 'closed' && <span className="sr-only">not open</span>}
              </Cell>
            ))}
            <Cell className="text-13">{gapWords(site)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

function gapWords({ missing, incomplete }: OverviewRow) {
  const parts = [
    missing > 0 && `${formatQuantity(missing, 'month')} not logged`,
    incomplete > 0 && `${formatQuantity(incomplete, 'month')} incomplete`,
  ].filter(Boolean);
  return parts.length > 0 ? (
    <span className="text-caution">{parts.join(', ')}</span>
  ) : (
    <span className="text-ink-soft">complete</span>
  );
}
