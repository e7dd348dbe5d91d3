import path from 'node:path';
import { z } from 'zod';

export const installationKinds = ['school', 'demo', 'test'] as const;
export type InstallationKind = (typeof installationKinds)[number];

const secret = z.string().min(32, 'must be at least 32 characters of chance; npm start makes one by itself');
const address = z.url({ protocol: /^https?$/, error: 'must be an address such as https://exams.example.org' });

const schema = z.object({
  DATABASE_URL: z.string().min(1, 'is not set; npm start sets it, or give the address of a PostgreSQL database'),
  PUBLIC_URL: address.transform((url) => url.replace(/\/+$/, '')),
  NEXTAUTH_SECRET: secret,
  SEAT_KEY: secret,
  SMTP_URL: z.string().optional(),
  DATA_DIR: z.string().default('.data'),
  FULLFIELD_KIND: z.enum(installationKinds).default('school'),
  TRUSTED_PROXY: z.enum(['0', '1']).default('0'),
});

export type Config = {
  databaseUrl: string;
  /** Where people reach this installation, without a slash at the end; the only source of links in mail and of the expected origin. */
  publicUrl: string;
  /** Signs the sign-in token. */
  authSecret: string;
  /** Signs seat tokens; derive other keys of candidates from the sitting's own secret, not from this one. */
  seatKey: string;
  /** Outgoing mail server; without it e-mail waits in the queue. */
  smtpUrl: string | undefined;
  dataDir: string;
  /** A demo or a test may shift its clock, shows the mail it sent and has accounts whose passwords are known. */
  kind: InstallationKind;
  /** Whether X-Forwarded-For comes from a proxy of ours. */
  trustedProxy: boolean;
};

/** Reads the settings of this process from its environment. Throws with every wrong setting named. */
export function readConfig(environment: Record<string, string | undefined> = process.env): Config {
  const given = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const read = schema.safeParse(given);
  if (!read.success) {
    const lines = read.error.issues.map((issue) => `${issue.path.join('.')} ${issue.message}`);
    throw new Error(`The settings of this process are not complete:\n  ${lines.join('\n  ')}`);
  }
  const env = read.data;
  return {
    databaseUrl: env.DATABASE_URL,
    publicUrl: env.PUBLIC_URL,
    authSecret: env.NEXTAUTH_SECRET,
    seatKey: env.SEAT_KEY,
    smtpUrl: env.SMTP_URL,
    dataDir: path.resolve(env.DATA_DIR),
    kind: env.FULLFIELD_KIND,
    trustedProxy: env.TRUSTED_PROXY === '1',
  };
}

let kept: Config | undefined;

/** The settings of this process, read once. */
export const config = (): Config => (kept ??= readConfig());

/** An address of ours for a mail or a document; `to` begins with a slash. */
export const publicLink = (to: `/${string}`): string => `${config().publicUrl}${to}`;
