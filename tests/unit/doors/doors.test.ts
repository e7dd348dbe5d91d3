import { describe, expect, it } from 'vitest';
import { contentSecurityPolicy, crossSite } from '@/lib/doors';

const home = 'https://exams.example.org';
const asked = (headers: Record<string, string>, method = 'POST', pathname = '/api/sit/1/responses') =>
  crossSite(method, pathname, new Headers(headers), home);
const json = { 'content-type': 'application/json' };

describe('a request that changes something', () => {
  it('is taken from a page of ours, with or without Sec-Fetch-Site', () => {
    expect(asked({ ...json, 'sec-fetch-site': 'same-origin', origin: home })).toBe(false);
    expect(asked({ ...json, origin: home })).toBe(false);
  });

  it('is refused from any other page', () => {
    for (const site of ['cross-site', 'same-site', 'none']) expect(asked({ ...json, 'sec-fetch-site': site, origin: home })).toBe(true);
    for (const origin of ['https://evil.example', 'http://exams.example.org', 'null']) expect(asked({ ...json, origin })).toBe(true);
    expect(asked({ origin: 'https://evil.example' }, 'POST', '/people')).toBe(true);
  });

  it('is refused below /api in a type that a form of another site can send, unless the browser says where it comes from', () => {
    expect(asked({ 'content-type': 'text/plain' })).toBe(true);
    expect(asked({ 'content-type': 'multipart/form-data; boundary=x', origin: home })).toBe(false);
    expect(asked({ 'content-type': 'application/xml', origin: home })).toBe(true);
  });

  it('leaves reading alone', () => {
    expect(asked({ 'sec-fetch-site': 'cross-site' }, 'GET', '/bank')).toBe(false);
  });
});

describe('the policy of a page', () => {
  it('lets no script in without the nonce, no frame round it, and opens evaluation in development only', () => {
    const served = contentSecurityPolicy('abc', { secure: true, development: false });
    expect(served).toContain(`script-src 'self' 'nonce-abc' 'strict-dynamic';`);
    expect(served).toContain(`frame-ancestors 'none'`);
    expect(served).not.toMatch(/unsafe-eval|style-src [^;]*unsafe-inline/);
    expect(contentSecurityPolicy('abc', { secure: false, development: true })).toContain('unsafe-eval');
  });
});
