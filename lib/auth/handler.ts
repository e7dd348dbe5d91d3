import NextAuth, { type NextAuthOptions } from 'next-auth';
import Credentials from 'next-auth/providers/credentials';
import { appDb } from '@/db/client';
import { config } from '@/lib/config';
import type { Result } from '@/lib/result';
import { endSignIn, signInWithPassword, signInWithSlip } from './commands';
import { signInCookie } from './cookies';
import { signInSchema, slipSchema, wrongSignIn, wrongSlip } from './model';
import { originOf } from './origin';
import { signInHours } from './rules';

type Headers = Record<string, string> | undefined;
const originFrom = (headers: Headers) => originOf((name) => headers?.[name]);

/** A refusal reaches the browser as the words of an error; a success is the sign-in id alone. */
function answer(result: Result<{ signInId: string }>): { id: string } {
  if (!result.ok) throw new Error(result.says);
  return { id: result.value.signInId };
}

const password = Credentials({
  id: 'password',
  name: 'Password',
  credentials: { identifier: {}, password: {} },
  async authorize(given, request) {
    const input = signInSchema.safeParse(given);
    if (!input.success) throw new Error(wrongSignIn);
    return answer(await signInWithPassword(appDb(), input.data, originFrom(request.headers)));
  },
});

const slip = Credentials({
  id: 'slip',
  name: 'Slip',
  credentials: { learnerNumber: {}, code: {} },
  async authorize(given, request) {
    const input = slipSchema.safeParse(given);
    if (!input.success) throw new Error(wrongSlip);
    return answer(await signInWithSlip(appDb(), input.data, originFrom(request.headers)));
  },
});

function options(): NextAuthOptions {
  const { authSecret } = config();
  const cookie = signInCookie();
  const hours = signInHours * 3600;
  return {
    providers: [password, slip],
    secret: authSecret,
    session: { strategy: 'jwt', maxAge: hours },
    pages: { signIn: '/sign-in', signOut: '/sign-in', error: '/sign-in' },
    useSecureCookies: cookie.secure,
    cookies: { sessionToken: { name: cookie.name, options: { httpOnly: true, sameSite: 'lax', path: '/', secure: cookie.secure } } },
    callbacks: {
      // The token holds the sign-in id and nothing about the person: what they may do is read from the database each time.
      jwt: ({ token, user }) => (user ? { sid: user.id } : { sid: token.sid }),
      session: ({ session }) => ({ expires: session.expires }),
    },
    events: {
      async signOut({ token }) {
        if (typeof token?.sid === 'string') await endSignIn(appDb(), token.sid);
      },
    },
    logger: { error: () => undefined, warn: () => undefined, debug: () => undefined },
  };
}

type RouteContext = { params: Promise<{ nextauth: string[] }> };

/** next-auth's own routes under /api/auth: the token against forged requests, the two ways to sign in, signing out. */
export async function handleAuth(request: Request, context: RouteContext): Promise<Response> {
  process.env.NEXTAUTH_URL ??= config().publicUrl;
  const handler = NextAuth(options()) as (request: Request, context: RouteContext) => Promise<Response>;
  return handler(request, context);
}
