import { formatMonthlyShare } from '@/components/forecasts/run-words';
import { Mark } from '@/components/ui/mark';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { Family, Forecast } from '@/lib/engine/types';
import { formatCount, formatDecimal, formatPercent } from '@/lib/format';
import type { RunContext } from '@/lib/forecasts/schema';

const FAMILY_WORDS: Record<Family, string> = {
  exponential: 'Exponential',
  weibull: 'Weibull',
  'log-normal': 'Log-normal',
  'log-logistic': 'Log-logistic',
  gamma: 'Gamma',
  'piecewise-exponential': 'Piecewise exponential',
  average: 'Average',
};

interface RunFitProps {
  forecast: Forecast;
  plan: RunContext['plan'];
}

/** What the data say by themselves, beside what the plan had assumed. */
export function RunFit({ forecast, plan }: RunFitProps) {
  return (
    <Section
      title="Fit"
      aside="Maximum likelihood, beside the plan; the forecast itself carries the uncertainty of both"
    >
      <div className="gap-x-5 md:grid md:grid-cols-[5fr_7fr]">
        <EnrolmentFit forecast={forecast} plan={plan} />
        {plan.events && <EventsFit forecast={forecast} planned={plan.events} />}
      </div>
    </Section>
  );
}

function EnrolmentFit({ forecast, plan }: RunFitProps) {
  const { enrolment, dropout } = forecast.fit;
  return (
    <div>
      <h3>
        <Mark kind="patients" /> Enrolment
      </h3>
      <Table dense caption="Enrolment, fitted and planned">
        <TableHead>
          <Row>
            <HeadCell>Rate</HeadCell>
            <HeadCell num>Fitted</HeadCell>
            <HeadCell num>Planned</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          <Row>
            <RowHead>Patients per site-month</RowHead>
            <Cell num>{enrolment ? formatDecimal(enrolment.meanPerMonth) : '–'}</Cell>
            <Cell num>{formatDecimal(plan.meanPerMonth)}</Cell>
          </Row>
          <Row>
            <RowHead>Spread between sites (CV)</RowHead>
            <Cell num>{spreadOf(enrolment)}</Cell>
            <Cell num>{formatDecimal(plan.cv)}</Cell>
          </Row>
          {plan.events && (
            <Row>
              <RowHead>Loss to follow-up, per month</RowHead>
              <Cell num>{dropout ? formatMonthlyShare(dropout.perMonth) : '–'}</Cell>
              <Cell num>{formatMonthlyShare(plan.events.dropoutPerMonth)}</Cell>
            </Row>
          )}
        </TableBody>
      </Table>
      <p className="mt-2 text-13 text-ink-soft">
        {enrolment === null && 'No site has reported a month yet. '}
        {enrolment?.shape === null && 'The sites’ counts are no more spread than chance alone makes them. '}
        {plan.basis === 'data'
          ? 'The forecast learns the rate from the sites.'
          : 'The forecast takes the planned rate as known.'}
      </p>
    </div>
  );
}

function spreadOf(enrolment: Forecast['fit']['enrolment']): string {
  if (!enrolment) return '–';
  return enrolment.shape === null ? 'none' : formatDecimal(1 / Math.sqrt(enrolment.shape));
}

interface EventsFitProps {
  forecast: Forecast;
  planned: NonNullable<RunContext['plan']['events']>;
}

function EventsFit({ forecast, planned }: EventsFitProps) {
  const { fit, observed } = forecast;
  return (
    <div className="mt-5 md:mt-0">
      <h3>
        <Mark kind="events" /> Time to event, pooled
      </h3>
      {fit.events && (
        <Table dense caption="Families of the time to event, fitted">
          <TableHead>
            <Row>
              <HeadCell>Family</HeadCell>
              <HeadCell num>Weight</HeadCell>
              <HeadCell num>Median, months</HeadCell>
              <HeadCell num>Shape</HeadCell>
              <HeadCell num>AIC</HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            {fit.events.map((family) => {
              const shape = family.shape ?? family.sigma;
              return (
                <Row key={family.family}>
                  <RowHead>{FAMILY_WORDS[family.family]}</RowHead>
                  <Cell num>{formatPercent(family.weight)}</Cell>
                  <Cell num>{family.medianMonths === null ? 'never half' : formatDecimal(family.medianMonths, 1)}</Cell>
                  <Cell num>{shape === undefined ? '–' : formatDecimal(shape)}</Cell>
                  <Cell num>{formatDecimal(family.aic, 1)}</Cell>
                </Row>
              );
            })}
          </TableBody>
        </Table>
      )}
      <p className="mt-2 text-13 text-ink-soft">
        {fit.events === null && 'There is nothing to fit yet. '}
        Planned: {FAMILY_WORDS[planned.family as Family]}, median {formatDecimal(planned.medianMonths, 1)} months
        {planned.basis === 'data'
          ? `, weighing as ${formatDecimal(planned.priorEvents, 0)} events against the ${formatCount(observed.events ?? 0)} observed.`
          : ', taken as known.'}
      </p>
    </div>
  );
}
