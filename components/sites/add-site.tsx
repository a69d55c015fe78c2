'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { SiteForm } from '@/components/sites/site-form';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

export function AddSite({ code }: { code: string }) {
  const [open, setOpen] = useState(false);
  const router = useRouter();
  return (
    <Dialog open={open} onOpenChange={setOpen} title="Add a site" trigger={<Button>Add a site</Button>}>
      <SiteForm
        code={code}
        site={null}
        onLeave={() => setOpen(false)}
        onDone={() => {
          setOpen(false);
          router.refresh();
        }}
      />
    </Dialog>
  );
}
