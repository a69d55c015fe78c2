import pino from 'pino';

/** Structured lines on standard error. Secrets and subject data have no business in them. */
export const log = pino(
  { level: process.env.LOG_LEVEL ?? (process.env.NODE_ENV === 'test' ? 'silent' : 'info'), base: undefined },
  pino.destination(2),
);
