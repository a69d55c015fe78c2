import localFont from 'next/font/local';

/*
 * Each family comes in two files, so that a page in English does not fetch the accents of Central Europe. The second
 * has a name of its own, and `app/globals.css` lists it after the first; no fallback is adjusted into the first, or a
 * system face would draw an "ń" before the right one were asked. The compiler reads these calls without running them, so
 * the ranges are written out.
 */
const newsreader = localFont({
  src: '../fonts/newsreader-latin.woff2',
  weight: '200 800',
  variable: '--font-newsreader',
  adjustFontFallback: false,
});

const newsreaderExt = localFont({
  src: '../fonts/newsreader-latin-ext.woff2',
  weight: '200 800',
  variable: '--font-newsreader-ext',
  adjustFontFallback: false,
  preload: false,
  declarations: [
    {
      prop: 'unicode-range',
      value:
        'U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1D00-1DBF, U+1E00-1E9F, U+1EF2-1EFF, U+2020, U+20A0-20AB, U+20AD-20C0, U+2113, U+2C60-2C7F, U+A720-A7FF',
    },
  ],
});

/** For the letters of formulas; fetched only where one stands. */
const newsreaderItalic = localFont({
  src: '../fonts/newsreader-latin-italic.woff2',
  weight: '200 800',
  style: 'italic',
  variable: '--font-newsreader-italic',
  adjustFontFallback: false,
  preload: false,
});

const publicSans = localFont({
  src: '../fonts/public-sans-latin.woff2',
  weight: '100 900',
  variable: '--font-public-sans',
  adjustFontFallback: false,
});

const publicSansExt = localFont({
  src: '../fonts/public-sans-latin-ext.woff2',
  weight: '100 900',
  variable: '--font-public-sans-ext',
  adjustFontFallback: false,
  preload: false,
  declarations: [
    {
      prop: 'unicode-range',
      value:
        'U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1D00-1DBF, U+1E00-1E9F, U+1EF2-1EFF, U+2020, U+20A0-20AB, U+20AD-20C0, U+2113, U+2C60-2C7F, U+A720-A7FF',
    },
  ],
});

export const fontClasses = [newsreader, newsreaderExt, newsreaderItalic, publicSans, publicSansExt]
  .map((font) => font.variable)
  .join(' ');
