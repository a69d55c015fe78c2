'use client';

import { THEME_COOKIE, type Theme } from '@/components/shell/theme';

function shownNow(): Theme {
  return getComputedStyle(document.documentElement).colorScheme === 'dark' ? 'dark' : 'light';
}

/** Turns the page to its other sheet and remembers it for a year. Until it is pressed the system decides. */
export function ThemeSwitch() {
  const turn = (): void => {
    const theme: Theme = shownNow() === 'dark' ? 'light' : 'dark';
    document.documentElement.dataset.theme = theme;
    document.cookie = `${THEME_COOKIE}=${theme}; path=/; max-age=31536000; samesite=lax`;
  };
  return (
    <button
      type="button"
      onClick={turn}
      aria-label="Switch between light and dark"
      title="Light or dark"
      className="-m-1.5 self-center p-1.5 screen-only"
    >
      <svg viewBox="0 0 14 14" width="14" height="14" aria-hidden="true" className="block">
        <rect x="0.75" y="0.75" width="12.5" height="12.5" fill="none" stroke="currentColor" strokeWidth="1.5" />
        <path d="M1 13 13 1V13z" fill="currentColor" />
      </svg>
    </button>
  );
}
