import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/select-field';
import { formatDate } from '@/lib/format';
import type { PlanComparison, PlanVersionHead } from '@/lib/studies/schema';

interface VersionChoiceProps {
  versions: readonly PlanVersionHead[];
  comparison: PlanComparison | null;
}

/** A plain form, so that the address of a comparison can be sent on. */
export function VersionChoice({ versions, comparison }: VersionChoiceProps) {
  const options = versions.map(({ number, createdAt }) => ({
    value: String(number),
    label: `Version ${number}, ${formatDate(createdAt.slice(0, 10))}`,
  }));
  const [latest, before] = versions;
  return (
    <form className="grid max-w-measure items-end gap-3 sm:grid-cols-[1fr_1fr_auto]">
      <SelectField
        label="From"
        name="from"
        options={options}
        defaultValue={String(comparison?.from.number ?? before?.number ?? 1)}
      />
      <SelectField
        label="to"
        name="to"
        options={options}
        defaultValue={String(comparison?.to.number ?? latest?.number ?? 1)}
      />
      <Button type="submit" variant="second">
        Compare
      </Button>
    </form>
  );
}
