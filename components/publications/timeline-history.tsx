import Link from 'next/link';
import { DateHistoryFigure } from '@/components/charts/date-history-figure';
import { Section } from '@/components/ui/section';
import { firstSentence, inOrderOfTime, inSentence, nameOfMilestone } from '@/lib/publications/rules';
import type { Timeline } from '@/lib/publications/queries';

/** How one milestone's date moved, publication by publication; the others are a link away. */
export function TimelineHistory({ publication, history, milestone }: Timeline) {
  const { milestones } = publication.content;
  const shown = milestones.find(({ code }) => code === milestone);
  if (!shown) return null;
  const tabs = inOrderOfTime(milestones).map((one) => (
    <li key={one.code}>
      {one.code === milestone ? (
        <b aria-current="true" className="text-ink">
          {nameOfMilestone(one)}
        </b>
      ) : (
        <Link href={`?milestone=${encodeURIComponent(one.code)}#moved`} scroll={false}>
          {nameOfMilestone(one)}
        </Link>
      )}
    </li>
  ));
  return (
    <Section
      id="moved"
      title={`How the ${inSentence(nameOfMilestone(shown))} date moved`}
      aside={
        tabs.length > 1 && (
          <nav aria-label="Milestone whose history is shown">
            <ul className="flex flex-wrap gap-x-5 gap-y-1">{tabs}</ul>
          </nav>
        )
      }
    >
      <DateHistoryFigure
        publications={history.map((one) => ({
          number: one.number,
          publishedOn: one.publishedOn,
          dataCutoff: one.dataCutoff,
          milestone: one.milestone,
          reason: firstSentence(one.note),
        }))}
        plannedOn={shown.plannedOn}
      />
    </Section>
  );
}
