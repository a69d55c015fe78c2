'use client';

import { useState } from 'react';
import { useWatch } from 'react-hook-form';
import type { EventsTyped } from '@/components/studies/events-typed';
import { MedianFromProtocol } from '@/components/studies/median-from-protocol';
import { eventsSentence } from '@/components/studies/plan-words';
import { SaveRow, SectionFrame } from '@/components/studies/section-frame';
import { SectionNotices } from '@/components/studies/section-notices';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { Button } from '@/components/ui/button';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { OFFERED_FAMILIES, type Plan } from '@/lib/studies/schema';

const FAMILY_NAMES: Record<(typeof OFFERED_FAMILIES)[number], string> = {
  exponential: 'exponential',
  weibull: 'Weibull',
};

interface EventsSectionProps {
  state: PlanSectionForm<EventsTyped>;
  folded: boolean;
  onChange: (() => void) | null;
  onDone: () => void;
}

export function EventsSection({ state, folded, onChange, onDone }: EventsSectionProps) {
  const { form } = state;
  const counted = useWatch({ control: form.control, name: 'counted' });
  return (
    <SectionFrame
      step={5}
      id="events"
      title="Events model"
      aside="All patients together; nothing by treatment"
      folded={folded}
      onChange={onChange}
      sentence={state.isSaved ? eventsSentence(state.savedValue as Plan['events']) : 'Nothing is set yet.'}
    >
      <SectionNotices section="events" state={state} />
      <SelectField
        label="The study"
        fieldClassName="mb-5 max-w-[320px]"
        options={[
          { value: 'yes', label: 'waits for events' },
          { value: 'no', label: 'counts no events' },
        ]}
        {...form.register('counted')}
      />
      {counted === 'yes' && <EventsFields state={state} />}
      <SaveRow state={state} verb="Save events model" onDone={onDone} />
    </SectionFrame>
  );
}

function EventsFields({ state: { form, errorOf } }: { state: PlanSectionForm<EventsTyped> }) {
  const family = useWatch({ control: form.control, name: 'family' });
  const [helping, setHelping] = useState(false);
  return (
    <>
      <div className="grid items-start gap-x-3 gap-y-5 sm:grid-cols-3">
        <div>
          <NumberField
            label="Median time to event"
            unit="months"
            error={errorOf('medianMonths')}
            {...form.register('medianMonths')}
          />
          <Button
            variant="quiet"
            size="small"
            className="-ml-3"
            aria-expanded={helping}
            onClick={() => setHelping(!helping)}
          >
            Work it out from the protocol
          </Button>
        </div>
        <SelectField
          label="Family"
          hint={family === 'weibull' ? 'A hazard that rises or falls.' : 'A steady hazard.'}
          options={OFFERED_FAMILIES.map((value) => ({ value, label: FAMILY_NAMES[value] }))}
          error={errorOf('family')}
          {...form.register('family')}
        />
        {family === 'weibull' && (
          <NumberField
            label="Planned shape"
            hint="1: a steady hazard. Above 1 it rises with time."
            error={errorOf('shape')}
            {...form.register('shape')}
          />
        )}
        {family === 'weibull' && (
          <NumberField
            label="Never have the event"
            unit="%"
            hint="The median is that of the others."
            error={errorOf('curePercent')}
            {...form.register('curePercent')}
          />
        )}
      </div>
      {helping && (
        <MedianFromProtocol
          onMedian={(median) => {
            form.setValue('medianMonths', median, { shouldValidate: true, shouldTouch: true });
            setHelping(false);
          }}
        />
      )}
      <div className="mt-5 grid items-start gap-x-3 gap-y-5 sm:grid-cols-3">
        <SelectField
          label="The median comes"
          options={[
            { value: 'data', label: 'from the data' },
            { value: 'plan', label: 'as planned' },
          ]}
          hint="From the data: the plan weighs as beside."
          error={errorOf('basis')}
          {...form.register('basis')}
        />
        <NumberField
          label="Weight of the plan"
          unit="events"
          hint="How many events the plan’s median counts for. 0: none."
          error={errorOf('priorEvents')}
          {...form.register('priorEvents')}
        />
        <NumberField
          label="Each patient is followed for"
          unit="months"
          hint="Empty: until the study ends."
          error={errorOf('followUpMonths')}
          {...form.register('followUpMonths')}
        />
        <NumberField
          label="Loss to follow-up"
          unit="% a month"
          hint="0: nobody is lost."
          error={errorOf('lossPercent')}
          {...form.register('lossPercent')}
        />
        <NumberField
          label="Weight of the planned loss"
          unit="patients"
          hint="How many losses the planned one counts for."
          error={errorOf('lossPrior')}
          {...form.register('lossPrior')}
        />
      </div>
    </>
  );
}
