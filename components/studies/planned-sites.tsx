import { DateField } from '@/components/ui/date-field';
import { NumberField } from '@/components/ui/number-field';

/** A stand-in for sites that are not in the study yet: so many, opening evenly between two days. As typed. */
export interface PlannedSites {
  count: string;
  from: string;
  to: string;
}

interface PlannedSitesFieldsProps {
  value: PlannedSites;
  onChange: (value: PlannedSites) => void;
}

/** For the picture alone, and said to be: the plan holds no sites, the sites page does. */
export function PlannedSitesFields({ value, onChange }: PlannedSitesFieldsProps) {
  return (
    <fieldset className="mt-5">
      <legend className="mb-1 text-13 font-600">Until then, for the picture beside this form only</legend>
      <div className="grid items-start gap-3 sm:grid-cols-3">
        <NumberField
          whole
          label="Sites"
          unit="sites"
          value={value.count}
          onChange={(event) => onChange({ ...value, count: event.target.value })}
        />
        <DateField label="The first opens" value={value.from} onChange={(from) => onChange({ ...value, from })} />
        <DateField
          label="The last opens"
          value={value.to}
          error={value.to && value.from && value.to < value.from ? 'It lies before the first.' : undefined}
          onChange={(to) => onChange({ ...value, to })}
        />
      </div>
      <p className="mt-1 text-13 text-ink-soft">
        They open evenly between the two days. Kept on this device and not part of the plan.
      </p>
    </fieldset>
  );
}
