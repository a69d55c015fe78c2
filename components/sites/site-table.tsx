import Link from 'next/link';
import { Button } from '@/components/ui/button';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import { joinClasses } from '@/components/ui/join-classes';
import { formatCount, formatDate, formatDateRange, formatQuantity } from '@/lib/format';
import { SITE_STATUS_NAMES, type ListedSite } from '@/lib/sites/schema';

interface SiteTableProps {
  code: string;
  sites: readonly ListedSite[];
  /** By code, as the server spells them: browsers know other editions of the list. */
  countryNames: Readonly<Record<string, string>>;
  onChange: (site: ListedSite) => void;
}

/** By code; what needs attention says so in words, and is never ranked by counts. */
export function SiteTable({ code, sites, countryNames, onChange }: SiteTableProps) {
  return (
    <Table caption="Sites of the study">
      <TableHead>
        <Row>
          <HeadCell>Site</HeadCell>
          <HeadCell>Status</HeadCell>
          <HeadCell num>Randomised</HeadCell>
          <HeadCell>Planned window</HeadCell>
          <HeadCell>Months missing</HeadCell>
          <HeadCell>
            <span className="sr-only">Change</span>
          </HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {sites.map((site) => (
          <Row key={site.id}>
            <RowHead className="text-13">
              <b className="mr-1 text-15">{site.code}</b> {site.name}, {site.city}
              <SubLine>
                {countryNames[site.country] ?? site.country}
                {site.activatedOn &&
                  `, ${site.status === 'closed' ? 'opened' : 'open since'} ${formatDate(site.activatedOn)}`}
              </SubLine>
            </RowHead>
            <Cell className={joinClasses('text-13', site.status === 'overdue' && 'font-600 text-caution')}>
              {SITE_STATUS_NAMES[site.status]}
              {site.closedOn && (
                <SubLine>
                  {site.status === 'closed' ? formatDate(site.closedOn) : `closes ${formatDate(site.closedOn)}`}
                </SubLine>
              )}
            </Cell>
            <Cell num>
              {site.activatedOn ? formatCount(site.randomised) : ''}
              {site.cap !== null && <SubLine>of {formatCount(site.cap)}</SubLine>}
              {site.cap === site.randomised && <SubLine>at its cap</SubLine>}
            </Cell>
            <Cell className="text-13">
              {site.plannedEarliest && site.plannedLatest
                ? formatDateRange(site.plannedEarliest, site.plannedLatest)
                : ''}
              {site.plannedLikely && <SubLine>likely {formatDate(site.plannedLikely)}</SubLine>}
            </Cell>
            <Cell className="text-13">{site.activatedOn && <MissingMonths code={code} site={site} />}</Cell>
            <Cell className="text-right">
              <Button size="small" variant="second" onClick={() => onChange(site)}>
                Change<span className="sr-only"> site {site.code}</span>
              </Button>
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

function MissingMonths({ code, site }: { code: string; site: ListedSite }) {
  const parts = [
    site.monthsMissing > 0 && `${formatQuantity(site.monthsMissing, 'month')} not logged`,
    site.monthsIncomplete > 0 && `${formatQuantity(site.monthsIncomplete, 'month')} incomplete`,
  ].filter(Boolean);
  return (
    <Link
      href={`/studies/${code}/log/${encodeURIComponent(site.code)}`}
      className={parts.length > 0 ? 'font-600 text-caution' : 'text-ink-soft'}
    >
      {parts.length > 0 ? parts.join(', ') : 'none'}
      <span className="sr-only">: open the sheet of site {site.code}</span>
    </Link>
  );
}
