'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { SiteForm } from '@/components/sites/site-form';
import { SiteTable } from '@/components/sites/site-table';
import { Dialog } from '@/components/ui/dialog';
import { EmptyState } from '@/components/ui/empty-state';
import type { ListedSite } from '@/lib/sites/schema';

interface SiteBoardProps {
  code: string;
  sites: readonly ListedSite[];
  countryNames: Readonly<Record<string, string>>;
}

/** The table, and the form that a row opens. */
export function SiteBoard({ code, sites, countryNames }: SiteBoardProps) {
  const [changing, setChanging] = useState<ListedSite | null>(null);
  const router = useRouter();
  const close = (): void => setChanging(null);
  return (
    <>
      {sites.length > 0 ? (
        <SiteTable code={code} sites={sites} countryNames={countryNames} onChange={setChanging} />
      ) : (
        <EmptyState title="No site is like that">Look for another code, name or country, or show all sites.</EmptyState>
      )}
      <Dialog
        open={changing !== null}
        onOpenChange={(open) => !open && close()}
        title={changing ? `Site ${changing.code}, ${changing.city}` : ''}
      >
        {changing && (
          <SiteForm
            code={code}
            site={changing}
            onLeave={close}
            onDone={() => {
              close();
              router.refresh();
            }}
          />
        )}
      </Dialog>
    </>
  );
}
