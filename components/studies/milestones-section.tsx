'use client';

import { useFieldArray, useWatch } from 'react-hook-form';
import { MilestoneFields } from '@/components/studies/milestone-fields';
import { milestoneCodes, type MilestonesTyped, newMilestone } from '@/components/studies/milestones-typed';
import { informationWords, milestoneSentence } from '@/components/studies/plan-words';
import { SaveRow, SectionFrame } from '@/components/studies/section-frame';
import { SectionNotices } from '@/components/studies/section-notices';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { Button } from '@/components/ui/button';
import { numberTyped } from '@/components/ui/number-typed';
import type { Plan } from '@/lib/studies/schema';

interface MilestonesSectionProps {
  state: PlanSectionForm<MilestonesTyped>;
  folded: boolean;
  onChange: (() => void) | null;
  onDone: () => void;
}

export function MilestonesSection({ state, folded, onChange, onDone }: MilestonesSectionProps) {
  const { form } = state;
  const rows = useFieldArray({ control: form.control, name: 'rows', keyName: 'fieldId' });
  const typed = useWatch({ control: form.control, name: 'rows' });
  const codes = milestoneCodes(typed);
  const events = typed.flatMap((row) => {
    const count = row.kind === 'events' ? numberTyped(row.count) : null;
    return count ? [{ name: row.name, count }] : [];
  });
  const saved = (state.savedValue as Plan['milestones'] | null) ?? [];
  const remove = (place: number): void => {
    const key = typed[place]?.key;
    rows.remove(place);
    form.getValues('rows').forEach((row, other) => {
      if (key && row.of.includes(key))
        form.setValue(
          `rows.${other}.of`,
          row.of.filter((part) => part !== key),
        );
    });
  };
  return (
    <SectionFrame
      step={4}
      id="milestones"
      title="Milestones"
      aside="Each count gets a line in the forecast"
      folded={folded}
      onChange={onChange}
      sentence={
        <ul>
          {saved.map((milestone) => (
            <li key={milestone.code}>{milestoneSentence(milestone)}</li>
          ))}
        </ul>
      }
    >
      <SectionNotices section="milestones" state={state} />
      <ol>
        {rows.fields.map((row, place) => (
          <MilestoneFields
            key={row.fieldId}
            state={state}
            place={place}
            rows={typed}
            code={codes.get(row.key) ?? ''}
            onRemove={rows.fields.length > 1 ? () => remove(place) : null}
          />
        ))}
      </ol>
      {informationWords(events) && <p className="mt-2 text-13 text-ink-soft">{informationWords(events)}</p>}
      <Button
        variant="second"
        size="small"
        className="mt-2"
        onClick={() => rows.append(newMilestone(nextPlace(typed)))}
      >
        Add a milestone
      </Button>
      <SaveRow state={state} verb="Save milestones" onDone={onDone} />
    </SectionFrame>
  );
}

/** A mark that no other new row has. */
function nextPlace(rows: MilestonesTyped['rows']): number {
  return Math.max(0, ...rows.map((row) => Number(/^new (\d+)$/.exec(row.key)?.[1] ?? 0))) + 1;
}
