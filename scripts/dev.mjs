/** `npm run dev`: as `npm start`, but reloading on change: Angular's server on 4300, the API on 4301. */
import { spawn } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import {
  checkNode,
  installPackages,
  installPrograms,
  root,
  runScript,
  toServe,
} from './prepare.mjs';

await runScript(async () => {
  checkNode();
  installPackages();
  if (process.env.DATABASE_URL === undefined) installPrograms(toServe);
  const data = join(root, '.data');
  mkdirSync(data, { recursive: true, mode: 0o700 });
  const { startMariadb } = await import('./mariadb.mjs');
  const database =
    process.env.DATABASE_URL === undefined
      ? await startMariadb({ folder: join(data, 'mariadb') })
      : null;
  const { bundleTools } = await import('./bundle-tools.mjs');
  await bundleTools(join(root, 'dist', 'tools'));

  const env = {
    DATA_DIR: join(data, 'files'),
    DEMO: 'yes',
    LOG_LEVEL: 'info',
    ...(database ? { DATABASE_URL: database.appUrl, DATABASE_OWNER_URL: database.ownerUrl } : {}),
    ...process.env,
    NODE_ENV: 'development',
    WEB_DIR: '',
    PORT: '4301',
  };
  const run = (args) =>
    spawn(process.execPath, args, { cwd: root, env, stdio: 'inherit', detached: true });
  const children = [
    run(['--watch', '--import', 'tsx', 'server/main.ts']),
    run(['node_modules/@angular/cli/bin/ng.js', 'serve']),
  ];
  const stop = () => {
    for (const child of children) child.kill('SIGTERM');
  };
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  try {
    await Promise.all(children.map((child) => new Promise((done) => child.once('exit', done))));
  } finally {
    await database?.stop();
  }
});
