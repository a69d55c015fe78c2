import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { expect, it } from 'vitest';
import { TOASTER_STYLE_HASHES } from '@/components/ui/toaster-style';

const hashOf = (text: string): string => `sha256-${createHash('sha256').update(text).digest('base64')}`;

it('lets in the toasts’ own style sheet and no other', () => {
  const source = readFileSync(
    createRequire(import.meta.url)
      .resolve('sonner')
      .replace(/\.js$/, '.mjs'),
    'utf8',
  );
  const literal = /^__insertCSS\((".*")\)/m.exec(source)?.[1];
  const sheet: unknown = JSON.parse(literal ?? '');
  expect([hashOf(''), hashOf(String(sheet))]).toEqual(TOASTER_STYLE_HASHES);
});
