import { Section } from '@/components/ui/section';

const DAYS = [
  {
    day: '1',
    month: 'Apr',
    title: 'Sites log the month',
    text: 'Screened, failed, randomised, events, withdrawn: five figures a site. A month left out is a gap in what is known, not a nought.',
  },
  {
    day: '3',
    month: 'Apr',
    title: 'Figures are put right',
    text: 'A correction keeps what stood there before, who changed it and why. Then the data are cut and held against the log.',
  },
  {
    day: '5',
    month: 'Apr',
    title: 'The forecast runs',
    text: 'Thousands of futures of the trial are drawn; the statistician sees by how much each date has moved.',
  },
  {
    day: '6',
    month: 'Apr',
    title: 'It is published',
    text: 'The sponsor reads a range, its median, a note and its cautions. No site is named and no arm exists.',
  },
  {
    day: '19',
    month: 'May',
    title: 'A date slips',
    text: 'Whoever asked to be told hears by e-mail how far it moved, in the statistician’s words why.',
  },
  {
    day: '26',
    month: 'Dec',
    title: 'It is looked back on',
    text: 'Every publication stays as it was said: its readers see how the date moved from the first to the last.',
  },
] as const;

/** The job over a year, as dates on a calendar. */
export function TrialMonth() {
  return (
    <Section title="A trial’s calendar" aside="From the sites’ figures to the sponsor’s date, and back">
      <ol className="md:grid md:grid-cols-3 md:gap-y-8 lg:grid-cols-6">
        {DAYS.map(({ day, month, title, text }, place) => (
          <li
            key={title}
            className={`grid grid-cols-[92px_1fr] border-t border-rule py-2 md:block md:border-t-0 md:px-3 md:py-0 md:pb-1 ${place % 3 === 0 ? '' : 'md:border-l'} ${place === 0 ? 'lg:pl-0' : 'lg:border-l'}`}
          >
            <p className="row-span-2 font-title text-34 md:text-48">
              {day}
              <span className="ml-1.5 font-text text-15 text-ink-soft">{month}</span>
            </p>
            <div>
              <h3 className="my-1">{title}</h3>
              <p className="text-13 text-ink-soft">{text}</p>
            </div>
          </li>
        ))}
      </ol>
    </Section>
  );
}
