import type { Config } from 'tailwindcss';
import plugin from 'tailwindcss/plugin';

/**
 * The tokens, named by what a value means and never by what it looks like. The two sheets are tuned apart: the dark one
 * is no inversion. Screens use the names only (`text-ink-soft`, `border-rule`), so no screen knows which sheet it is on.
 */
export const sheets = {
  light: {
    paper: '#FBFAF6',
    'paper-sunk': '#F3F0E8',
    ink: '#1D2530',
    'ink-soft': '#56606D',
    rule: '#D9D4C7',
    'rule-strong': '#857E6D',
    patients: '#0E6B6F',
    events: '#A6480F',
    plan: '#56606D',
    caution: '#7A5200',
    'caution-paper': '#FBF0D6',
    stop: '#9B1C31',
  },
  dark: {
    paper: '#15181C',
    'paper-sunk': '#1E2328',
    ink: '#ECE8DD',
    'ink-soft': '#A7AEB6',
    rule: '#363C43',
    'rule-strong': '#7C838B',
    patients: '#62BDBA',
    events: '#E5925C',
    plan: '#A7AEB6',
    caution: '#E6BE66',
    'caution-paper': '#2C2617',
    stop: '#F2909C',
  },
} as const;

export type ColourToken = keyof typeof sheets.light;

/** Strength of the 50 % and the 80 % band, and how a browser paints its own controls. */
const bands = {
  light: { 'band-50': '0.35', 'band-80': '0.16' },
  dark: { 'band-50': '0.32', 'band-80': '0.17' },
} as const;

function variables(sheet: keyof typeof sheets): Record<string, string> {
  const entries = Object.entries({ ...sheets[sheet], ...bands[sheet] });
  return { 'color-scheme': sheet, ...Object.fromEntries(entries.map(([name, value]) => [`--${name}`, value])) };
}

const colours = Object.fromEntries(Object.keys(sheets.light).map((name) => [name, `var(--${name})`]));

const config = {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
  theme: {
    colors: { ...colours, transparent: 'transparent', current: 'currentColor' },
    fontFamily: { title: 'var(--font-title)', text: 'var(--font-text)' },
    fontSize: {
      13: ['0.8125rem', '1.125rem'],
      15: ['0.9375rem', '1.375rem'],
      18: ['1.125rem', '1.625rem'],
      24: ['1.5rem', '1.875rem'],
      34: ['2.125rem', '2.5rem'],
      48: ['3rem', '3.25rem'],
    },
    fontWeight: { 400: '400', 500: '500', 600: '600' },
    borderRadius: { none: '0', DEFAULT: '2px', full: '9999px' },
    boxShadow: { none: 'none' },
    screens: { sm: '560px', md: '761px', lg: '1024px', xl: '1280px' },
    extend: {
      // 4 · 8 · 12 · 20 · 32 · 52 are the steps 1 2 3 5 8 13 of the default scale.
      maxWidth: { content: '70rem', leaf: '74rem', measure: '64ch' },
      transitionDuration: { DEFAULT: '150ms' },
    },
  },
  plugins: [
    plugin(({ addBase }) =>
      addBase({
        ':root': variables('light'),
        '@media (prefers-color-scheme: dark)': { ':root:not([data-theme="light"])': variables('dark') },
        ':root[data-theme="dark"]': variables('dark'),
      }),
    ),
  ],
} satisfies Config;

export default config;
