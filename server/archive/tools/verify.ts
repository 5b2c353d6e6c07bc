// Checks an unpacked release: node verify.mjs [BAG_FOLDER]. Needs Node.js 20 or later and nothing else.
import { resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { verifyBag } from './verify-bag';

const folder = resolve(process.argv[2] ?? fileURLToPath(new URL('../..', import.meta.url)));
const report = await verifyBag(folder);
for (const line of report.checked) console.log(`  right  ${line}`);
for (const { where, message } of report.findings) console.log(`  WRONG  ${where}: ${message}`);
const count = report.findings.length;
console.log(
  count === 0
    ? 'The archive is whole, and everything in it agrees.'
    : `${count === 1 ? 'One thing is' : `${count} things are`} wrong. Do not rely on this copy.`,
);
process.exitCode = count === 0 ? 0 : 1;
