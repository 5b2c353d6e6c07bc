/**
 * `npm run verify-ledger`: checks the custody ledger of every case, its signed heads and every stored
 * file, and says what differs. Ends with 1 if anything does. Uses the same environment as the server
 * (DATABASE_URL, DATA_DIR); it changes nothing.
 */
import { verifyCase } from '../server/custody/verify-case';
import { readConfig } from '../server/config';
import { CaseRecord } from '../server/database/models/case';
import { createServices } from '../server/start';

const services = createServices(readConfig({ LOG_LEVEL: 'error', ...process.env }));
let differences = 0;
try {
  const cases = await CaseRecord.findAll({ order: [['number', 'ASC']] });
  for (const { id, number } of cases) {
    const report = await verifyCase(services, { caseId: id, caseNumber: number });
    differences += report.findings.length;
    const result = report.findings.length === 0 ? 'nothing differs' : 'DIFFERENCES';
    process.stdout.write(`${number}  ${report.events} events, ${report.files} files: ${result}\n`);
    for (const { code, message } of report.findings) {
      process.stdout.write(`  ${code}: ${message}\n`);
    }
  }
  process.stdout.write(
    `${cases.length} cases checked; ${differences === 0 ? 'every ledger is as it was written' : `${differences} differences`}.\n`,
  );
} finally {
  await services.inspector.close();
  await services.sequelize.close();
}
process.exitCode = differences === 0 ? 0 : 1;
