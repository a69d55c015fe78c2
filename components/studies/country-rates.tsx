import type { UseFieldArrayReturn } from 'react-hook-form';
import type { EnrolmentTyped } from '@/components/studies/enrolment-typed';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { Button } from '@/components/ui/button';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { listCountries } from '@/lib/countries';

interface CountryRatesProps {
  state: PlanSectionForm<EnrolmentTyped>;
  rows: UseFieldArrayReturn<EnrolmentTyped, 'countryRates'>;
}

/** Countries whose sites are planned to enrol at another mean rate. */
export function CountryRates({ state: { form, errorOf }, rows }: CountryRatesProps) {
  const options = [
    { value: '', label: 'Choose a country' },
    ...listCountries().map(({ code, name }) => ({ value: code, label: name })),
  ];
  return (
    <fieldset className="mt-5">
      <legend className="mb-1 text-13 font-600">Countries with another mean rate</legend>
      {rows.fields.map((row, place) => (
        <div key={row.id} className="mb-2 grid items-start gap-3 sm:grid-cols-[1fr_1fr_auto]">
          <SelectField
            label="Country"
            labelHidden
            options={options}
            error={errorOf(`countryRates.${place}.country`)}
            {...form.register(`countryRates.${place}.country`)}
          />
          <NumberField
            label="Mean rate of a site there"
            labelHidden
            unit="a month"
            error={errorOf(`countryRates.${place}.meanPerMonth`)}
            {...form.register(`countryRates.${place}.meanPerMonth`)}
          />
          <Button variant="quiet" size="small" onClick={() => rows.remove(place)}>
            Remove
          </Button>
        </div>
      ))}
      <Button variant="second" size="small" onClick={() => rows.append({ country: '', meanPerMonth: '' })}>
        Add a country
      </Button>
    </fieldset>
  );
}
