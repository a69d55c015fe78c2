import Link from 'next/link';
import { EmptyState } from '@/components/ui/empty-state';

interface NoPermissionProps {
  /** Which permission is missing, as a sentence. */
  detail: string;
  /** The study, where there is one: its own front door leads to what the role does see. */
  code?: string;
}

/** A page that exists and is not this role's. What it holds is not hinted at. */
export function NoPermission({ detail, code }: NoPermissionProps) {
  return (
    <EmptyState
      heading
      title="This page is not open to you"
      action={
        <Link href={code ? `/studies/${code}` : '/studies'}>{code ? `What you see of ${code}` : 'Your studies'}</Link>
      }
    >
      <p>{detail}</p>
    </EmptyState>
  );
}
