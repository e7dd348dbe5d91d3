import type { InstallationKind } from '@/lib/config';

const loopback = new Set(['127.0.0.1', 'localhost', '::1', '[::1]']);
export const isLoopback = (host: string): boolean => loopback.has(host.toLowerCase()) || /^127\.\d+\.\d+\.\d+$/.test(host);

const knownPasswords = new Set(['postgres', 'password', 'admin', 'changeme', 'change-me', 'secret', 'fullfield', 'test']);

export type StartSettings = {
  /** Whether the database is ours, started for this. */
  embedded: boolean;
  kind: InstallationKind;
  databaseUrl: string;
  host: string;
  publicUrl: string;
  smtpUrl: string | undefined;
  NEXTAUTH_SECRET: string;
  SEAT_KEY: string;
};

const monotonous = (secret: string): boolean => new Set(secret).size < 10 || /secret|changeme|change-me|password|example/i.test(secret);

/** Why a start with these settings is refused: known defaults and known passwords where others can reach them. Empty when it is in order. */
export function refusals(settings: StartSettings): string[] {
  const why: string[] = [];
  if (settings.kind === 'demo' && !settings.embedded) {
    why.push('The database of DATABASE_URL holds the demo, whose passwords everybody knows. Give an empty database.');
  }
  if (settings.kind === 'demo' && !isLoopback(settings.host)) {
    why.push(`The demo has accounts whose passwords everybody knows, so it is served on this machine only, not on ${settings.host}. For a school give DATABASE_URL.`);
  }
  if (settings.kind === 'test' && process.env.FULLFIELD_KIND !== 'test') why.push('The database is a test database, whose clock may be shifted.');
  for (const name of ['NEXTAUTH_SECRET', 'SEAT_KEY'] as const) {
    if (settings[name].length < 32 || monotonous(settings[name])) why.push(`${name} is short or easy to guess. Leave it out to have one made, or give 32 characters of chance.`);
  }
  if (!settings.embedded) {
    const { password } = new URL(settings.databaseUrl);
    if (password && knownPasswords.has(decodeURIComponent(password).toLowerCase())) why.push('The password in DATABASE_URL is one that everybody tries first. Choose another.');
  }
  return why;
}

/** What a person should know before going on: what does not work with these settings. */
export function warnings(settings: StartSettings): string[] {
  const said: string[] = [];
  const address = new URL(settings.publicUrl);
  if (address.protocol === 'http:' && !isLoopback(address.hostname)) {
    said.push(
      `${settings.publicUrl} is plain http. Passwords and answers can be read on the network, and browsers then give no service worker and no`,
      'encryption: the exam room works, but a page reloaded without network is not there, and answers not yet on the server are kept unencrypted.',
      'Put TLS before it: a proxy with a certificate that passes on to this port, PUBLIC_URL=https://…, TRUSTED_PROXY=1.',
    );
  }
  if (!settings.smtpUrl && settings.kind === 'school') said.push('SMTP_URL is not set: e-mail waits in the queue until it is.');
  return said;
}
