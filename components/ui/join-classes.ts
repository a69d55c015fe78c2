/** Class names that hold, in order, with the absent ones left out. */
export function joinClasses(...names: (string | false | null | undefined)[]): string {
  return names.filter(Boolean).join(' ');
}
