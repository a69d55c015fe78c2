import { Source } from '@/components/method/formula';
import { Section } from '@/components/ui/section';

const PRACTICE = [
  ['Fixed follow-up.', 'No event is counted after a patient’s last planned day.'],
  [
    'Late visits.',
    'A patient is known to be free of the event up to the last visit and no longer; what fell between it and the cut-off has happened and is not reported yet.',
  ],
  [
    'Opening day unknown.',
    'Where the first patient’s day stands for it, that patient is certain and tells nothing of the rate: the likelihood takes one less.',
  ],
] as const;

const CAUTIONS = [
  'fewer than ten events in the fit, or a plan that outweighs the data',
  'overdue sites, and months that are not logged',
  'a date beyond twice the longest follow-up seen so far',
  'an exponential that a Weibull fits better by a likelihood-ratio test',
  'a milestone that more than one draw in twenty never reaches, or more events than the patients can give',
] as const;

export function PracticeMethod() {
  return (
    <Section id="practice" title="What real trials do" aside="Each off unless asked for">
      <ul className="max-w-measure space-y-2">
        {PRACTICE.map(([title, text]) => (
          <li key={title}>
            <b>{title}</b> {text}
          </li>
        ))}
      </ul>
      <h3 className="mt-5">Cautions that a forecast raises by itself</h3>
      <ul className="mt-1 max-w-measure list-disc space-y-1 pl-5">
        {CAUTIONS.map((text) => (
          <li key={text}>{text}</li>
        ))}
      </ul>
    </Section>
  );
}

export function ChecksMethod() {
  return (
    <Section id="checks" title="How it is checked">
      <div className="max-w-measure space-y-3">
        <p>
          By drawing trials from known parameters and asking whether the posterior ranks them evenly; against closed
          forms wherever one exists (negative binomial counts, Pearson VI and gamma waiting times); against published
          tables and fits of open data; and by forecasting an open trial as it stood while it enrolled, with what then
          happened inside the band of 95 %. The checks and their sources are in the product’s own tests.
        </p>
        <p>
          What is not in the model yet: rates that fall with a site’s age, pauses, caps of countries, patients in
          screening, adjudication, and families of survival other than these two. A study that asks for them is refused,
          never half computed.
        </p>
        <Source>Talts et al. 2018, arXiv:1804.06788.</Source>
      </div>
    </Section>
  );
}

export function PlanningMethod() {
  return (
    <Section id="planning" title="Help with the plan">
      <div className="max-w-measure space-y-3">
        <p>
          The planned median of all patients together is the median of the mixture of both arms’ distributions, solved
          numerically. It is not the mean of the two medians.
        </p>
      </div>
    </Section>
  );
}

const LIMITS = [
  'It knows what is in the data and the plan. A competing trial, a new standard of care or a change of protocol is in neither until somebody enters it.',
  'Sites are taken to enrol independently of one another, and patients to have their events so, given the curve.',
  'One curve for all patients is right for timing; it says nothing about an effect, and is not meant to.',
  'A date beyond what follow-up has shown rests on the shape of a family.',
  'Loss to follow-up has a constant hazard. Where it comes in waves, the tail is less certain than drawn.',
  'Bands are wide early on because little is known then. A narrow range in the first months would be a mistake, not a success.',
] as const;

export function MethodLimits() {
  return (
    <Section id="limits" title="Limits">
      <ul className="max-w-measure list-disc space-y-2 pl-5">
        {LIMITS.map((text) => (
          <li key={text}>{text}</li>
        ))}
      </ul>
    </Section>
  );
}
