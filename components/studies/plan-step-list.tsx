import type { PlanStep } from '@/components/studies/plan-steps';
import { joinClasses } from '@/components/ui/join-classes';

/** The form's own list of contents, with how each step stands. */
export function PlanStepList({ steps }: { steps: readonly PlanStep[] }) {
  return (
    <nav aria-label="Steps of the plan" className="text-13 lg:pt-3 screen-only">
      <ol className="flex gap-5 overflow-x-auto lg:sticky lg:top-3 lg:block">
        {steps.map(({ step, id, title, words, faults }) => (
          <li key={id} className="flex-none">
            <a href={`#${id}`} className="block border-b border-rule py-[7px] no-underline hover:border-ink">
              <span className="mr-1.5 font-title text-18 leading-[22px] font-400">{step}</span>
              {title}
              <span className={joinClasses('block', faults > 0 ? 'text-stop' : 'text-ink-soft')}>{words}</span>
            </a>
          </li>
        ))}
      </ol>
    </nav>
  );
}
