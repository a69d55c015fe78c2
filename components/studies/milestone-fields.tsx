import { useController } from 'react-hook-form';
import type { MilestonesTyped } from '@/components/studies/milestones-typed';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { Button } from '@/components/ui/button';
import { Checkbox } from '@/components/ui/checkbox';
import { DateField } from '@/components/ui/date-field';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';

const KINDS = [
  { value: 'randomised', label: 'randomised' },
  { value: 'events', label: 'events' },
  { value: 'follow-up', label: 'follow-up' },
  { value: 'all-of', label: 'all of' },
];

interface MilestoneFieldsProps {
  state: PlanSectionForm<MilestonesTyped>;
  place: number;
  rows: MilestonesTyped['rows'];
  code: string;
  /** Null for the last one left: a plan waits for something. */
  onRemove: (() => void) | null;
}

/** One milestone: its name, what it falls due at, and the day that the protocol plans. */
export function MilestoneFields({ state, place, rows, code, onRemove }: MilestoneFieldsProps) {
  const { form, errorOf } = state;
  const row = rows[place];
  if (!row) return null;
  const others = rows.filter((other) => other.key !== row.key);
  return (
    <li className="border-b border-rule py-3 first:border-t">
      <div className="grid items-start gap-x-2 gap-y-3 sm:grid-cols-[minmax(0,1.3fr)_minmax(0,1.1fr)_minmax(0,.75fr)_minmax(0,1.05fr)_60px]">
        <TextField
          label="Name"
          autoComplete="off"
          hint={code && `Code ${code}`}
          error={errorOf(`rows.${place}.name`)}
          {...form.register(`rows.${place}.name`)}
        />
        <SelectField
          label="Falls due at"
          options={KINDS}
          error={errorOf(`rows.${place}.kind`)}
          {...form.register(`rows.${place}.kind`)}
        />
        {row.kind === 'follow-up' ? (
          <NumberField
            label="Months after"
            error={errorOf(`rows.${place}.months`)}
            {...form.register(`rows.${place}.months`)}
          />
        ) : row.kind === 'all-of' ? (
          <p className="self-center text-13 text-ink-soft">those ticked below</p>
        ) : (
          <NumberField
            whole
            label="Count"
            error={errorOf(`rows.${place}.count`)}
            {...form.register(`rows.${place}.count`)}
          />
        )}
        <PlannedField state={state} place={place} />
        {onRemove && (
          <Button variant="quiet" size="small" className="-mx-3 sm:mt-[26px]" onClick={onRemove}>
            Remove<span className="sr-only"> {row.name}</span>
          </Button>
        )}
      </div>
      {row.kind === 'all-of' && <MilestoneParts state={state} place={place} others={others} />}
    </li>
  );
}

function PlannedField({ state: { form, errorOf }, place }: Omit<MilestonePartsProps, 'others'>) {
  const { field } = useController({ control: form.control, name: `rows.${place}.plannedOn` });
  return <DateField label="Planned for" placeholder="none" error={errorOf(field.name)} {...field} />;
}

interface MilestonePartsProps {
  state: PlanSectionForm<MilestonesTyped>;
  place: number;
  others: MilestonesTyped['rows'];
}

function MilestoneParts({ state: { form, errorOf }, place, others }: MilestonePartsProps) {
  const error = errorOf(`rows.${place}.of`);
  const { field } = useController({ control: form.control, name: `rows.${place}.of` });
  return (
    <fieldset className="mt-3">
      <legend className="text-13 font-600">It falls due when all of these are reached</legend>
      <div className="mt-1 flex flex-wrap gap-x-5 gap-y-1">
        {others.map(({ key, name }, order) => (
          <Checkbox
            key={key}
            ref={order === 0 ? field.ref : undefined}
            label={name || 'unnamed'}
            checked={field.value.includes(key)}
            onBlur={field.onBlur}
            onChange={({ target }) =>
              field.onChange(target.checked ? [...field.value, key] : field.value.filter((part) => part !== key))
            }
          />
        ))}
      </div>
      {error && <p className="mt-1 text-13 text-stop">{error}</p>}
    </fieldset>
  );
}
