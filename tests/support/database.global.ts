import type { TestProject } from 'vitest/node';
import { openDatabase } from '@/db/client';
import { sql } from 'kysely';
import { prepareTemplate, startTestCluster, templateName } from './cluster';

declare module 'vitest' {
  interface ProvidedContext {
    templateUrl: string;
  }
}

/** Starts a PostgreSQL for the run, or uses the server of TEST_DATABASE_URL (an owner's address), where the template is made anew. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const given = process.env.TEST_DATABASE_URL;
  if (!given) {
    const { cluster, remove } = await startTestCluster();
    project.provide('templateUrl', cluster.url);
    return remove;
  }
  const url = new URL(given);
  const owner = openDatabase(given, undefined, { max: 1 });
  await sql`drop database if exists ${sql.id(templateName)} with (force)`.execute(owner);
  await sql`create database ${sql.id(templateName)}`.execute(owner);
  await owner.destroy();
  url.pathname = `/${templateName}`;
  await prepareTemplate(url.href);
  project.provide('templateUrl', url.href);
  return async () => undefined;
}
