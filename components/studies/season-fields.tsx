import type { EnrolmentTyped } from '@/components/studies/enrolment-typed';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { joinClasses } from '@/components/ui/join-classes';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** Twelve shares in one box, as in a printed table. Only the months that differ need typing. */
export function SeasonFields({ state: { form, errorOf } }: { state: PlanSectionForm<EnrolmentTyped> }) {
  const faults = MONTHS.flatMap((month, place) => {
    const message = errorOf(`season.${place}`);
    return message ? [{ month, place, message }] : [];
  });
  return (
    <fieldset className="mt-5">
      <legend className="mb-1 text-13 font-600">Season, share of the usual rate</legend>
      <div
        className={joinClasses(
          'grid grid-cols-6 gap-px rounded border border-rule-strong bg-rule sm:grid-cols-12',
          faults.length > 0 && 'border-stop outline outline-stop',
        )}
      >
        {MONTHS.map((month, place) => (
          <div key={month} className="bg-paper pt-1 text-center">
            <label htmlFor={`season-${place}`} className="block text-13 text-ink-soft">
              {month}
            </label>
            <input
              id={`season-${place}`}
              type="text"
              inputMode="decimal"
              autoComplete="off"
              aria-invalid={errorOf(`season.${place}`) ? true : undefined}
              aria-describedby={errorOf(`season.${place}`) ? `season-${place}-error` : undefined}
              className="block min-h-8 w-full min-w-0 bg-transparent px-0.5 pb-1 text-center text-13 focus-visible:-outline-offset-2 aria-invalid:text-stop"
              {...form.register(`season.${place}`)}
            />
          </div>
        ))}
      </div>
      {faults.map(({ month, place, message }) => (
        <p key={month} id={`season-${place}-error`} className="mt-1 text-13 text-stop">
          {month}: {message}
        </p>
      ))}
      <p className="mt-1 text-13 text-ink-soft">1: as usual. 0.7: seven tenths of it. 0: nobody.</p>
    </fieldset>
  );
}
