// Computes recorded computations again: node recompute.mjs [BAG_FOLDER | FILE.json]
// Needs Node.js 20 or later and nothing else. It holds the whole engine that made the results.
import { readFile, readdir, stat } from 'node:fs/promises';
import { basename, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { recomputeReport } from '#shared/engine/computation/report';

const given = resolve(process.argv[2] ?? fileURLToPath(new URL('../..', import.meta.url)));

async function filesOf(path: string): Promise<string[]> {
  if (!(await stat(path)).isDirectory()) return [path];
  const folder = join(path, 'data/computations');
  const names = (await readdir(folder)).filter((name) => name.endsWith('.json'));
  return names.sort().map((name) => join(folder, name));
}

const outcomes = [0, 0, 0];
for (const file of await filesOf(given)) {
  const { exitCode, lines } = recomputeReport(await readFile(file, 'utf8'), basename(file));
  console.log(lines.join('\n'));
  outcomes[exitCode] += 1;
}
const [same, different, unreadable] = outcomes;
console.log(
  `Same result again: ${same}. Another result: ${different}. Not readable: ${unreadable}.`,
);
process.exitCode = unreadable > 0 ? 2 : different > 0 ? 1 : 0;
