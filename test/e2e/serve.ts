import { spawn } from 'node:child_process';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';

const root = resolve(import.meta.dirname, '../..');

/**
 * Starts the built server on a free port with an empty database and the demo laboratory; its address
 * goes to the tests in CENTRODE_E2E_URL. The returned function stops it.
 */
export default async function serve(): Promise<() => Promise<void>> {
  // A server that runs already may be tried as well: CENTRODE_E2E_URL=http://127.0.0.1:4300.
  if (process.env['CENTRODE_E2E_URL'] !== undefined) return () => Promise.resolve();
  const database = JSON.parse(process.env['CENTRODE_E2E_DATABASE'] ?? '{}') as {
    app?: string;
    owner?: string;
  };
  if (!database.app || !database.owner) throw new Error('Run the browser suite with `npm test`.');
  const folder = process.env['CENTRODE_E2E_FOLDER'] ?? mkdtempSync(join(tmpdir(), 'centrode-e2e-'));
  const server = spawn(process.execPath, ['--enable-source-maps', 'dist/server/main.js'], {
    cwd: root,
    env: {
      ...process.env,
      NODE_ENV: 'production',
      DATABASE_URL: database.app,
      DATABASE_OWNER_URL: database.owner,
      DATA_DIR: join(folder, 'files'),
      PORT: '0',
      DEMO: 'yes',
      LOG_LEVEL: 'warn',
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  server.stdout.setEncoding('utf8');
  process.env['CENTRODE_E2E_URL'] = await new Promise<string>((done, failed) => {
    let text = '';
    server.stdout.on('data', (part: string) => {
      text += part;
      const address = /Centrode serves on (\S+)/.exec(text)?.[1];
      if (address !== undefined) done(address);
    });
    server.once('exit', (code) => failed(new Error(`The server ended with ${code}:\n${text}`)));
  });
  return async () => {
    const ended = new Promise((done) => server.once('exit', done));
    server.kill('SIGTERM');
    await ended;
  };
}
