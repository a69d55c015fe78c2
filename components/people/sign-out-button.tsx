'use client';

import { leaveTo } from '@/components/people/leave-to';
import { authRequest } from '@/components/people/auth-request';

export function SignOutButton() {
  const leave = async (): Promise<void> => {
    try {
      await authRequest('/sign-out', {}, {});
    } finally {
      leaveTo('/sign-in');
    }
  };
  return (
    <button type="button" onClick={leave} className="hover:underline">
      Sign out
    </button>
  );
}
