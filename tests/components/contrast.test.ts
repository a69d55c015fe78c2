import { describe, expect, it } from 'vitest';
import { sheets, type ColourToken } from '@/tailwind.config';

/** Relative luminance and contrast ratio as WCAG 2.2 defines them. */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5]
    .map((at) => parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((channel) => (channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(one: string, other: string): number {
  const [light = 0, dark = 0] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (light + 0.05) / (dark + 0.05);
}

const TEXT: ColourToken[] = ['ink', 'ink-soft', 'patients', 'events', 'plan', 'caution', 'stop'];
const GROUNDS: ColourToken[] = ['paper', 'paper-sunk', 'caution-paper'];

it('measures what WCAG measures', () => {
  expect(contrast('#000000', '#FFFFFF')).toBeCloseTo(21, 5);
  expect(contrast('#777777', '#FFFFFF')).toBeCloseTo(4.48, 2);
});

describe.each(['light', 'dark'] as const)('on the %s sheet', (sheet) => {
  const tokens = sheets[sheet];

  it.each(TEXT.flatMap((text) => GROUNDS.map((ground) => [text, ground] as const)))(
    '%s on %s is legible text',
    (text, ground) => expect(contrast(tokens[text], tokens[ground])).toBeGreaterThanOrEqual(4.5),
  );

  it('a primary button is legible text', () => {
    expect(contrast(tokens.paper, tokens.ink)).toBeGreaterThanOrEqual(4.5);
    expect(contrast(tokens.paper, tokens.stop)).toBeGreaterThanOrEqual(4.5);
  });

  it.each(GROUNDS)('edges of controls show on %s', (ground) => {
    expect(contrast(tokens['rule-strong'], tokens[ground])).toBeGreaterThanOrEqual(3);
  });
});
