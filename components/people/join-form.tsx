'use client';

import Link from 'next/link';
import { useState } from 'react';
import { leaveTo } from '@/components/people/leave-to';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { callOperation } from '@/lib/http/client';
import { joinOperation } from '@/lib/people/operations';

interface Props {
  token: string;
  email: string;
  signedInAs: string | null;
}

/** For somebody who has an account: one press, with the right address signed in. */
export function JoinForm({ token, email, signedInAs }: Props) {
  const [pending, setPending] = useState(false);
  const [error, setError] = useState<string | null>(null);
  if (signedInAs?.toLowerCase() !== email.toLowerCase()) {
    return (
      <Notice title={`Sign in as ${email}`}>
        {signedInAs ? `You are signed in as ${signedInAs}. Sign out first, then ` : 'You have an account. '}
        <Link href={`/sign-in?next=${encodeURIComponent(`/invitation/${token}`)}`}>sign in</Link> and come back to this
        invitation.
      </Notice>
    );
  }
  const accept = async (): Promise<void> => {
    setPending(true);
    setError(null);
    try {
      await callOperation(joinOperation, { params: {}, body: { token } });
      leaveTo('/studies');
    } catch (failure) {
      setError((failure as Error).message);
      setPending(false);
    }
  };
  return (
    <div className="space-y-5">
      {error && (
        <Notice tone="stop" live title="Not accepted">
          {error}
        </Notice>
      )}
      <Button onClick={accept} pending={pending} pendingLabel="Accepting">
        Accept the invitation
      </Button>
    </div>
  );
}
