import { Source } from '@/components/method/formula';
import { Section } from '@/components/ui/section';

const PRACTICE = [
  [
    'Sites slow down.',
    'A rate may fall with a site’s age to a floor. Whether it does is tested whenever months are given, and a caution says so where it matters and is not in the model.',
  ],
  ['Pauses and shocks.', 'Past ones take site-time away, coming ones take rate away, for all sites or for some.'],
  [
    'Patients in screening.',
    'Those now in screening pass with a probability learnt from earlier ones, within the screening window; the site’s other arrivals start after it, so that nobody counts twice.',
  ],
  ['Fixed follow-up.', 'No event is counted after a patient’s last planned day.'],
  [
    'Adjudication.',
    'An event counts once it is confirmed; how often and how late are learnt from those decided so far.',
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
  'families whose medians part by more than three months',
  'a fit that fails its own check of goodness',
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

export function RecordMethod() {
  return (
    <Section id="record" title="Looking back">
      <div className="max-w-measure space-y-3">
        <p>
          A past forecast is made again from the data as they were <i>known</i> at that month’s end, not as corrected
          since, and held against what then happened: how often the 50, 80 and 95 % bands held, where in the forecast
          the truth fell, by how many days the median missed, and the continuous ranked probability score,
        </p>
        <p className="font-title text-18">
          CRPS = (1/<i>D</i>) Σ |<i>x</i>ᵢ − <i>y</i>| − (1/2<i>D</i>²) ΣΣ |<i>x</i>ᵢ − <i>x</i>ⱼ|
        </p>
        <p>
          which rewards a forecast for being both right and sharp. The computation itself is checked by drawing trials
          from known parameters and asking whether the posterior ranks them evenly, and against closed forms wherever
          one exists.
        </p>
        <Source>
          Gneiting &amp; Raftery 2007, Journal of the American Statistical Association 102:359. Talts et al. 2018,
          arXiv:1804.06788.
        </Source>
      </div>
    </Section>
  );
}

export function PlanningMethod() {
  return (
    <Section id="planning" title="Help with the plan">
      <div className="max-w-measure space-y-3">
        <p>
          Events needed for a log-rank comparison, with a share <i>p</i> allocated to one arm, after Schoenfeld:{' '}
          <span className="font-title text-18">
            <i>d</i> = (<i>z</i>
            <sub>1−α/2</sub> + <i>z</i>
            <sub>1−β</sub>)² / (<i>p</i>(1 − <i>p</i>)(ln HR)²)
          </span>
          ; after Freedman, with an allocation of <i>r</i> to 1:{' '}
          <span className="font-title text-18">
            <i>d</i> = (<i>z</i>
            <sub>1−α/2</sub> + <i>z</i>
            <sub>1−β</sub>)² (1 + <i>r</i>HR)² / (<i>r</i>(1 − HR)²)
          </span>
          . The ratio is used for this sum alone and is not kept with the study’s data.
        </p>
        <p>
          The planned median of all patients together is the median of the mixture of both arms’ distributions, solved
          numerically. It is not the mean of the two medians.
        </p>
        <Source>Schoenfeld 1983, Biometrics 39:499. Freedman 1982, Statistics in Medicine 1:121.</Source>
      </div>
    </Section>
  );
}

const LIMITS = [
  'It knows what is in the data and the plan. A competing trial, a new standard of care or a change of protocol is in neither until somebody enters it.',
  'Sites are taken to enrol independently of one another, and patients to have their events so, given the curve.',
  'One curve for all patients is right for timing; it says nothing about an effect, and is not meant to.',
  'A date beyond what follow-up has shown rests on the shape of a family. The weights of families help only as far as the data can tell them apart.',
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
