import Link from 'next/link';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { Forecast } from '@/lib/engine/types';
import { formatCount, formatDate, formatSigned } from '@/lib/format';
import type { EventSource, Run, RunContext } from '@/lib/forecasts/schema';

const COUNTS = [
  ['randomised', 'Randomised'],
  ['events', 'Events'],
  ['withdrawn', 'Withdrawn'],
  ['atRisk', 'At risk'],
] as const;

const EVENTS_FROM: Record<EventSource, string> = {
  subjects: 'each subject of the listing',
  aggregate: 'the totals of the data cut',
  plan: 'the plan alone: nobody was randomised yet',
  none: 'not forecast: the run had no data cut',
};

interface RunInputsProps {
  code: string;
  run: Run;
  observed: Forecast['observed'];
  context: RunContext;
}

/** What the run read, beside what the one before had read. */
export function RunInputs({ code, run, observed, context }: RunInputsProps) {
  const { before, sites, eventSource } = context;
  const home = `/studies/${code}`;
  return (
    <Section
      title="What went in"
      aside={
        before ? `Beside run ${before.number}, data to ${formatDate(before.cutoffOn)}` : 'The first run of this study'
      }
    >
      <div className="gap-x-5 md:grid md:grid-cols-2">
        <Table caption="Counts by the cut-off">
          <TableHead>
            <Row>
              <HeadCell>By the cut-off</HeadCell>
              {before && <HeadCell num>Run {before.number}</HeadCell>}
              <HeadCell num>Run {run.number}</HeadCell>
              {before && <HeadCell num>Difference</HeadCell>}
            </Row>
          </TableHead>
          <TableBody>
            {COUNTS.map(([field, label]) => {
              const now = observed[field];
              const then = before?.observed[field] ?? null;
              if (now === null) return null;
              return (
                <Row key={field}>
                  <RowHead>{label}</RowHead>
                  {before && <Cell num>{then === null ? '' : formatCount(then)}</Cell>}
                  <Cell num className="font-600">
                    {formatCount(now)}
                  </Cell>
                  {before && <Cell num>{then === null ? '' : formatSigned(now - then)}</Cell>}
                </Row>
              );
            })}
          </TableBody>
        </Table>
        <Table caption="Sources of the run" className="mt-5 md:mt-0">
          <TableHead>
            <Row>
              <HeadCell colSpan={2}>From</HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            <Row>
              <RowHead>Plan</RowHead>
              <Cell>
                <Link href={`${home}/plan/versions`}>version {run.planVersion}</Link>
              </Cell>
            </Row>
            <Row>
              <RowHead>Data cut</RowHead>
              <Cell>
                {run.dataCut === null ? (
                  'none'
                ) : (
                  <Link href={`${home}/data-cuts/${run.dataCut}`}>number {run.dataCut}</Link>
                )}
              </Cell>
            </Row>
            <Row>
              <RowHead>Events</RowHead>
              <Cell>{EVENTS_FROM[eventSource]}</Cell>
            </Row>
            <Row>
              <RowHead>Sites that reported every month</RowHead>
              <Cell>
                {formatCount(sites.reported)} of {formatCount(sites.open)}
                {sites.reported < sites.open && (
                  <>
                    {', '}
                    <Link href={`${home}/log`}>{formatCount(sites.open - sites.reported)} did not</Link>
                  </>
                )}
              </Cell>
            </Row>
          </TableBody>
        </Table>
      </div>
    </Section>
  );
}
