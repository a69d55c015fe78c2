import Link from 'next/link';
import { Mark, type MarkKind } from '@/components/ui/mark';
import { Section } from '@/components/ui/section';

const PARTS: { mark: MarkKind; title: string; text: string; source: string }[] = [
  {
    mark: 'patients',
    title: 'Patients',
    text: 'A site enrols at a Poisson rate of its own, and rates vary as a gamma distribution. Each site is forecast from its own record, shrunk towards the study. Opening windows, caps, seasons and closures count.',
    source:
      'Anisimov & Fedorov 2007, Statistics in Medicine 26:4958. Mijoule, Savy & Savy 2012, Statistics in Medicine 31:1655.',
  },
  {
    mark: 'events',
    title: 'Events',
    text: 'One survival curve holds for all patients together, learnt from the data and, as far as it is told to weigh, from the plan. Whoever is at risk is carried on from the day last seen free of the event.',
    source:
      'Bagiella & Heitjan 2001, Statistics in Medicine 20:2055. Ying & Heitjan 2008, Pharmaceutical Statistics 7:107.',
  },
  {
    mark: 'date',
    title: 'Dates',
    text: 'Parameters are drawn, not put in as if known. The same file, seed and number of draws give the same dates on any machine, to the last digit. The posterior is checked by simulation.',
    source: 'Hyndman & Fan 1996, The American Statistician 50:361. Talts et al. 2018, arXiv:1804.06788.',
  },
];

export function MethodBrief() {
  return (
    <Section title="The method in brief" aside={<Link href="/method">The whole method, with formulas and limits</Link>}>
      <div className="grid gap-8 md:grid-cols-3 md:gap-5">
        {PARTS.map((part) => (
          <div key={part.title} className="space-y-2">
            <h3>
              <Mark kind={part.mark} /> {part.title}
            </h3>
            <p>{part.text}</p>
            <p className="text-13 text-ink-soft">{part.source}</p>
          </div>
        ))}
      </div>
    </Section>
  );
}
