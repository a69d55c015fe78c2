import { Formula, Source } from '@/components/method/formula';
import { Section } from '@/components/ui/section';
import { formatPercent } from '@/lib/format';

export function DatesMethod() {
  return (
    <Section id="dates" title="Dates, bands and what makes them repeatable">
      <div className="max-w-measure space-y-3">
        <p>
          Each draw is a whole future of the trial: parameters, openings, patients, events. A milestone’s date in that
          future is the day its count is reached; follow-up milestones add months to the last randomisation, and a
          milestone that waits for several takes the latest of them, within the draw. The printed range leaves out a
          tenth of the draws at each end: {formatPercent(0.8)}. Because
        </p>
        <Formula spoken="The probability that N of t is at least k equals the probability that T k is at most t">
          P(<i>N</i>(<i>t</i>) ≥ <i>k</i>) = P(<i>T</i>
          <sub>
            <i>k</i>
          </sub>{' '}
          ≤ <i>t</i>)
        </Formula>
        <p>
          the band of counts and the range of a date are one statement read two ways: in the figure the band’s edge
          meets each count line where the date’s bracket ends. A draw that never gets there before the horizon counts as
          later than every date, and is reported as such instead of being left out.
        </p>
        <p>
          The two parameters of enrolment, and of each two-parameter family, have their posterior on a grid of 61 × 61
          cells around its mode, laid along the axes of its curvature. Quantiles of dates are of type 7, those of counts
          of type 1.
        </p>
        <p>
          Random numbers come in streams, one for every 250 draws, merged in order. The same study file, seed and number
          of draws give the same forecast file to the last digit, on the server, on a command line and in a browser,
          whatever the number of threads. Two plans that are compared use the same streams, so that their difference is
          no noise. The simulation’s own error of the median is printed beside it.
        </p>
        <Source>
          Hyndman &amp; Fan 1996, The American Statistician 50:361. Marsaglia &amp; Tsang 2000, ACM Transactions on
          Mathematical Software 26:363. Abramowitz &amp; Stegun 1964, chapters 6 and 26.
        </Source>
      </div>
    </Section>
  );
}
