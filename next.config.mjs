import { existsSync, writeFileSync } from 'node:fs';

const distDir = process.env.NEXT_DIST_DIR || '.next';

// Next.js writes the types of its build folder into the tsconfig it is given: a build beside the usual one gets a copy of its own.
const tsconfigPath = distDir === '.next' ? 'tsconfig.json' : `${distDir}.tsconfig.json`;
if (!existsSync(tsconfigPath)) {
  const include = ['next-env.d.ts', '**/*.ts', '**/*.tsx', `${distDir}/types/**/*.ts`, `${distDir}/dev/types/**/*.ts`];
  writeFileSync(tsconfigPath, JSON.stringify({ extends: './tsconfig.json', include, exclude: ['node_modules', '.data'] }));
}

/** @type {import('next').NextConfig} */
const config = {
  // Tests and a running installation build side by side, so the folder is a setting.
  distDir,
  // npm test checks the types of everything; a build of what was checked need not do it again.
  typescript: { tsconfigPath, ignoreBuildErrors: true },
  poweredByHeader: false,
  productionBrowserSourceMaps: false,
  // Live streams must not be held back by compression; a proxy before us compresses the rest.
  compress: false,
  serverExternalPackages: ['pg', 'kysely', 'graphile-worker', 'pdfkit', 'nodemailer', 'mailparser', 'pino', '@node-rs/argon2', 'mathjs'],
  allowedDevOrigins: ['127.0.0.1', 'localhost'],
  devIndicators: false,
};
export default config;
