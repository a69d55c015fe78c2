'use client';

import { simulationSentence } from '@/components/studies/plan-words';
import type { SimulationTyped } from '@/components/studies/plan-sections';
import { SectionNotices } from '@/components/studies/section-notices';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { NumberField } from '@/components/ui/number-field';
import type { Plan } from '@/lib/studies/schema';

interface SimulationFieldsProps {
  state: PlanSectionForm<SimulationTyped>;
  readOnly: boolean;
}

/** How the forecast is drawn: three figures that most studies leave as they are. */
export function SimulationFields({ state, readOnly }: SimulationFieldsProps) {
  const { form, errorOf } = state;
  if (readOnly) {
    const saved = state.savedValue as Plan['simulation'] | null;
    return <p className="text-ink-soft">{saved ? simulationSentence(saved) : 'Nothing is set yet.'}</p>;
  }
  return (
    <>
      <SectionNotices section="simulation" state={state} />
      <div className="grid gap-3 sm:grid-cols-3">
        <NumberField whole label="Draws" hint="10,000 is usual." error={errorOf('draws')} {...form.register('draws')} />
        <NumberField
          whole
          label="Seed"
          hint="The same seed, the same forecast."
          error={errorOf('seed')}
          {...form.register('seed')}
        />
        <NumberField
          whole
          label="Horizon"
          unit="months"
          hint="Later dates are not looked for."
          error={errorOf('horizonMonths')}
          {...form.register('horizonMonths')}
        />
      </div>
    </>
  );
}
