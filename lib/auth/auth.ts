import { randomUUID } from 'node:crypto';
import { betterAuth } from 'better-auth';
import { getOrm } from '../db/orm';
import { env } from '../env';
import { log } from '../log';
import { mikroOrmAdapter } from './mikro-orm-adapter';
import { sendResetMail } from './reset-mail';
import { SESSION_IDLE_SECONDS } from './session-limits';

function create() {
  const { origin, trustedOrigins, secret, signInAttempts, production } = env();
  return betterAuth({
    appName: 'Kalends',
    baseURL: origin,
    basePath: '/api/auth',
    secret,
    trustedOrigins,
    database: mikroOrmAdapter(() => getOrm().em.fork()),
    user: { modelName: 'person' },
    rateLimit: {
      enabled: true,
      storage: 'database',
      modelName: 'rate_limit',
      window: 60,
      max: 300,
      customRules: {
        '/sign-in/email': { window: 60, max: signInAttempts },
        '/request-password-reset': { window: 600, max: 5 },
      },
    },
    // Accounts are by invitation only: `lib/people/commands.ts` makes them, with their role, in one transaction.
    emailAndPassword: {
      enabled: true,
      disableSignUp: true,
      minPasswordLength: 12,
      maxPasswordLength: 200,
      resetPasswordTokenExpiresIn: 60 * 60,
      revokeSessionsOnPasswordReset: true,
      sendResetPassword: async ({ user, url }) => sendResetMail(user, url),
    },
    session: { expiresIn: SESSION_IDLE_SECONDS, updateAge: 60, cookieCache: { enabled: false } },
    advanced: {
      useSecureCookies: production && origin.startsWith('https://'),
      cookiePrefix: 'kalends',
      ipAddress: { ipAddressHeaders: env().trustedProxyHeader ? [env().trustedProxyHeader] : [] },
      database: { generateId: () => randomUUID() },
    },
    logger: { level: 'warn', log: (level, message) => log[level]({ part: 'sign-in' }, message) },
    telemetry: { enabled: false },
  });
}

const holder = globalThis as typeof globalThis & { kalendsAuth?: ReturnType<typeof create> };

/** Made on first use: importing a module must not need a database. */
export function getAuth() {
  holder.kalendsAuth ??= create();
  return holder.kalendsAuth;
}
