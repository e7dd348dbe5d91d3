import { promises as fs } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import { root } from '@/lib/cli/embedded';
import { testDist } from '../../support/browser.global';
import type { Things } from './cast';

/** What came of a request, in one word, and all that was sent back. */
export type Outcome = { was: string; body: string };

/** The address of a folder of app, with its segments filled in. */
export function addressOf(folder: string, things: Things, named: Partial<Record<string, keyof Things>> = {}): string {
  const filled = folder.replace(/\/\([^)]*\)/g, '').replace(/\[(?:\.\.\.)?(\w+)\]/g, (_, name: string) => {
    const value = name === 'nextauth' ? 'csrf' : name === 'place' ? '0' : things[named[name] ?? (name as keyof Things)];
    if (value === undefined) throw new Error(`Nothing to put for [${name}].`);
    return value;
  });
  return filled || '/';
}

/** Asks for a page: `seen`, `not found`, `sign-in` or a redirect to elsewhere. A page that streams says so in what it streams. */
export async function askPage(url: string, address: string, cookie: string): Promise<Outcome> {
  const response = await fetch(url + address, { headers: { cookie }, redirect: 'manual' });
  const body = await response.text();
  const to = response.headers.get('location') ?? /http-equiv="refresh" content="\d+;url=([^"]*)"/.exec(body)?.[1];
  if (to !== undefined) return { was: new URL(to, url).pathname === '/sign-in' ? 'sign-in' : 'elsewhere', body };
  if (response.status === 404 || body.includes('NEXT_HTTP_ERROR_FALLBACK;404')) return { was: 'not found', body };
  return { was: response.status === 200 ? 'seen' : String(response.status), body };
}

const wordOf: Record<number, string> = { 401: 'sign-in', 404: 'not found' };

/** Asks a handler: `in` for everything that passed the door, `sign-in` or `not found`. Of a stream that lives only the first piece is read. */
export async function askHandler(url: string, name: string, things: Things, options: { cookie: string; body?: unknown; query?: string; named?: Partial<Record<string, keyof Things>> }): Promise<Outcome & { status: number }> {
  const [method = '', folder = ''] = name.split(' ');
  const abort = new AbortController();
  const response = await fetch(url + addressOf(folder, things, options.named) + (options.query ?? ''), {
    method, signal: abort.signal, redirect: 'manual',
    headers: { cookie: options.cookie, ...(options.body === undefined ? {} : { 'content-type': 'application/json' }) },
    body: options.body === undefined ? undefined : JSON.stringify(options.body),
  });
  if ((response.headers.get('content-type') ?? '').startsWith('text/event-stream')) {
    abort.abort();
    return { was: 'in', body: '', status: response.status };
  }
  const body = await response.text();
  return { was: response.status >= 500 ? String(response.status) : (wordOf[response.status] ?? 'in'), body, status: response.status };
}

const manifest = z.object({ node: z.record(z.string(), z.object({ workers: z.record(z.string(), z.unknown()), filename: z.string(), exportedName: z.string() })) });
export type Known = { id: string; page: string };

/** Every server action that the build knows, by file and name: its id, and a page through which it is reached. */
export async function builtActions(): Promise<Map<string, Known>> {
  const text = await fs.readFile(path.join(root, testDist, 'server/server-reference-manifest.json'), 'utf8');
  return new Map(Object.entries(manifest.parse(JSON.parse(text)).node).map(([id, { workers, filename, exportedName }]) => {
    const page = (Object.keys(workers)[0] ?? '').replace(/^app/, '').replace(/\/page$/, '').replace(/\/\([^)]*\)/g, '').replace(/\[[^\]]*\]/g, 'x');
    return [`${filename}#${exportedName}`, { id, page: page || '/' }];
  }));
}

const answer = z.union([z.object({ ok: z.literal(true) }), z.object({ ok: z.literal(false), code: z.string().optional() })]);

/** Runs a server action as a page of ours does: its refusal's code, `in` for a success, `elsewhere` for a redirect. */
export async function askAction(url: string, { id, page }: Known, sent: unknown[] | FormData, cookie: string): Promise<Outcome> {
  const response = await fetch(url + page, {
    method: 'POST', redirect: 'manual',
    headers: { cookie, origin: url, accept: 'text/x-component', 'next-action': id, ...(sent instanceof FormData ? {} : { 'content-type': 'text/plain;charset=UTF-8' }) },
    body: sent instanceof FormData ? sent : JSON.stringify(sent),
  });
  const body = await response.text();
  if (response.status === 303 || response.headers.has('x-action-redirect')) return { was: 'elsewhere', body };
  const row = /^1:(\{.*\})$/m.exec(body)?.[1];
  const read = row === undefined ? undefined : answer.safeParse(JSON.parse(row));
  if (!read?.success) return { was: `no answer (${response.status})`, body };
  return { was: read.data.ok ? 'in' : (read.data.code ?? 'in'), body };
}
