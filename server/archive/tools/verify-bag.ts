import { checkBag } from './check-bag';
import { checkRelease } from './check-release';
import { Report } from './finding';

/** Every check of a released archive that was unpacked into `folder`. */
export async function verifyBag(folder: string): Promise<Report> {
  const report = new Report();
  try {
    await checkBag(folder, report);
    await checkRelease(folder, report);
  } catch (error) {
    report.wrong(folder, error instanceof Error ? error.message : String(error));
  }
  return report;
}
