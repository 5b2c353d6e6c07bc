/**
 * What a bare machine lacks, installed or named: npm packages from the lock file, Debian's packages.
 * Uses Node's own modules only, because it runs before anything is installed.
 */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { accessSync, constants, existsSync, readFileSync, writeFileSync } from 'node:fs';
import { delimiter, join, resolve } from 'node:path';

export const root = resolve(import.meta.dirname, '..');

/** A failure whose message tells a person what to do; printed without a stack. */
export class Advice extends Error {}

/** Programs by the Debian package that brings them. */
const packages = {
  mariadbd: 'mariadb-server-core',
  'mariadb-install-db': 'mariadb-server-core',
  my_print_defaults: 'mariadb-client-core',
  chromium: 'chromium',
  openssl: 'openssl',
  unzip: 'unzip',
  '7z': 'p7zip-full',
  python3: 'python3',
};

export const toServe = ['mariadbd', 'mariadb-install-db', 'my_print_defaults'];
export const toTest = [...toServe, 'chromium', 'openssl', 'unzip', '7z', 'python3'];

export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    throw new Advice(`Centrode needs Node.js 20.19 or newer; this is ${process.versions.node}.`);
  }
}

/** Installs the npm packages of the lock file, unless they are there already. */
export function installPackages() {
  const wanted = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex');
  const marker = join(root, 'node_modules', '.centrode-lock');
  if (existsSync(marker) && readFileSync(marker, 'utf8') === wanted) return;
  if (
    existsSync(join(root, 'node_modules', '.package-lock.json')) &&
    npm(['ls', '--all'], 'ignore')
  ) {
    writeFileSync(marker, wanted);
    return;
  }
  say('Installing the npm packages of the lock file');
  if (!npm(['ci', '--include=dev', '--no-fund', '--no-audit'], 'inherit')) {
    throw new Advice(
      'The npm packages could not be installed (see above). With a network, run: npm ci',
    );
  }
  writeFileSync(marker, wanted);
}

function npm(args, stdio) {
  return spawnSync('npm', args, { cwd: root, stdio }).status === 0;
}

/** Installs the Debian packages of programs that are missing, or says which to install. */
export function installPrograms(programs) {
  const missing = [...new Set(programs.filter((name) => !onPath(name)).map((n) => packages[n]))];
  if (missing.length === 0) return;
  const command = `apt-get install -y --no-install-recommends ${missing.join(' ')}`;
  if (process.getuid?.() !== 0 || !onPath('apt-get')) {
    throw new Advice(`These Debian packages are needed. As root, run: ${command}`);
  }
  say(`Installing from Debian: ${missing.join(', ')}`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const apt = (...args) =>
    spawnSync('apt-get', args, { env, stdio: ['ignore', 'ignore', 'inherit'] });
  apt('update', '-q');
  apt('install', '-y', '-q', '--no-install-recommends', ...missing);
  if (programs.some((name) => !onPath(name))) {
    throw new Advice(
      `Debian's packages could not be installed. With a network, run as root: ${command}`,
    );
  }
}

function onPath(name) {
  const folders = [...(process.env.PATH ?? '').split(delimiter), '/usr/sbin', '/usr/bin', '/sbin'];
  return folders.some((folder) => {
    try {
      accessSync(join(folder, name), constants.X_OK);
      return true;
    } catch {
      return false;
    }
  });
}

export function say(text) {
  process.stdout.write(`${text}\n`);
}

/** Runs a script's work; advice is printed as it is, anything else with its stack. */
export async function runScript(work) {
  try {
    // mariadbd lies in /usr/sbin, which an ordinary account's PATH may lack.
    process.env.PATH = `${process.env.PATH ?? ''}${delimiter}/usr/sbin`;
    await work();
  } catch (error) {
    process.stderr.write(`${error instanceof Advice ? error.message : error.stack}\n`);
    process.exitCode = 1;
  }
}
