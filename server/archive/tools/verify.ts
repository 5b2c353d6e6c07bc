// Checks an unpacked release: node verify.mjs [BAG_FOLDER]. Needs Node.js 20 or later and nothing else.
import { resolve } from 'node:path';
import { verifyBag } from './verify-bag';

const folder = resolve(process.argv[2] ?? resolve(import.meta.dirname, '../..'));
const report = await verifyBag(folder);
for (const line of report.checked) console.log(`  right  ${line}`);
for (const { where, message } of report.findings) console.log(`  WRONG  ${where}: ${message}`);
console.log(
  report.findings.length === 0
    ? 'The archive is whole, and everything in it agrees.'
    : `${report.findings.length} things are wrong. Do not rely on this copy.`,
);
process.exitCode = report.findings.length === 0 ? 0 : 1;
