// Computes recorded computations again: node recompute.mjs [BAG_FOLDER | FILE.json]
// Needs Node.js 20 or later and nothing else. It holds the whole engine that made the results.
import { readFile, readdir, stat } from 'node:fs/promises';
import { basename, join, resolve } from 'node:path';
import { recomputeReport } from '#shared/engine/computation/report';

const given = resolve(process.argv[2] ?? resolve(import.meta.dirname, '../..'));

async function filesOf(path: string): Promise<string[]> {
  if (!(await stat(path)).isDirectory()) return [path];
  const folder = join(path, 'data/computations');
  const names = (await readdir(folder)).filter((name) => name.endsWith('.json'));
  return names.sort().map((name) => join(folder, name));
}

const codes = { identical: 0, different: 0, unreadable: 0 };
for (const file of await filesOf(given)) {
  const { exitCode, lines } = recomputeReport(await readFile(file, 'utf8'), basename(file));
  console.log(lines.join('\n'));
  codes[(['identical', 'different', 'unreadable'] as const)[exitCode]] += 1;
}
console.log(
  `${codes.identical} computations give the same result again, ${codes.different} another, ` +
    `${codes.unreadable} cannot be read.`,
);
process.exitCode = codes.unreadable > 0 ? 2 : codes.different > 0 ? 1 : 0;
