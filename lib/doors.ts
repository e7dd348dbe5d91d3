/** The rules at the door of every request: pure, for proxy.ts. */

/**
 * Content security policy of a page. Scripts and style elements need the nonce; style attributes are open because KaTeX and
 * react-aria place things by them. Development needs eval and a socket for its reloading.
 */
export function contentSecurityPolicy(nonce: string, options: { secure: boolean; development: boolean }): string {
  const { secure, development } = options;
  return [
    `default-src 'self'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? ` 'unsafe-eval'` : ''}`,
    `style-src 'self' ${development ? `'unsafe-inline'` : `'nonce-${nonce}'`}`,
    `style-src-attr 'unsafe-inline'`,
    `img-src 'self' data:`,
    `font-src 'self'`,
    `connect-src 'self'${development ? ' ws:' : ''}`,
    `worker-src 'self'`,
    `manifest-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
    ...(secure ? ['upgrade-insecure-requests'] : []),
  ].join('; ');
}

/** Headers of every answer. */
export function securityHeaders(secure: boolean): [string, string][] {
  return [
    ['x-content-type-options', 'nosniff'],
    ['referrer-policy', 'same-origin'],
    ['x-frame-options', 'DENY'],
    ['cross-origin-opener-policy', 'same-origin'],
    ['cross-origin-resource-policy', 'same-origin'],
    ['permissions-policy', 'camera=(), microphone=(), geolocation=(), payment=(), usb=()'],
    ...(secure ? ([['strict-transport-security', 'max-age=31536000']] as [string, string][]) : []),
  ];
}

const safe = new Set(['GET', 'HEAD', 'OPTIONS']);
const bodyTypes = /^(?:application\/json|text\/plain|text\/csv|multipart\/form-data|application\/x-www-form-urlencoded|application\/octet-stream)\b/i;
const plainFormTypes = /^(?:multipart\/form-data|application\/x-www-form-urlencoded|text\/plain)\b/i;

/**
 * Whether a request would change something and was not sent by a page of ours. Browsers say so in Sec-Fetch-Site and Origin; a
 * program that is no browser sends neither and has no cookie of somebody else to misuse.
 * `publicUrl` is where people reach this installation. Below /api only JSON is taken, except where a file is uploaded or next-auth posts.
 */
export function crossSite(method: string, pathname: string, headers: { get(name: string): string | null }, publicUrl: string): boolean {
  if (safe.has(method)) return false;
  const site = headers.get('sec-fetch-site');
  const origin = headers.get('origin');
  // Sec-Fetch-Site comes from the browser itself; where it is missing (plain http on a school's network) Origin has to name us.
  if (site !== null ? site !== 'same-origin' : origin !== null && origin !== new URL(publicUrl).origin) return true;
  if (!pathname.startsWith('/api/')) return false;
  const type = headers.get('content-type') ?? '';
  if (type === '') return Number(headers.get('content-length') ?? 0) > 0;
  if (!bodyTypes.test(type)) return true;
  // A form of another site can send these types without asking; only a browser that names the origin is believed.
  return plainFormTypes.test(type) && origin === null && site === null;
}
