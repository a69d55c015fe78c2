import Link from 'next/link';
import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { countryName } from '@/lib/countries';
import { SITE_STATUS_NAMES, SITE_STATUSES, type SitesQuery } from '@/lib/sites/schema';

interface SiteFilterProps {
  code: string;
  query: SitesQuery;
  countries: readonly string[];
}

/** A plain form: what is looked for is part of the address, so that a view can be sent to somebody. */
export function SiteFilter({ code, query, countries }: SiteFilterProps) {
  const isNarrowed = Boolean(query.search || query.country || query.status);
  return (
    <form method="get" className="mb-3 grid gap-3 sm:grid-cols-[240px_180px_140px_auto_1fr] sm:items-end sm:gap-5">
      <TextField
        label="Find"
        name="search"
        defaultValue={query.search}
        placeholder="Code, name or country"
        maxLength={100}
      />
      <SelectField
        label="Country"
        name="country"
        defaultValue={query.country ?? ''}
        options={[{ value: '', label: 'All' }, ...countries.map((value) => ({ value, label: countryName(value) }))]}
      />
      <SelectField
        label="Status"
        name="status"
        defaultValue={query.status ?? ''}
        options={[
          { value: '', label: 'All' },
          ...SITE_STATUSES.map((value) => ({ value, label: SITE_STATUS_NAMES[value] })),
        ]}
      />
      <Button type="submit" variant="second">
        Show
      </Button>
      {isNarrowed && (
        <p className="text-13 sm:pb-2.5">
          <Link href={`/studies/${code}/sites`}>Show all sites</Link>
        </p>
      )}
    </form>
  );
}
