import { randomBytes } from 'node:crypto';
import { promises as fs } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';

const secret = z.string().min(32);
const secretsSchema = z.object({ NEXTAUTH_SECRET: secret, SEAT_KEY: secret });
export type Secrets = z.infer<typeof secretsSchema>;

const fresh = (): string => randomBytes(36).toString('base64url');

/** The keys of this installation: made at the first start in `secrets.json` (mode 0600), the environment's where it gives them. */
export async function readSecrets(dataDir: string): Promise<Secrets> {
  const file = path.join(dataDir, 'secrets.json');
  await fs.mkdir(dataDir, { recursive: true });
  let kept: Secrets;
  try {
    kept = secretsSchema.parse(JSON.parse(await fs.readFile(file, 'utf8')));
    await fs.chmod(file, 0o600);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw new Error(`${file} cannot be read as our keys: move it away to have new ones made.`, { cause: error });
    kept = { NEXTAUTH_SECRET: fresh(), SEAT_KEY: fresh() };
    await fs.writeFile(file, `${JSON.stringify(kept, null, 2)}\n`, { mode: 0o600, flag: 'wx' });
  }
  return {
    NEXTAUTH_SECRET: process.env.NEXTAUTH_SECRET || kept.NEXTAUTH_SECRET,
    SEAT_KEY: process.env.SEAT_KEY || kept.SEAT_KEY,
  };
}
