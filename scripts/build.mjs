/** Builds the web application, the server and the archive's tools into dist/, when they changed. */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { brotliCompressSync, constants } from 'node:zlib';
import { Advice, root, runScript, say } from './prepare.mjs';

/** Entries of their own: the server, and each worker thread that it starts. */
const serverEntries = () => [
  'server/main.ts',
  ...readdirSync(join(root, 'server'), { recursive: true })
    .filter((path) => path.endsWith('-worker.ts'))
    .map((path) => `server/${path}`),
];

/** Builds unless the sources are the ones of the last build. */
export async function build() {
  const stamp = join(root, 'dist', 'built-from');
  const now = fingerprint();
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === now) return;
  rmSync(join(root, 'dist'), { recursive: true, force: true });
  say('Building the web application');
  const web = spawnSync(process.execPath, ['node_modules/@angular/cli/bin/ng.js', 'build'], {
    cwd: root,
    encoding: 'utf8',
    env: { ...process.env, NG_CLI_ANALYTICS: 'false' },
  });
  if (web.status !== 0)
    throw new Advice(`The web application does not build:\n${web.stdout}\n${web.stderr}`);
  say('Building the server and the archive tools');
  await buildServer();
  const { bundleTools } = await import('./bundle-tools.mjs');
  await bundleTools(join(root, 'dist', 'tools'));
  compress(join(root, 'dist', 'web'));
  writeFileSync(stamp, now);
}

async function buildServer() {
  const { build: bundle } = await import('esbuild');
  await bundle({
    absWorkingDir: root,
    entryPoints: serverEntries(),
    outdir: 'dist/server',
    outbase: 'server',
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    sourcemap: 'linked',
    logLevel: 'warning',
  });
}

/** Text files beside their brotli form; express-static-gzip serves whichever the browser takes. */
function compress(folder) {
  for (const entry of readdirSync(folder, { recursive: true, withFileTypes: true })) {
    if (!entry.isFile() || !/\.(js|css|svg|json)$/.test(entry.name)) continue;
    const file = join(entry.parentPath, entry.name);
    const text = readFileSync(file);
    if (text.length < 1024) continue;
    const packed = brotliCompressSync(text, { params: { [constants.BROTLI_PARAM_QUALITY]: 11 } });
    writeFileSync(`${file}.br`, packed);
  }
}

/** A hash over every source file's path, size and time: cheap, and any edit changes it. */
function fingerprint() {
  const sum = createHash('sha256');
  const add = (path) => {
    const { size, mtimeMs } = statSync(join(root, path));
    sum.update(`${path} ${size} ${mtimeMs}\n`);
  };
  for (const folder of ['src', 'server', 'shared', 'scripts']) {
    for (const entry of readdirSync(join(root, folder), { recursive: true, withFileTypes: true })) {
      if (entry.isFile() && !entry.name.endsWith('.spec.ts')) {
        add(join(entry.parentPath, entry.name).slice(root.length + 1));
      }
    }
  }
  for (const file of [
    'package-lock.json',
    'angular.json',
    'tsconfig.base.json',
    'tsconfig.app.json',
  ]) {
    add(file);
  }
  return sum.digest('hex');
}

if (process.argv[1] === import.meta.filename) await runScript(build);
