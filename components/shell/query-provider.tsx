'use client';

import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { ProblemError } from '@/lib/http/client';

/** A refusal stays one however often it is asked again; only a dropped line is worth a second try. */
function worthAnotherTry(failures: number, error: Error): boolean {
  return failures < 2 && !(error instanceof ProblemError);
}

/** One cache per browser tab. What a page was rendered with counts as fresh for a moment. */
export function QueryProvider({ children }: { children: ReactNode }) {
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { staleTime: 10_000, retry: worthAnotherTry } } }),
  );
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>;
}
