// Makes the two programs that travel in every released archive: one file each, plain Node.js, no
// dependencies, not minified, so that whoever doubts a number can read how it was computed.
import { mkdir } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');

/** Writes verify.mjs and recompute.mjs into a folder. */
export async function bundleTools(outDir) {
  await mkdir(outDir, { recursive: true });
  await build({
    absWorkingDir: root,
    entryPoints: ['verify', 'recompute'].map((name) => `server/archive/tools/${name}.ts`),
    outdir: outDir,
    outExtension: { '.js': '.mjs' },
    bundle: true,
    alias: { debug: './scripts/silent-debug.cjs' },
    platform: 'node',
    target: 'node20',
    format: 'esm',
    charset: 'utf8',
    legalComments: 'inline',
    logLevel: 'warning',
    banner: { js: '// Centrode: part of a released archive. Run with Node.js 20 or later.' },
  });
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  await bundleTools(process.argv[2] ?? join(root, 'dist/tools'));
}
