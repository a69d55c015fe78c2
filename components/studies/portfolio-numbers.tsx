import { milestoneWords } from '@/components/charts/milestone-words';
import { Disclosure } from '@/components/ui/disclosure';
import { Mark, markOfMilestone } from '@/components/ui/mark';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatDate, formatPercent, formatProbability } from '@/lib/format';
import type { PortfolioStudy } from '@/lib/portfolio/schema';

/** What the strips draw, as numbers. */
export function PortfolioNumbers({ studies }: { studies: readonly PortfolioStudy[] }) {
  const rows = studies.flatMap((study) => study.milestones.map((milestone) => ({ study, milestone })));
  if (rows.length === 0) return null;
  return (
    <Disclosure className="mt-5">
      <Table dense caption="Milestones of the studies shown">
        <TableHead>
          <Row>
            <HeadCell>Study</HeadCell>
            <HeadCell>Milestone</HeadCell>
            <HeadCell>Range, {formatPercent(0.8)}</HeadCell>
            <HeadCell>Median</HeadCell>
            <HeadCell>Planned</HeadCell>
            <HeadCell num>By planned</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {rows.map(({ study, milestone: { code, name, kind, plannedOn, forecast } }) => (
            <Row key={`${study.organisationName}/${study.code}/${code}`}>
              <RowHead>{study.code}</RowHead>
              <Cell>
                <Mark kind={markOfMilestone(kind)} /> {name}
              </Cell>
              <Cell>{forecast ? milestoneWords(forecast).range : 'no forecast'}</Cell>
              <Cell>
                {forecast && !forecast.reachedOn && forecast.quantiles['0.5']
                  ? formatDate(forecast.quantiles['0.5'])
                  : ''}
              </Cell>
              <Cell>{plannedOn ? formatDate(plannedOn) : ''}</Cell>
              <Cell num>
                {forecast && !forecast.reachedOn && forecast.probabilityByPlanned !== null
                  ? formatProbability(forecast.probabilityByPlanned)
                  : ''}
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </Disclosure>
  );
}
