/** A full load, not a client-side step: what was cached for one person is never shown to the next. */
export function leaveTo(path: string): void {
  window.location.assign(path);
}
