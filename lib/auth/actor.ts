import { systemClock } from '../clock';
import { getAuth } from './auth';
import type { Actor } from './scope';
import { SESSION_ABSOLUTE_SECONDS } from './session-limits';

/** Who sent this request, from their session cookie; null for a stranger or an expired session. */
export async function findActor(headers: Headers): Promise<Actor | null> {
  if (!headers.get('cookie')) return null;
  const found = await getAuth().api.getSession({ headers });
  if (!found) return null;
  const ageSeconds = (systemClock.now().getTime() - new Date(found.session.createdAt).getTime()) / 1000;
  if (ageSeconds > SESSION_ABSOLUTE_SECONDS) return null;
  return { personId: found.user.id, name: found.user.name, email: found.user.email };
}
