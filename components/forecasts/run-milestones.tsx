import { milestoneWords } from '@/components/charts/milestone-words';
import { marksOf, simulationError } from '@/components/forecasts/run-words';
import { CautionMarks } from '@/components/ui/footnotes';
import { Mark, markOfMilestone } from '@/components/ui/mark';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import type { Forecast } from '@/lib/engine/types';
import { formatDate, formatDaysMoved, formatPercent, formatProbability } from '@/lib/format';
import type { RunContext } from '@/lib/forecasts/schema';
import { nameOfMilestone, waitsFor } from '@/lib/publications/rules';

/** Range first, then the median, beside what was planned and what was published last. */
export function RunMilestones({ forecast, moved }: { forecast: Forecast; moved: RunContext['moved'] }) {
  const marks = marksOf(forecast);
  const error = simulationError(forecast.milestones);
  return (
    <Section
      title="Milestones"
      aside={`${formatPercent(0.8)} ranges.${error ? ` Simulation error of a median: ${error}.` : ''}`}
    >
      <Table caption="Milestones with their range, median and planned date">
        <TableHead>
          <Row>
            <HeadCell>Milestone</HeadCell>
            <HeadCell>Range, {formatPercent(0.8)}</HeadCell>
            <HeadCell>Median</HeadCell>
            <HeadCell>Planned</HeadCell>
            <HeadCell num>
              Chance by
              <br />
              planned date
            </HeadCell>
            {moved && (
              <HeadCell>
                Median against
                <br />
                publication {moved.publication}
              </HeadCell>
            )}
          </Row>
        </TableHead>
        <TableBody>
          {forecast.milestones.map((milestone) => {
            const { code, kind, reachedOn, quantiles, plannedOn, probabilityByPlanned } = milestone;
            const words = milestoneWords(milestone);
            const days = moved?.days[code];
            return (
              <Row key={code}>
                <RowHead>
                  <Mark kind={markOfMilestone(kind)} /> <b>{nameOfMilestone(milestone)}</b>
                  <CautionMarks marks={marks[code]} />
                  <SubLine className="pl-4">{waitsFor(milestone, forecast.milestones)}</SubLine>
                </RowHead>
                <Cell className="font-600 md:whitespace-nowrap">
                  {words.range}
                  {!reachedOn && quantiles['0.1'] !== null && words.under.startsWith('not') && (
                    <SubLine>{words.under}</SubLine>
                  )}
                </Cell>
                <Cell className="whitespace-nowrap">
                  {reachedOn ? '' : quantiles['0.5'] ? formatDate(quantiles['0.5']) : 'not reached'}
                </Cell>
                <Cell className="whitespace-nowrap">{plannedOn ? formatDate(plannedOn) : ''}</Cell>
                <Cell num className="whitespace-nowrap">
                  {reachedOn || probabilityByPlanned === null ? '' : formatProbability(probabilityByPlanned)}
                </Cell>
                {moved && <Cell>{typeof days === 'number' ? formatDaysMoved(days) : ''}</Cell>}
              </Row>
            );
          })}
        </TableBody>
      </Table>
    </Section>
  );
}
