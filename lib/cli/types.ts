import { typesAgree, writeTypes } from '@/db/codegen';
import { startTemporaryCluster } from '@/db/temporary';
import { prepareDatabase } from '@/lib/cli/prepare';

/** `npm run db:types`: writes db/types.ts from the migrations; with `--verify` says whether it is theirs. */
async function main(): Promise<number> {
  const { cluster, remove } = await startTemporaryCluster('types');
  try {
    await prepareDatabase(cluster.url);
    if (!process.argv.includes('--verify')) {
      await writeTypes(cluster.url);
      return 0;
    }
    if (await typesAgree(cluster.url)) return 0;
    process.stderr.write('db/types.ts is not that of the migrations: npm run db:types writes it anew.\n');
    return 1;
  } finally {
    await remove();
  }
}

process.exitCode = await main();
