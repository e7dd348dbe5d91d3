import next from 'eslint-config-next/core-web-vitals';
import typescript from 'eslint-config-next/typescript';

// Which folder may import what: app -> components, lib; components -> pure lib and a feature's
// model/rules/policy/client; queries and commands -> db and pure lib; pure -> pure; db -> nothing of ours.
const forbid = (files, patterns, extra = {}) => ({
  files,
  rules: { 'no-restricted-imports': ['error', { patterns: patterns.map(([group, message]) => ({ group, message })), ...extra }] },
});
const sole = [
  [['nodemailer', 'nodemailer/*'], 'lib/mail is the sole importer of nodemailer.'],
  [['pdfkit', 'pdfkit/*'], 'lib/pdf is the sole importer of pdfkit.'],
  [['next-auth', 'next-auth/*'], 'lib/auth is the sole importer of next-auth.'],
  [['graphile-worker'], 'lib/jobs is the sole importer of the queue.'],
  [['mathjs', 'mathjs/*'], 'lib/expressions is the sole importer of mathjs.'],
];
const shell = [
  [['@/db/*', 'pg', 'kysely'], 'Pure code and views touch no database.'],
  [['@/app/*'], 'Nothing imports from app.'],
];
const commandSide = [[['@/lib/*/queries', '@/lib/*/commands', './queries', './commands', '../*/queries', '../*/commands'], 'Server only.']];
const pureDomain = ['numeric', 'expressions', 'templates', 'machines', 'circuits', 'marking', 'statistics'];
const without = (name) => sole.filter(([group]) => !group.includes(name));

const config = [
  { ignores: ['node_modules/**', '.next*/**', '.data/**', 'next-env.d.ts', 'test-results/**', 'playwright-report/**', 'public/**'] },
  ...next,
  ...typescript,
  { rules: { '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }] } },
  forbid(['app/**/*.{ts,tsx}', 'lib/**/*.ts'], sole),
  forbid(['components/**/*.{ts,tsx}'], [...sole, ...shell, ...commandSide]),
  forbid(pureDomain.map((d) => `lib/${d}/**/*.ts`), [
    ...sole, ...shell, ...commandSide,
    [['next', 'next/*', 'react', 'react-dom', 'node:fs', 'fs', '@/components/*'], 'Pure code has no framework and no input or output.'],
  ]),
  forbid(['lib/expressions/**/*.ts'], [...without('mathjs'), ...shell, ...commandSide, [['next', 'next/*', 'react', '@/components/*'], 'Pure.']]),
  forbid(['lib/*/model.ts', 'lib/*/rules.ts', 'lib/*/policy.ts', 'lib/*/client.ts'], [...sole, ...shell, ...commandSide]),
  forbid(['lib/mail/**/*.ts'], without('nodemailer')),
  forbid(['lib/pdf/**/*.ts'], without('pdfkit')),
  forbid(['lib/auth/**/*.ts'], without('next-auth')),
  forbid(['lib/jobs/**/*.ts'], without('graphile-worker')),
  forbid(['db/**/*.ts'], [[['@/lib/*', '@/app/*', '@/components/*', '../lib/*', '../app/*'], 'db imports nothing of ours.']]),
];
export default config;
