import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '');
const alias = { '@': root, 'server-only': `${root}/tests/support/server-only.ts` };

export default defineConfig({
  root,
  resolve: { alias },
  test: {
    root,
    testTimeout: 30_000,
    hookTimeout: 60_000,
    projects: [
      { extends: true, test: { name: 'pure', include: ['tests/unit/**/*.test.ts', 'tests/templates/**/*.test.ts'] } },
      { extends: true, test: { name: 'db', include: ['tests/db/**/*.test.ts'], globalSetup: ['tests/support/database.global.ts'] } },
      { extends: true, test: { name: 'components', include: ['tests/components/**/*.test.tsx'], environment: 'jsdom' } },
    ],
  },
});
