// Needs Node alone: brings what a fresh clone lacks, then hands over to the TypeScript of the command.
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
process.chdir(root);

const say = (line) => process.stdout.write(`${line}\n`);
const stop = (line) => {
  process.stderr.write(`${line}\n`);
  process.exit(1);
};

const hasPostgres = () => {
  const folder = '/usr/lib/postgresql';
  return Boolean(process.env.POSTGRES_BIN) || (existsSync(folder) && readdirSync(folder).some((version) => existsSync(`${folder}/${version}/bin/initdb`)));
};

// Debian package -> whether what we need of it is there.
const debian = {
  postgresql: hasPostgres,
  chromium: () => existsSync('/usr/bin/chromium'),
  'poppler-utils': () => existsSync('/usr/bin/pdftotext'),
};
const packagesOf = {
  start: process.env.DATABASE_URL ? [] : ['postgresql'],
  dev: process.env.DATABASE_URL ? [] : ['postgresql'],
  test: ['postgresql', 'chromium', 'poppler-utils'],
};

function installDebianPackages(names) {
  const missing = names.filter((name) => !debian[name]());
  if (missing.length === 0) return;
  const command = `apt-get install -y --no-install-recommends ${missing.join(' ')}`;
  if (process.getuid?.() !== 0) stop(`These Debian packages are missing: ${missing.join(', ')}.\nInstall them with: sudo ${command}`);
  if (!existsSync('/usr/bin/apt-get')) stop(`Please install: ${missing.join(', ')} (no apt-get on this system).`);
  say(`Installing Debian packages: ${missing.join(', ')}`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const run = (args) => spawnSync('apt-get', args, { stdio: ['ignore', 'ignore', 'inherit'], env }).status === 0;
  const install = ['install', '-y', '-q', '--no-install-recommends', ...missing];
  if (!run(install) && !(run(['update', '-q']) && run(install))) stop(`Debian's packages could not be installed. Try by hand: ${command}`);
}

/** Whether node_modules holds what the lock file asks for; compared by content, since dates change with every checkout. */
function packagesAreCurrent() {
  const hidden = 'node_modules/.package-lock.json';
  if (!existsSync(hidden)) return false;
  const wanted = JSON.parse(readFileSync('package-lock.json', 'utf8')).packages;
  const present = JSON.parse(readFileSync(hidden, 'utf8')).packages;
  return Object.entries(wanted).every(([place, { version, optional, link }]) => {
    if (place === '' || link) return true;
    return present[place] ? present[place].version === version : Boolean(optional);
  });
}

function installNodePackages() {
  if (packagesAreCurrent()) return;
  say('Installing packages (npm ci); about a minute');
  const npm = spawnSync('npm', ['ci', '--include=dev', '--no-progress'], { stdio: ['ignore', 'ignore', 'inherit'] });
  if (npm.status !== 0) stop('npm ci failed; what it said stands above.');
}

const [major, minor] = process.versions.node.split('.').map(Number);
if (major !== 20 || minor < 20) stop(`Fullfield runs on Node 20 (20.20 or later); this is ${process.versions.node}.`);
const commands = { start: 'lib/cli/start.ts', dev: 'lib/cli/dev.ts', test: 'tests/run.ts' };
const name = process.argv[2];
if (!Object.hasOwn(commands, name)) stop(`Usage: node lib/cli/boot.mjs ${Object.keys(commands).join('|')}`);
installDebianPackages(packagesOf[name]);
installNodePackages();

// The same process goes on, so that a signal reaches it without anybody between.
process.argv.splice(1, 2, path.join(root, commands[name]));
const { register } = await import('tsx/esm/api');
register();
await import(new URL(`../../${commands[name]}`, import.meta.url).href);
