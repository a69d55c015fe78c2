import { createHash } from 'node:crypto';
import { dictionary } from '@zxcvbn-ts/language-common';
import type { ActingRole, StudyRole } from '../auth/permissions';

/** The passwords seen most often in published leaks. */
const COMMON_PASSWORDS = new Set(dictionary['passwords-common']);

/** A trial manager brings in those who log and those who read; statisticians and managers are the owner's to choose. */
export function mayInvite(role: ActingRole, invited: StudyRole): boolean {
  if (role === 'owner') return true;
  return role === 'manager' && (invited === 'coordinator' || invited === 'sponsor');
}

/** Why a password is too easy to guess, or null. */
export function passwordFault(password: string, person: { name: string; email: string }): string | null {
  const plain = password.toLowerCase();
  const bare = plain.replace(/[^a-z0-9]/g, '');
  if (COMMON_PASSWORDS.has(plain) || COMMON_PASSWORDS.has(bare))
    return 'This password is one of the first that anyone would try. Choose another.';
  if (new Set(plain).size < 5) return 'This password repeats a few characters. Use more different ones.';
  const own = [person.email.split('@')[0]!, ...person.name.split(/\s+/)]
    .map((part) => part.toLowerCase())
    .filter((part) => part.length >= 4);
  if (own.some((part) => plain.replaceAll(part, '').length < 6))
    return 'This password is little more than your own name. Choose another.';
  return null;
}

/** Tokens are kept hashed: the database never holds a link that works. */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
