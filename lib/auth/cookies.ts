import { decode } from 'next-auth/jwt';
import { config } from '@/lib/config';

const secure = (): boolean => config().publicUrl.startsWith('https://');

/** Name of the sign-in cookie; browsers keep the `__Secure-` prefix for https. */
export const signInCookie = (): { name: string; secure: boolean } => ({ name: `${secure() ? '__Secure-' : ''}fullfield.session`, secure: secure() });

/** The sign-in id in the cookie's token; null for no, a foreign or a stale token. Whether it still counts, SQL says (`readActor`). */
export async function signInIdOf(token: string | undefined): Promise<string | null> {
  if (!token) return null;
  try {
    const claims = await decode({ token, secret: config().authSecret });
    return typeof claims?.sid === 'string' ? claims.sid : null;
  } catch {
    return null;
  }
}
