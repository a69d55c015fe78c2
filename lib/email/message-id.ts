import { createHash } from 'node:crypto';
import { env } from '../env';

/**
 * The same for the same message at every attempt, so that a relay or a mailbox sees a second copy for what it is. A machine
 * that is only known by a number has no name to sign with.
 */
export function messageIdOf(key: string): string {
  const { hostname } = new URL(env().origin);
  const host = /[a-z]/i.test(hostname) ? hostname : 'kalends.invalid';
  return `<${createHash('sha256').update(key).digest('hex').slice(0, 40)}@${host}>`;
}
