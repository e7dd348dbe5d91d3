import { type NextRequest, NextResponse } from 'next/server';
import { crossSite, contentSecurityPolicy, securityHeaders } from '@/lib/doors';

// Files that hold nothing of anybody: cached, and without a policy of their own.
const openFiles = /^\/(?:_next\/static\/|fonts\/|favicon\.ico$|icon\.svg$|.*\.(?:woff2?|svg|png|ico|css|js|webmanifest)$)/;

/**
 * Stands before every request: headers that every page has, a fresh nonce for its scripts, and no change of anything for a request
 * that another site made a browser send. It decides nothing about who may see what; queries and commands do.
 */
export function proxy(request: NextRequest): NextResponse {
  const { pathname } = request.nextUrl;
  if (crossSite(request.method, pathname, request.headers, process.env.PUBLIC_URL ?? request.nextUrl.origin)) {
    return NextResponse.json({ ok: false, code: 'cross-site', says: 'This request came from another site. Open Fullfield itself and try again.' }, { status: 403 });
  }
  const secure = (process.env.PUBLIC_URL ?? '').startsWith('https://');
  if (openFiles.test(pathname)) {
    const response = NextResponse.next();
    for (const [name, value] of securityHeaders(secure)) response.headers.set(name, value);
    return response;
  }
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64');
  const policy = contentSecurityPolicy(nonce, { secure, development: process.env.NODE_ENV === 'development' });
  const headers = new Headers(request.headers);
  headers.set('x-nonce', nonce);
  headers.set('x-path', pathname + request.nextUrl.search);
  headers.set('content-security-policy', policy);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  for (const [name, value] of securityHeaders(secure)) response.headers.set(name, value);
  // Nearly every page is somebody's own; the exam room's shell, which a service worker keeps, sets its own rule.
  if (!response.headers.has('cache-control')) response.headers.set('cache-control', 'no-store');
  return response;
}

export const config = { matcher: ['/((?!_next/image).*)'] };
