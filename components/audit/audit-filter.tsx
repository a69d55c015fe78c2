import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { AUDIT_KINDS } from '@/components/audit/audit-words';

/** A plain form: filters are part of the address, so that a view of the trail can be sent to somebody. */
export function AuditFilter({ values }: { values: Record<string, string | undefined> }) {
  return (
    <form method="get" className="mb-5 grid gap-3 sm:grid-cols-[1fr_1fr_1fr_1fr_auto] sm:items-end">
      <TextField label="From" name="from" defaultValue={values.from} placeholder="2027-03-01" inputMode="numeric" />
      <TextField label="To" name="to" defaultValue={values.to} placeholder="2027-03-31" inputMode="numeric" />
      <TextField label="Person" name="person" defaultValue={values.person} />
      <SelectField
        label="Kind"
        name="kind"
        defaultValue={values.kind ?? ''}
        options={[
          { value: '', label: 'All' },
          ...Object.entries(AUDIT_KINDS).map(([value, label]) => ({ value, label })),
        ]}
      />
      <Button type="submit" variant="second">
        Show
      </Button>
    </form>
  );
}
