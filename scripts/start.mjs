/**
 * `npm start`: installs what is missing, builds, starts a private MariaDB on loopback (or uses
 * DATABASE_URL), migrates, loads the demo laboratory once, and serves until Ctrl-C.
 */
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, readlinkSync, rmSync, writeFileSync } from 'node:fs';
import { setTimeout as delay } from 'node:timers/promises';
import { join } from 'node:path';
import {
  checkNode,
  installPackages,
  installPrograms,
  root,
  runScript,
  say,
  toServe,
} from './prepare.mjs';

await runScript(async () => {
  checkNode();
  installPackages();
  const ownDatabase = process.env.DATABASE_URL === undefined;
  if (ownDatabase) installPrograms(toServe);
  const { build } = await import('./build.mjs');
  await build();

  const data = join(root, '.data');
  mkdirSync(data, { recursive: true, mode: 0o700 });
  const pidFile = join(data, 'start.pid');
  await endEarlier(pidFile);
  writeFileSync(pidFile, String(process.pid));
  let database = null;
  if (ownDatabase) {
    const { startMariadb } = await import('./mariadb.mjs');
    database = await startMariadb({ folder: join(data, 'mariadb') });
  }
  try {
    await serve(database, data);
  } finally {
    await database?.stop();
    rmSync(pidFile, { force: true });
  }
});

/**
 * When npm was killed, the start that it began may still run and hold port and database: it is asked
 * to stop first. Only a process that is a start of this very folder is touched.
 */
async function endEarlier(pidFile) {
  if (!existsSync(pidFile)) return;
  const earlier = `/proc/${readFileSync(pidFile, 'utf8').trim()}`;
  try {
    const here = readlinkSync(`${earlier}/cwd`) === process.cwd();
    if (!here || !readFileSync(`${earlier}/cmdline`, 'utf8').includes('scripts/start.mjs')) return;
    process.kill(Number(earlier.slice('/proc/'.length)), 'SIGTERM');
    for (let i = 0; i < 200 && existsSync(earlier); i++) await delay(100);
  } catch {
    // It has ended: nothing is in the way.
  }
}

/** Runs the server; resolves when it has ended. */
async function serve(database, data) {
  const env = {
    DATA_DIR: join(data, 'files'),
    DEMO: 'yes',
    LOG_LEVEL: 'warn',
    ...(database ? { DATABASE_URL: database.appUrl, DATABASE_OWNER_URL: database.ownerUrl } : {}),
    ...process.env,
    NODE_ENV: 'production',
  };
  const server = spawn(
    process.execPath,
    ['--enable-source-maps', join(root, 'dist/server/main.js')],
    {
      cwd: root,
      env,
      // The channel closes when this process ends, however it ends; the server then stops itself.
      stdio: ['ignore', 'pipe', 'inherit', 'ipc'],
      // Ctrl-C reaches this process alone, which then stops the server before its database.
      detached: true,
    },
  );
  const stop = () => server.kill('SIGTERM');
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  process.on('SIGHUP', stop);
  server.stdout.setEncoding('utf8');
  server.stdout.on('data', (text) => {
    process.stdout.write(text);
    if (text.includes('Centrode serves on') && env.DEMO === 'yes') printAccounts();
  });
  const code = await new Promise((done) => server.once('exit', (status) => done(status ?? 1)));
  process.exitCode = code;
}

function printAccounts() {
  say('');
  say('Demo accounts (everything in the demo is invented); the password of each: drawing table 26');
  say('  quellen@quellmere.example     laboratory lead');
  say('  varo@quellmere.example        investigator (also oduya, lindqvist, amadi)');
  say('  thorne@chambers.example       attorney for the claimant (castellane: for the defendant)');
  say('Ctrl-C stops everything.');
}
