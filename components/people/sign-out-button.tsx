'use client';

import { authRequest } from '@/components/people/auth-request';

export function SignOutButton() {
  const leave = async (): Promise<void> => {
    try {
      await authRequest('/sign-out', {}, {});
    } finally {
      window.location.assign('/sign-in');
    }
  };
  return (
    <button type="button" onClick={leave} className="hover:underline">
      Sign out
    </button>
  );
}
