import pino from 'pino';

const SECRETS = ['password', 'token', 'secret', 'cookie', 'authorization'];

/** Structured lines on standard error. Secrets and subject data have no business in them. */
export const log = pino(
  {
    level: process.env.LOG_LEVEL ?? (process.env.NODE_ENV === 'test' ? 'silent' : 'info'),
    base: undefined,
    timestamp: pino.stdTimeFunctions.isoTime,
    // A wall behind the habit of not logging such things at all.
    redact: SECRETS.flatMap((name) => [name, `*.${name}`]),
  },
  pino.destination(2),
);
