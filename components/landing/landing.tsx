import type { ReactNode } from 'react';
import { ForecastFigure } from '@/components/charts/forecast-figure';
import { NumbersTable } from '@/components/charts/numbers-table';
import { exampleTrial } from '@/components/landing/example-trial';
import { MethodBrief } from '@/components/landing/method-brief';
import { TrialMonth } from '@/components/landing/trial-month';
import { PageFrame } from '@/components/shell/page-frame';
import { Section } from '@/components/ui/section';

interface LandingProps {
  /** The way in, within the first view: a form, or a way on for those who are in already. */
  signIn: ReactNode;
}

/** One sentence, the way in, one figure; then the job, the method and what the product leaves alone. */
export function Landing({ signIn }: LandingProps) {
  return (
    <PageFrame demonstration>
      <div className="pb-8 md:grid md:grid-cols-12 md:gap-x-5 md:pt-3">
        <div className="md:col-span-8">
          <h1 className="max-w-[15em] text-34 font-400 tracking-[-0.022em] md:text-48">
            When will the patients be in, and when the events?
          </h1>
          <p className="mt-3 max-w-[27em] font-title text-18 md:mt-5 md:text-24 md:leading-8">
            Kalends turns the monthly counts of a clinical trial’s sites into the dates of its analyses, each with its
            uncertainty and its cautions.
          </p>
        </div>
        <div className="pt-5 md:col-span-4 md:border-l md:border-rule md:pt-0 md:pl-5">{signIn}</div>
      </div>
      <div className="border-t border-ink pt-3">
        <ForecastFigure {...exampleTrial} initialWidth={1120} />
        <p className="mt-1 text-13 text-ink-soft">An invented trial, drawn from saved numbers.</p>
        <NumbersTable monthly={exampleTrial.monthly} />
      </div>
      <TrialMonth />
      <MethodBrief />
      <div className="gap-x-5 md:grid md:grid-cols-2">
        <Section title="What it never holds">
          <p>
            A treatment arm. There is no field, no column and no chart for one, and an upload that brings one is refused
            by the column’s name. Every count and every curve is of all patients together.
          </p>
        </Section>
        <Section title="What it never decides">
          <p>
            When an analysis takes place. A forecast helps a team to be ready; the decision stays with the people and
            the documents named at the foot of every page that shows a date.
          </p>
        </Section>
      </div>
    </PageFrame>
  );
}
