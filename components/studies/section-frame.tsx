import type { ReactNode } from 'react';
import type { FieldValues } from 'react-hook-form';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/section';

interface SectionFrameProps {
  step: number;
  id: string;
  title: string;
  aside?: ReactNode;
  /** What the section says when it is done, in a sentence. */
  sentence: ReactNode;
  folded: boolean;
  /** Null: the reader may not change the plan. */
  onChange: (() => void) | null;
  children: ReactNode;
}

/** A heading and a few fields; once done, a sentence with a way back. */
export function SectionFrame({ step, id, title, aside, sentence, folded, onChange, children }: SectionFrameProps) {
  return (
    <Section
      id={id}
      className="scroll-mt-5"
      title={
        <>
          <span className="mr-3">{step}</span>
          {title}
        </>
      }
      aside={
        folded && onChange ? (
          <Button variant="quiet" size="small" className="-my-1.5 max-md:-ml-3 md:-mr-3" onClick={onChange}>
            Change<span className="sr-only"> {title.toLowerCase()}</span>
          </Button>
        ) : (
          aside
        )
      }
    >
      {folded ? <div className="text-ink-soft">{sentence}</div> : children}
    </Section>
  );
}

interface SaveRowProps<Typed extends FieldValues> {
  state: PlanSectionForm<Typed>;
  /** What the button says: "Save rates". */
  verb: string;
  /** After a save, or where nothing was changed. */
  onDone: () => void;
}

export function SaveRow<Typed extends FieldValues>({ state, verb, onDone }: SaveRowProps<Typed>) {
  const count = state.shownFaults.length;
  const save = async (): Promise<void> => {
    if (await state.save()) onDone();
  };
  return (
    <div className="mt-5 flex flex-wrap items-center gap-3">
      <Button variant="second" pending={state.isSaving} pendingLabel="Saving" onClick={() => void save()}>
        {verb}
      </Button>
      {state.isSaved && (
        <Button
          variant="quiet"
          onClick={() => {
            state.takeBack();
            onDone();
          }}
        >
          {state.isChanged ? 'Leave it as it was' : 'Close'}
        </Button>
      )}
      {count > 0 && (
        <p role="status" className="text-13 text-stop">
          {count === 1 ? 'One thing to put right above.' : `${count} things to put right above.`}
        </p>
      )}
    </div>
  );
}
