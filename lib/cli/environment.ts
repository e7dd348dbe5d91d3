import { sql } from 'kysely';
import { openDatabase } from '@/db/client';
import { type InstallationKind, installationKinds } from '@/lib/config';

/** What kind of installation the database says it is. */
export async function installationKind(url: string): Promise<InstallationKind> {
  const owner = openDatabase(url, undefined, { max: 1 });
  try {
    const { rows } = await sql<{ kind: string }>`select kind from app.installation`.execute(owner);
    const kind = installationKinds.find((known) => known === rows[0]?.kind);
    if (!kind) throw new Error('app.installation holds no kind that is known.');
    return kind;
  } finally {
    await owner.destroy();
  }
}

export type Settings = {
  databaseUrl: string;
  publicUrl: string;
  smtpUrl: string | undefined;
  dataDir: string;
  kind: InstallationKind;
  NEXTAUTH_SECRET: string;
  SEAT_KEY: string;
};

/** The environment of the processes of an installation: what lib/config.ts reads, and nothing left to defaults. */
export function processEnvironment(settings: Settings, mode: 'production' | 'development'): NodeJS.ProcessEnv {
  return {
    ...process.env,
    NODE_ENV: mode,
    DATABASE_URL: settings.databaseUrl,
    PUBLIC_URL: settings.publicUrl,
    NEXTAUTH_URL: settings.publicUrl,
    NEXTAUTH_SECRET: settings.NEXTAUTH_SECRET,
    SEAT_KEY: settings.SEAT_KEY,
    SMTP_URL: settings.smtpUrl ?? '',
    DATA_DIR: settings.dataDir,
    FULLFIELD_KIND: settings.kind,
    NEXT_TELEMETRY_DISABLED: '1',
  };
}
