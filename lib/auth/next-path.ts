/** Where to go after signing in: a path of this site and nothing else, so that no link can lead elsewhere. */
export function safeNextPath(next: string | null | undefined): string {
  return next && /^\/(?![/\\])[^\s\\]*$/.test(next) && !next.startsWith('/api/') ? next : '/studies';
}
