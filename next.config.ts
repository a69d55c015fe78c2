import type { NextConfig } from 'next';

/** The same for every reply; the content security policy needs a nonce per reply and is set in `proxy.ts`. */
const SECURITY_HEADERS = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'X-Frame-Options', value: 'DENY' },
  { key: 'Referrer-Policy', value: 'strict-origin-when-cross-origin' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Cross-Origin-Resource-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), geolocation=(), microphone=(), payment=(), usb=()' },
];

const config: NextConfig = {
  poweredByHeader: false,
  reactStrictMode: true,
  // Loaded by Node at run time: bundling renames MikroORM's classes and loses piscina's and pino's worker files.
  serverExternalPackages: [
    '@mikro-orm/core',
    '@mikro-orm/postgresql',
    '@mikro-orm/knex',
    '@mikro-orm/migrations',
    'pg-boss',
    'piscina',
    'pino',
  ],
  // `npm run check` looks at the types; a second look would only make the first start slower.
  typescript: { ignoreBuildErrors: true },
  turbopack: { root: import.meta.dirname },
  headers: async () => [
    { source: '/:path*', headers: SECURITY_HEADERS },
    {
      // Only behind a proxy that ends TLS: over plain HTTP the header means nothing and may not be sent.
      source: '/:path*',
      has: [{ type: 'header', key: 'x-forwarded-proto', value: 'https' }],
      headers: [{ key: 'Strict-Transport-Security', value: 'max-age=63072000; includeSubDomains' }],
    },
    { source: '/api/:path*', headers: [{ key: 'Cache-Control', value: 'no-store' }] },
  ],
};

export default config;
