import { cookies, headers } from 'next/headers';
import { notFound as showNotFound, redirect } from 'next/navigation';
import { cache } from 'react';
import { appDb } from '@/db/client';
import { type Context, holds, type Role } from '@/lib/context';
import { notFound, refuse, type Refusal, type Result, done } from '@/lib/result';
import { signInCookie, signInIdOf } from './cookies';
import { type AccountActor, readActor } from './queries';
import { safeNext } from './rules';

/** Context of a signed-in person, with the id of the browser's sign-in. */
export type SignedIn = Context & { actor: AccountActor; signInId: string };

const allowed = (actor: AccountActor, wanted: readonly Role[]): boolean => wanted.length === 0 || holds(actor, ...wanted);

/** Who is signed in in this request, once a request; null for nobody. Session id, epoch, state and roles are checked in SQL. */
export const signedIn = cache(async (): Promise<SignedIn | null> => {
  const signInId = await signInIdOf((await cookies()).get(signInCookie().name)?.value);
  if (signInId === null) return null;
  const db = appDb();
  const actor = await readActor(db, signInId);
  return actor && { db, actor, signInId };
});

/** The address that was asked for, as the proxy wrote it down. */
async function askedFor(): Promise<string> {
  const next = safeNext((await headers()).get('x-path'));
  return next && next !== '/' ? `/sign-in?next=${encodeURIComponent(next)}` : '/sign-in';
}

/** For pages and layouts: nobody signed in → to the sign-in page and back; none of `wanted` held → not found. Without roles any signed-in person. */
export async function pageContext(...wanted: Role[]): Promise<SignedIn> {
  const context = await signedIn();
  if (!context) redirect(await askedFor());
  if (!allowed(context.actor, wanted)) showNotFound();
  return context;
}

/** For server actions, which Next protects against other origins: the context, or a refusal (`signed-out`, `not-found`) to hand back to the form. */
export async function actionContext(...wanted: Role[]): Promise<Result<SignedIn, 'signed-out' | 'not-found'>> {
  const context = await signedIn();
  if (!context) return refuse('signed-out', 'You are signed out. Sign in again in another tab, then repeat this: what you typed stays here.');
  return allowed(context.actor, wanted) ? done(context) : notFound();
}

/** For route handlers: as `actionContext`, from the request's own cookie. */
export async function routeContext(request: Request, ...wanted: Role[]): Promise<Result<SignedIn, 'signed-out' | 'not-found'>> {
  const signInId = await signInIdOf(cookieOf(request, signInCookie().name));
  const db = appDb();
  const actor = signInId === null ? null : await readActor(db, signInId);
  if (!actor || signInId === null) return refuse('signed-out', 'You are signed out. Sign in again.');
  return allowed(actor, wanted) ? done({ db, actor, signInId }) : notFound();
}

function cookieOf(request: Request, name: string): string | undefined {
  const pair = (request.headers.get('cookie') ?? '').split('; ').find((part) => part.startsWith(`${name}=`));
  return pair?.slice(name.length + 1);
}

const statuses: Readonly<Record<string, number>> = { 'signed-out': 401, 'not-found': 404, slowed: 429, 'changed-since': 409 };

/** A refusal as JSON: 401 signed out, 404 missing or forbidden, 409 changed meanwhile, 429 slowed down, 422 all others. */
export const refusalResponse = (refusal: Refusal): Response =>
  Response.json(refusal, { status: statuses[refusal.code] ?? 422, headers: { 'cache-control': 'no-store' } });
