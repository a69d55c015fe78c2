'use client';

import { useRouter } from 'next/navigation';
import { Button } from '@/components/ui/button';
import { formatDate } from '@/lib/format';
import { useAcknowledge } from '@/lib/publications/hooks';

interface Props {
  code: string;
  number: number;
  acknowledgedAt: string | null;
}

/** One action for all cautions: the sponsor says that they have read them. */
export function AcknowledgeCautions({ code, number, acknowledgedAt }: Props) {
  const router = useRouter();
  const acknowledge = useAcknowledge(code, number);
  const at = acknowledge.data?.acknowledgedAt ?? acknowledgedAt;
  return (
    <div className="space-y-2">
      {!at && (
        <Button
          pending={acknowledge.isPending}
          pendingLabel="Acknowledging"
          onClick={() => acknowledge.mutate(undefined, { onSuccess: () => router.refresh() })}
        >
          Acknowledge cautions
        </Button>
      )}
      {acknowledge.error && <p className="text-13 text-stop">{acknowledge.error.message} Try again.</p>}
      <p role="status" className="text-13">
        {at
          ? `Acknowledged by you on ${formatDate(at.slice(0, 10))}. The statistician sees it.`
          : 'Not acknowledged by you yet. The statistician sees who has.'}
      </p>
    </div>
  );
}
