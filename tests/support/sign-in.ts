const pairs = (response: Response): string[] => response.headers.getSetCookie().map((cookie) => cookie.split(';')[0] ?? '');

/** Signs in over HTTP as a browser does, by e-mail or learner number; gives the cookies to send from then on. */
export async function signInOver(url: string, identifier: string, password: string): Promise<string> {
  const asked = await fetch(`${url}/api/auth/csrf`);
  const { csrfToken } = (await asked.json()) as { csrfToken: string };
  const answer = await fetch(`${url}/api/auth/callback/password`, {
    method: 'POST',
    redirect: 'manual',
    headers: { 'content-type': 'application/x-www-form-urlencoded', cookie: pairs(asked).join('; '), origin: url },
    body: new URLSearchParams({ csrfToken, identifier, password, json: 'true', callbackUrl: '/' }),
  });
  const signedIn = pairs(answer).find((pair) => /session=.{20,}/.test(pair));
  if (!signedIn) throw new Error(`${identifier} was not signed in (${answer.status}): ${await answer.text()}`);
  return signedIn;
}
