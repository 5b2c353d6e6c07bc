import { readFileSync } from 'node:fs';
import { recomputeReport } from '#shared/engine/computation/index';

const files = process.argv.slice(2);
if (files.length === 0) {
  console.error('Usage: npm run recompute -- FILE...');
  process.exitCode = 2;
}
for (const file of files) {
  const { exitCode, lines } = recomputeReport(readFileSync(file, 'utf8'), file);
  console.log(lines.join('\n'));
  process.exitCode = Math.max(Number(process.exitCode ?? 0), exitCode);
}
