'use client';

import { useFieldArray, useWatch } from 'react-hook-form';
import Link from 'next/link';
import { CountryRates } from '@/components/studies/country-rates';
import type { EnrolmentTyped } from '@/components/studies/enrolment-typed';
import { ratesSentence, sitesWords, targetSentence } from '@/components/studies/plan-words';
import { PlannedSitesFields, type PlannedSites } from '@/components/studies/planned-sites';
import { SaveRow, SectionFrame } from '@/components/studies/section-frame';
import { SectionNotices } from '@/components/studies/section-notices';
import { SeasonFields } from '@/components/studies/season-fields';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import type { Plan, PlanView } from '@/lib/studies/schema';

interface EnrolmentSectionsProps {
  plan: PlanView;
  state: PlanSectionForm<EnrolmentTyped>;
  folded: boolean;
  onChange: (() => void) | null;
  onDone: () => void;
  plannedSites: PlannedSites;
  onPlannedSites: (sites: PlannedSites) => void;
}

/** Steps 2 and 3: one section of the plan under two headings, saved together. */
export function EnrolmentSections(props: EnrolmentSectionsProps) {
  const { plan, state, folded, onChange, onDone, plannedSites, onPlannedSites } = props;
  const { form, errorOf } = state;
  const saved = state.savedValue as Plan['enrolment'] | null;
  const countryRows = useFieldArray({ control: form.control, name: 'countryRates' });
  const rampMonths = useWatch({ control: form.control, name: 'rampMonths' });
  const sitesHref = `/studies/${encodeURIComponent(plan.study.code)}/sites`;
  const standIn = plan.sites.length === 0 && <PlannedSitesFields value={plannedSites} onChange={onPlannedSites} />;
  return (
    <>
      <SectionFrame
        step={2}
        id="target"
        title="Sites and target"
        folded={folded}
        onChange={onChange}
        sentence={
          <>
            {saved ? targetSentence(saved, plan.sites) : 'Nothing is set yet.'} <Link href={sitesHref}>Sites</Link>
            {standIn}
          </>
        }
      >
        <SectionNotices section="enrolment" state={state} />
        <div className="grid gap-3 sm:grid-cols-3">
          <NumberField
            whole
            label="Patients to randomise"
            unit="patients"
            hint="Enrolment stops there."
            error={errorOf('target')}
            {...form.register('target')}
          />
          <p className="text-ink-soft sm:col-span-2 sm:pt-6">
            {plan.sites.length > 0 ? `From ${sitesWords(plan.sites)}. ` : 'No site is in the study yet. '}
            <Link href={sitesHref}>{plan.sites.length > 0 ? 'Open the sites' : 'Add sites, or upload a list'}</Link>
          </p>
        </div>
        {standIn}
      </SectionFrame>
      <SectionFrame
        step={3}
        id="rates"
        title="Rates"
        aside="What the plan assumes of a site"
        folded={folded}
        onChange={onChange}
        sentence={saved ? ratesSentence(saved) : 'Nothing is set yet.'}
      >
        <div className="grid gap-x-3 gap-y-5 sm:grid-cols-3">
          <NumberField
            label="Mean rate of a site"
            unit="a month"
            error={errorOf('meanPerMonth')}
            {...form.register('meanPerMonth')}
          />
          <NumberField
            label="Spread between sites (CV)"
            hint="0.01: all alike. 0.8 is usual."
            error={errorOf('cv')}
            {...form.register('cv')}
          />
          <SelectField
            label="The two come"
            options={[
              { value: 'data', label: 'from the data' },
              { value: 'plan', label: 'as planned' },
            ]}
            hint="From the data: the plan gives way as sites log."
            error={errorOf('basis')}
            {...form.register('basis')}
          />
          <NumberField
            label="First months of a site"
            unit="months"
            hint="Empty: full rate from the first day."
            error={errorOf('rampMonths')}
            {...form.register('rampMonths')}
          />
          {rampMonths !== '' && (
            <NumberField
              label="at a share of its rate"
              unit="%"
              error={errorOf('rampPercent')}
              {...form.register('rampPercent')}
            />
          )}
        </div>
        <CountryRates state={state} rows={countryRows} />
        <SeasonFields state={state} />
        <SaveRow state={state} verb="Save target and rates" onDone={onDone} />
      </SectionFrame>
    </>
  );
}
