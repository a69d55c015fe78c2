export const THEME_COOKIE = 'kalends-theme';

export type Theme = 'light' | 'dark';

/** The sheet a visitor chose, or none: then the system's preference holds. */
export function readTheme(value: string | undefined): Theme | undefined {
  return value === 'light' || value === 'dark' ? value : undefined;
}
