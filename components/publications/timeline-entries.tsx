import { CautionMarks } from '@/components/ui/footnotes';
import { Mark, markOfMilestone } from '@/components/ui/mark';
import type { MilestoneForecast } from '@/lib/engine/types';
import { formatPercent } from '@/lib/format';
import {
  cautionMarksOf,
  inOrderOfTime,
  medianMoved,
  milestoneWords,
  movedWords,
  nameOfMilestone,
  waitsFor,
} from '@/lib/publications/rules';
import type { Timeline } from '@/lib/publications/queries';

/** Every milestone of a publication: the range of months large, its days and median under it, what was planned beside it. */
export function TimelineEntries({ publication, previous }: Pick<Timeline, 'publication' | 'previous'>) {
  const { milestones } = publication.content;
  const marks = cautionMarksOf(publication.content);
  return (
    <ol className="@container border-t border-ink">
      {inOrderOfTime(milestones).map((milestone) => (
        <Entry
          key={milestone.code}
          milestone={milestone}
          waiting={waitsFor(milestone, milestones)}
          marks={marks[milestone.code] ?? ''}
          moved={movedSince(previous, milestone, publication.publishedAt.slice(0, 10))}
        />
      ))}
    </ol>
  );
}

function movedSince(previous: Timeline['previous'], milestone: MilestoneForecast, on: string): string | null {
  const days = medianMoved(
    previous?.milestones.find(({ code }) => code === milestone.code),
    milestone,
  );
  return previous && days !== null ? movedWords(days, previous.publishedOn, on) : null;
}

interface EntryProps {
  milestone: MilestoneForecast;
  waiting: string;
  marks: string;
  moved: string | null;
}

function Entry({ milestone, waiting, marks, moved }: EntryProps) {
  const words = milestoneWords(milestone);
  return (
    <li className="border-b border-rule py-3 @min-[620px]:grid @min-[620px]:grid-cols-[144px_minmax(0,1fr)_172px] @min-[620px]:items-baseline @min-[620px]:gap-x-3">
      <p>
        <Mark kind={markOfMilestone(milestone.kind)} /> <b>{nameOfMilestone(milestone)}</b>
        <span className="block pl-4 text-13 text-ink-soft">{waiting}</span>
      </p>
      <div className="mt-1 @min-[620px]:mt-0">
        <p className="font-title text-24 tracking-[-0.01em] @min-[740px]:text-34">
          {words.range}
          <span className="font-text text-15 tracking-normal whitespace-nowrap text-ink-soft">
            {words.isRange && <> &nbsp;{formatPercent(0.8)}</>}
            <CautionMarks marks={marks} />
          </span>
        </p>
        {words.exact && <p>{words.exact}</p>}
      </div>
      <div className="mt-1 @min-[620px]:mt-0">
        {words.planned && (
          <p className="whitespace-nowrap">
            <Mark kind="planned" /> Planned {words.planned}
          </p>
        )}
        {words.chance && <p className="text-13 text-ink-soft">{words.chance}</p>}
        {moved && <p className="text-13 text-ink-soft">{moved}</p>}
      </div>
    </li>
  );
}
