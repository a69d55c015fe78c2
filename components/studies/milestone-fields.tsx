import type { UseFormReturn } from 'react-hook-form';
import type { MilestonesTyped } from '@/components/studies/milestones-typed';
import { Button } from '@/components/ui/button';
import { FormDateField } from '@/components/ui/form-date-field';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';

const KINDS = [
  { value: 'randomised', label: 'patients randomised' },
  { value: 'events', label: 'events' },
  { value: 'follow-up', label: 'last patient and months' },
  { value: 'all-of', label: 'all of several' },
];

interface MilestoneFieldsProps {
  form: UseFormReturn<MilestonesTyped>;
  place: number;
  rows: MilestonesTyped['rows'];
  code: string;
  /** Null for the last one left: a plan waits for something. */
  onRemove: (() => void) | null;
}

/** One milestone: its name, what it falls due at, and the day that the protocol plans. */
export function MilestoneFields({ form, place, rows, code, onRemove }: MilestoneFieldsProps) {
  const errors = form.formState.errors.rows?.[place];
  const row = rows[place];
  if (!row) return null;
  const others = rows.filter((other) => other.key !== row.key);
  const tick = (key: string, ticked: boolean): void =>
    form.setValue(`rows.${place}.of`, ticked ? [...row.of, key] : row.of.filter((part) => part !== key), {
      shouldValidate: true,
      shouldTouch: true,
    });
  return (
    <li className="border-b border-rule py-3 first:border-t">
      <div className="grid items-start gap-x-2 gap-y-3 sm:grid-cols-[minmax(0,1.3fr)_minmax(0,1.2fr)_minmax(0,.8fr)_minmax(0,1.1fr)]">
        <TextField
          label="Name"
          autoComplete="off"
          hint={code && `Code ${code}`}
          error={errors?.name?.message}
          {...form.register(`rows.${place}.name`)}
        />
        <SelectField
          label="Falls due at"
          options={KINDS}
          error={errors?.kind?.message}
          {...form.register(`rows.${place}.kind`)}
        />
        {row.kind === 'follow-up' ? (
          <NumberField
            label="After it"
            unit="months"
            error={errors?.months?.message}
            {...form.register(`rows.${place}.months`)}
          />
        ) : row.kind === 'all-of' ? (
          <p className="self-center text-13 text-ink-soft">those ticked below</p>
        ) : (
          <NumberField whole label="Count" error={errors?.count?.message} {...form.register(`rows.${place}.count`)} />
        )}
        <FormDateField label="Planned for" control={form.control} name={`rows.${place}.plannedOn`} placeholder="none" />
      </div>
      {row.kind === 'all-of' && (
        <fieldset className="mt-3">
          <legend className="text-13 font-600">It falls due when all of these are reached</legend>
          <div className="mt-1 flex flex-wrap gap-x-5 gap-y-1">
            {others.map((other) => (
              <label key={other.key} className="flex items-baseline gap-2">
                <input
                  type="checkbox"
                  checked={row.of.includes(other.key)}
                  className="size-[18px] self-center accent-ink"
                  onChange={(event) => tick(other.key, event.target.checked)}
                />
                {other.name || 'unnamed'}
              </label>
            ))}
          </div>
          {errors?.of?.message && <p className="mt-1 text-13 text-stop">{errors.of.message}</p>}
        </fieldset>
      )}
      {onRemove && (
        <Button variant="quiet" size="small" className="-ml-3" onClick={onRemove}>
          Remove<span className="sr-only"> {row.name}</span>
        </Button>
      )}
    </li>
  );
}
