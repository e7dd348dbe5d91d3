import { promises as fs } from 'node:fs';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { type Kysely, type Migration, type MigrationProvider, Migrator } from 'kysely';

const folder = fileURLToPath(new URL('./migrations', import.meta.url));
const fileName = /^\d{4}_[a-z0-9_]+\.ts$/;

/** Migrations are the files `db/migrations/NNNN_name.ts`; each exports `up(db)`. There is no way down: restore a backup. */
const provider: MigrationProvider = {
  async getMigrations() {
    const names = (await fs.readdir(folder)).filter((name) => fileName.test(name)).sort();
    const entries = names.map(async (name): Promise<[string, Migration]> => {
      const loaded = (await import(/* @vite-ignore */ pathToFileURL(path.join(folder, name)).href)) as Migration;
      if (typeof loaded.up !== 'function') throw new Error(`db/migrations/${name} exports no function up.`);
      return [name.slice(0, -'.ts'.length), { up: loaded.up }];
    });
    return Object.fromEntries(await Promise.all(entries));
  },
};

/**
 * Brings the database up to the newest migration, in one transaction, under Kysely's lock (two starters do no harm).
 * Needs the owner's connection. Returns the names of what was applied now; throws what a migration threw.
 */
export async function migrateToLatest<Schema>(owner: Kysely<Schema>): Promise<string[]> {
  const migrator = new Migrator({ db: owner, provider, migrationTableSchema: 'public' });
  const { error, results } = await migrator.migrateToLatest();
  if (error !== undefined) {
    const failed = results?.find((result) => result.status === 'Error')?.migrationName;
    throw new Error(failed ? `Migration ${failed} failed: ${message(error)}` : message(error), { cause: error });
  }
  return (results ?? []).filter((result) => result.status === 'Success').map((result) => result.migrationName);
}

/** Names of migrations that the database does not have yet. */
export async function pendingMigrations<Schema>(owner: Kysely<Schema>): Promise<string[]> {
  const migrations = await new Migrator({ db: owner, provider, migrationTableSchema: 'public' }).getMigrations();
  return migrations.filter((migration) => migration.executedAt === undefined).map((migration) => migration.name);
}

function message(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
