import { afterEach, describe, expect, it, vi } from 'vitest';

const SECRET = 'k3J9xQ2mV7rT1wZ8bN5cH4dL6fG0sPyA';

/** The environment is parsed once a process: a fresh copy of the module for each of these. */
async function envFrom(settings: Record<string, string>) {
  vi.resetModules();
  for (const [name, value] of Object.entries({ NODE_ENV: 'production', BETTER_AUTH_SECRET: SECRET, ...settings }))
    vi.stubEnv(name, value);
  return (await import('@/lib/env')).env();
}

afterEach(() => {
  vi.unstubAllEnvs();
});

describe('the environment of a server that others reach', () => {
  it('is taken when it is safe', async () => {
    const env = await envFrom({ KALENDS_URL: 'https://kalends.example/' });
    expect(env).toMatchObject({ production: true, origin: 'https://kalends.example', demonstration: false });
    expect(env.trustedOrigins).toEqual(['https://kalends.example']);
  });

  it.each([
    ['no secret', { BETTER_AUTH_SECRET: '' }, 'BETTER_AUTH_SECRET'],
    ['a short secret', { BETTER_AUTH_SECRET: SECRET.slice(0, 31) }, 'BETTER_AUTH_SECRET'],
    ['a secret of one letter', { BETTER_AUTH_SECRET: 'a'.repeat(64) }, 'BETTER_AUTH_SECRET'],
    [
      'an open mailbox',
      { KALENDS_URL: 'https://kalends.example', KALENDS_DEMONSTRATION: '1' },
      'KALENDS_DEMONSTRATION',
    ],
    ['an open line', { KALENDS_URL: 'http://kalends.example' }, 'https'],
    ['a look-alike of this machine', { KALENDS_URL: 'http://127.0.0.1.example' }, 'https'],
    ['a store without keys', { S3_ENDPOINT: 'https://files.example' }, 'S3_ACCESS_KEY'],
    ['a port that is none', { PORT: 'many' }, 'PORT'],
  ])('is refused with %s, in one line', async (_what, settings, named) => {
    const error: unknown = await envFrom(settings).catch((reason: unknown) => reason);
    expect(error).toBeInstanceOf(Error);
    const { message } = error instanceof Error ? error : { message: '' };
    expect(message).toContain(named);
    expect(message.split('\n')).toHaveLength(1);
  });

  it('may be this machine’s own demonstration over plain HTTP', async () => {
    const env = await envFrom({ PORT: '3007', KALENDS_DEMONSTRATION: '1' });
    expect(env).toMatchObject({ origin: 'http://127.0.0.1:3007', demonstration: true });
    expect(env.trustedOrigins).toEqual(['http://127.0.0.1:3007', 'http://localhost:3007']);
  });
});
