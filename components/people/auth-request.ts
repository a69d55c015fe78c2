import { OfflineError } from '@/lib/http/client';

/** A call to the sign-in service: its refusals become one plain sentence each. */
export async function authRequest(path: string, body: unknown, sentences: Record<number, string>): Promise<void> {
  let response: Response;
  try {
    response = await fetch(`/api/auth${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
      credentials: 'same-origin',
    });
  } catch {
    throw new OfflineError();
  }
  if (response.ok) return;
  if (response.status === 429) {
    const seconds = Number(response.headers.get('x-retry-after') ?? response.headers.get('retry-after') ?? 60);
    throw new Error(`Too many attempts. Try again in ${seconds} seconds.`);
  }
  throw new Error(sentences[response.status] ?? 'That did not work. Try again in a minute.');
}
