import type { ReactNode } from 'react';
import { Formula, Source } from '@/components/method/formula';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';

const FAMILIES: [family: string, survival: ReactNode, posterior: string][] = [
  ['Exponential', 'exp(−h·t)', 'conjugate gamma'],
  [
    'Weibull',
    <>
      exp(−(t/σ)<sup>κ</sup>)
    </>,
    'grid',
  ],
];

export function EventsMethod() {
  return (
    <Section
      id="events"
      title="Events: one curve for all patients"
      aside="Pooled and blinded: no treatment arm is ever stored"
    >
      <div className="max-w-measure space-y-3">
        <p>
          One survival distribution holds for all randomised patients together. A patient’s time runs from the day of
          randomisation, which is day 1. Events weigh by their density, everybody else by survival to the day last seen
          free of the event:
        </p>
        <Formula spoken="log likelihood: sum over events of log f of t plus sum over censored of log S of t">
          log <i>L</i> = Σ<sub>events</sub> ln <i>f</i>(<i>t</i>) + Σ<sub>censored</sub> ln <i>S</i>(<i>t</i>)
        </Formula>
      </div>
      <Table dense caption="Families of the time to event" className="my-3 max-w-measure">
        <TableHead>
          <Row>
            <HeadCell>Family</HeadCell>
            <HeadCell>Survival to time t, months</HeadCell>
            <HeadCell>Posterior</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {FAMILIES.map(([family, survival, posterior]) => (
            <Row key={family}>
              <RowHead>{family}</RowHead>
              <Cell>{survival}</Cell>
              <Cell>{posterior}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <div className="max-w-measure space-y-3">
        <p>
          The plan’s median enters as a prior that weighs as much as a stated number of events, and fades as events come
          in. A share of patients who never have the event may be set aside with the Weibull (<i>S</i> becomes π + (1 −
          π)·<i>S</i>).
        </p>
        <p>
          <b>Patients at risk are carried on from where they are.</b> A patient last seen free of the event at <i>t</i>₀
          has a remaining time that is conditional on having come so far,
        </p>
        <Formula spoken="the time of the event is S inverse of U times S of t zero, with U uniform">
          <i>T</i> = <i>S</i>⁻¹(<i>U</i>·<i>S</i>(<i>t</i>₀)), &ensp;<i>U</i> uniform on (0, 1)
        </Formula>
        <p>
          Treating them as new at the cut-off is the classic mistake. Patients still to be randomised start at their
          own, drawn day. Loss to follow-up competes at a constant hazard: an event counts only if it comes first. A
          last visit before the cut-off conditions on that visit’s day, so that an event between the two has happened
          and is not reported yet.
        </p>
        <Source>
          Bagiella &amp; Heitjan 2001, Statistics in Medicine 20:2055. Ying, Heitjan &amp; Chen 2004, Clinical Trials
          1:352. Ying &amp; Heitjan 2008, Pharmaceutical Statistics 7:107.
        </Source>
      </div>
    </Section>
  );
}
