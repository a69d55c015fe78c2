'use client';

import { CompactForecastFigure } from '@/components/charts/compact-forecast-figure';
import { milestoneWords } from '@/components/charts/milestone-words';
import { Mark, markOfMilestone } from '@/components/ui/mark';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { Forecast } from '@/lib/engine/types';
import { formatCount, formatPercent, formatProbability } from '@/lib/format';
import { DOUBTFUL_BELOW, secondLook } from '@/lib/studies/rules';

interface PlanPreviewProps {
  forecast: Forecast | null;
  /** Why there is no picture yet, or why it is not of what the fields say now. */
  waitsFor: string | null;
  error: string | null;
  atWork: boolean;
  /** The sites are a stand-in typed for the picture. */
  standIn: boolean;
}

/** What the plan alone implies, drawn again as it is typed. The last picture stays until the next is there. */
export function PlanPreview({ forecast, waitsFor, error, atWork, standIn }: PlanPreviewProps) {
  const doubts = (forecast?.milestones ?? []).flatMap((milestone) => secondLook(milestone) ?? []);
  return (
    <div className="pt-3 md:sticky md:top-0">
      <h3>What this plan alone implies</h3>
      <p role="status" className="text-13 text-ink-soft">
        {waitsFor ?? (atWork ? 'Drawing again.' : 'Drawn again as you type. No data in it.')}
        {forecast && ` ${formatCount(forecast.draws)} draws.`}
        {forecast && standIn && ' Its sites are the stand-in typed under step 2.'}
      </p>
      {error && (
        <Notice tone="stop" title="Not drawn" className="mt-3">
          {error}
        </Notice>
      )}
      {forecast && (
        <>
          <div className="my-2">
            <CompactForecastFigure
              cutoff={forecast.dataCutoff}
              observed={[]}
              monthly={forecast.monthly}
              milestones={forecast.milestones}
            />
          </div>
          <Table dense caption="What the plan alone implies, in numbers">
            <TableHead>
              <Row>
                <HeadCell>Milestone</HeadCell>
                <HeadCell>Range, {formatPercent(0.8)}</HeadCell>
                <HeadCell num>By planned</HeadCell>
              </Row>
            </TableHead>
            <TableBody>
              {forecast.milestones.map((milestone) => {
                const { code, name, kind, plannedOn, probabilityByPlanned: chance } = milestone;
                const known = plannedOn && chance !== null;
                return (
                  <Row key={code}>
                    <RowHead>
                      <Mark kind={markOfMilestone(kind)} /> {name ?? code}
                    </RowHead>
                    <Cell className="whitespace-nowrap">{milestoneWords(milestone).range}</Cell>
                    <Cell num className={known && chance < DOUBTFUL_BELOW ? 'font-600 text-caution' : 'font-600'}>
                      {known ? formatProbability(chance) : '–'}
                    </Cell>
                  </Row>
                );
              })}
            </TableBody>
          </Table>
          {doubts.length > 0 && (
            <Notice tone="caution" title="Worth a second look" className="mt-3">
              <ul className="space-y-2">
                {doubts.map((doubt) => (
                  <li key={doubt}>{doubt}</li>
                ))}
              </ul>
            </Notice>
          )}
          {forecast.cautions.length > 0 && (
            <Notice tone="caution" title="Cautions" className="mt-3">
              <ul className="space-y-2">
                {forecast.cautions.map(({ code, text }) => (
                  <li key={`${code} ${text}`}>{text}</li>
                ))}
              </ul>
            </Notice>
          )}
        </>
      )}
    </div>
  );
}
