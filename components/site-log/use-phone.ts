import { useSyncExternalStore } from 'react';

const PHONE = '(max-width: 760px)';

function subscribe(changed: () => void): () => void {
  const query = window.matchMedia(PHONE);
  query.addEventListener('change', changed);
  return () => query.removeEventListener('change', changed);
}

/** Whether the sheet has a phone's width. One sheet is drawn, never two of which one is hidden. */
export function usePhone(): boolean {
  return useSyncExternalStore(
    subscribe,
    () => window.matchMedia(PHONE).matches,
    () => false,
  );
}

const never = (): (() => void) => () => undefined;

/** False on the server and while its page is taken over; then true. */
export function useOnDevice(): boolean {
  return useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
}
