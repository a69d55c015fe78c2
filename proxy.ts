import { type NextRequest, NextResponse } from 'next/server';
import { TOASTER_STYLE_HASHES } from '@/components/ui/toaster-style';

/**
 * Sets each page's content security policy, with a nonce of its own. It decides nothing about access: that is
 * `authorise()`'s, behind every route and page.
 */
export function proxy(request: NextRequest): NextResponse {
  const nonce = btoa(crypto.randomUUID());
  const development = process.env.NODE_ENV === 'development';
  const policy = [
    `default-src 'self'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? " 'unsafe-eval'" : ''}`,
    // Inline style attributes carry the charts' measured positions; style elements stay forbidden outside development.
    `style-src 'self' ${development ? "'unsafe-inline'" : [`'nonce-${nonce}'`, ...TOASTER_STYLE_HASHES.map((hash) => `'${hash}'`)].join(' ')}`,
    `style-src-attr 'unsafe-inline'`,
    `img-src 'self' data: blob:`,
    `font-src 'self'`,
    `connect-src 'self'`,
    `worker-src 'self' blob:`,
    `frame-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ');
  const headers = new Headers(request.headers);
  headers.set('x-nonce', nonce);
  headers.set('x-pathname', request.nextUrl.pathname + request.nextUrl.search);
  headers.set('content-security-policy', policy);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  return response;
}

export const config = {
  matcher: [
    {
      source: '/((?!_next/static|_next/image|favicon|icon|api/).*)',
      missing: [{ type: 'header', key: 'next-router-prefetch' }],
    },
  ],
};
