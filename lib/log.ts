import pino from 'pino';

const SECRETS = ['password', 'token', 'secret', 'cookie', 'authorization'];

/** What went wrong and where; drivers hang whole connections on their errors, with settings that are not for a log. */
function describeError(error: unknown): object {
  if (!(error instanceof Error)) return { message: String(error) };
  const code = 'code' in error ? error.code : undefined;
  return {
    type: error.name,
    message: error.message,
    code,
    stack: error.stack,
    cause: error.cause && describeError(error.cause),
  };
}

/** Structured lines on standard error. Secrets and subject data have no business in them. */
export const log = pino(
  {
    level: process.env.LOG_LEVEL ?? (process.env.NODE_ENV === 'test' ? 'silent' : 'info'),
    base: undefined,
    timestamp: pino.stdTimeFunctions.isoTime,
    serializers: { err: describeError },
    // A wall behind the habit of not logging such things at all.
    redact: SECRETS.flatMap((name) => [name, `*.${name}`]),
  },
  pino.destination(2),
);
