import { Formula, Source } from '@/components/method/formula';
import { Section } from '@/components/ui/section';

export function EnrolmentMethod() {
  return (
    <Section
      id="enrolment"
      title="Patients: the Poisson-gamma model"
      aside="Each site by its own record, shrunk towards the study"
    >
      <div className="max-w-measure space-y-3">
        <p>
          A site enrols as a Poisson process with a rate of its own. Rates vary between sites as a gamma distribution
          with mean <i>m</i> and shape <i>α</i>; its coefficient of variation is 1/√<i>α</i>. A site that has randomised{' '}
          <i>n</i> patients in the site-time <i>τ</i> therefore has the posterior rate
        </p>
        <Formula spoken="lambda given n is gamma distributed with shape alpha plus n and rate alpha over m plus tau">
          λ | <i>n</i> ~ Gamma(<i>α</i> + <i>n</i>, <i>α</i>/<i>m</i> + <i>τ</i>)
        </Formula>
        <p>and counts over sites are negative binomial, which is the likelihood of the two parameters:</p>
        <Formula spoken="log likelihood: sum over sites of log gamma of alpha plus n, minus log gamma of alpha, minus log n factorial, plus alpha log beta, plus n log tau, minus alpha plus n times log of beta plus tau">
          log <i>L</i> = Σ ln Γ(<i>α</i> + <i>n</i>) − ln Γ(<i>α</i>) − ln <i>n</i>! + <i>α</i> ln <i>β</i> + <i>n</i>{' '}
          ln <i>τ</i> − (<i>α</i> + <i>n</i>) ln(<i>β</i> + <i>τ</i>), &ensp;<i>β</i> = <i>α</i>/<i>m</i>
        </Formula>
        <p>
          Site-time runs from the start of the activation day to the end of what the site has logged, weighted by season
          and by the first months’ ramp-up. <b>A month that is not logged is not a nought</b>: it adds no site-time, and
          its patients, who exist but are not reported yet, are drawn like the future’s. Countries keep their planned
          ratio to the mean.
        </p>
        <p>
          Where <i>m</i> and <i>α</i> are learnt from the counts, every draw takes its own pair from their posterior:
          putting in the best estimate alone would make the bands too narrow. Where the plan’s figures are taken as
          known, that is said.
        </p>
        <p>
          A site still to open opens on a day drawn from its window (earliest, likely, latest: a triangular
          distribution), given that the day lies after the cut-off. A window that has passed without an opening is
          overdue: such a site opens after the cut-off by an exponential delay with a mean of 30 days, and the forecast
          says so. Caps stop a site, the target stops all.
        </p>
        <Source>
          Anisimov &amp; Fedorov 2007, Statistics in Medicine 26:4958. Anisimov 2011, Communications in Statistics
          40:3975. Mijoule, Savy &amp; Savy 2012, Statistics in Medicine 31:1655.
        </Source>
      </div>
    </Section>
  );
}
