import { z } from 'zod';

/** Everything the process reads from its environment, parsed once, in one place. */
const schema = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
  PORT: z.coerce.number().int().min(1).max(65_535).default(3000),
  KALENDS_URL: z.url().optional(),
  KALENDS_DATA: z.string().min(1).default('.data'),
  KALENDS_DEMONSTRATION: z.enum(['0', '1']).default('0'),
  BETTER_AUTH_SECRET: z.string().default(''),
  KALENDS_SIGN_IN_ATTEMPTS: z.coerce.number().int().min(1).optional(),
  KALENDS_TRUSTED_PROXY_HEADER: z.string().default(''),
  DATABASE_URL: z.string().default(''),
  SMTP_URL: z.string().default(''),
  MAIL_FROM: z.string().default('Kalends <alerts@kalends.example>'),
  S3_ENDPOINT: z.string().default(''),
  S3_REGION: z.string().default('us-east-1'),
  S3_BUCKET: z.string().default('kalends'),
  S3_ACCESS_KEY: z.string().default(''),
  S3_SECRET_KEY: z.string().default(''),
});

export interface Env {
  production: boolean;
  /** The address that people use, without a slash at its end. */
  origin: string;
  trustedOrigins: string[];
  secret: string;
  signInAttempts: number;
  /** The header in which a proxy in front of us names the client; empty: none is believed. */
  trustedProxyHeader: string;
  databaseUrl: string;
  dataFolder: string;
  demonstration: boolean;
  smtpUrl: string;
  mailFrom: string;
  storage: { endpoint: string; region: string; bucket: string; accessKey: string; secretKey: string };
}

function read(): Env {
  const parsed = schema.safeParse(process.env);
  if (!parsed.success)
    throw new Error(
      `Configuration: ${parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`).join('; ')}`,
    );
  const values = parsed.data;
  const origin = (values.KALENDS_URL ?? `http://127.0.0.1:${values.PORT}`).replace(/\/$/, '');
  const demonstration = values.KALENDS_DEMONSTRATION === '1';
  const production = values.NODE_ENV === 'production';
  const unsafe = production && whatIsUnsafe({ origin, demonstration, secret: values.BETTER_AUTH_SECRET });
  if (unsafe) throw new Error(`Configuration: ${unsafe}`);
  if (values.S3_ENDPOINT && !(values.S3_ACCESS_KEY && values.S3_SECRET_KEY))
    throw new Error('Configuration: S3_ENDPOINT needs S3_ACCESS_KEY and S3_SECRET_KEY.');
  return {
    production,
    origin,
    trustedOrigins: [
      origin,
      ...(origin.startsWith('http://127.0.0.1') ? [origin.replace('127.0.0.1', 'localhost')] : []),
    ],
    secret: values.BETTER_AUTH_SECRET || 'development-only-secret-that-is-long-enough',
    // Without a proxy that names the client all share one count, and on the first of the month all sign in at once.
    signInAttempts: values.KALENDS_SIGN_IN_ATTEMPTS ?? (values.KALENDS_TRUSTED_PROXY_HEADER ? 10 : 60),
    trustedProxyHeader: values.KALENDS_TRUSTED_PROXY_HEADER,
    databaseUrl: values.DATABASE_URL,
    dataFolder: values.KALENDS_DATA,
    demonstration,
    smtpUrl: values.SMTP_URL,
    mailFrom: values.MAIL_FROM,
    storage: {
      endpoint: values.S3_ENDPOINT,
      region: values.S3_REGION,
      bucket: values.S3_BUCKET,
      accessKey: values.S3_ACCESS_KEY,
      secretKey: values.S3_SECRET_KEY,
    },
  };
}

/** What a server that others reach may not be started with, in one line; nothing when all is well. */
function whatIsUnsafe(given: { origin: string; demonstration: boolean; secret: string }): string | undefined {
  const atHome = /^http:\/\/(127\.0\.0\.1|localhost)(:|$)/.test(given.origin);
  if (given.secret.length < 32 || new Set(given.secret).size < 10)
    return 'BETTER_AUTH_SECRET has to be at least 32 characters of chance.';
  if (given.demonstration && !atHome)
    return 'KALENDS_DEMONSTRATION opens the mailbox page and is refused at any address but this machine’s own.';
  if (!atHome && !given.origin.startsWith('https://'))
    return 'KALENDS_URL has to begin with https://, because sign-in travels over it.';
  return undefined;
}

let cached: Env | undefined;

export function env(): Env {
  cached ??= read();
  return cached;
}
