import { appendFile, mkdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { ledgerHead, type LedgerHead } from '#shared/contracts/custody';
import { canonicalText } from '../ledger/canonical';
import type { Services } from '../services';
import { isMissing } from '../store/file-store';

/**
 * Signed heads are also kept in a file outside the database, one line each, in the order of signing.
 * Whoever cuts the end of a ledger off in the database, heads and all, does not reach this file. It
 * is written after the commit: a head that was never committed must not accuse anybody.
 */
export async function keepHeads(
  services: Services,
  caseId: string,
  heads: readonly LedgerHead[],
): Promise<void> {
  try {
    await mkdir(folderOf(services), { recursive: true, mode: 0o700 });
    const lines = heads.map((head) => `${canonicalText(head)}\n`).join('');
    await appendFile(fileOf(services, caseId), lines, { mode: 0o600, flush: true });
  } catch (error) {
    // The events are committed and signed in the database; the second copy must not undo that.
    services.log.error(
      { err: error, caseId },
      'signed heads could not be kept outside the database',
    );
  }
}

/** Every head that was kept; a line that was cut short by a crash is left out. */
export async function readKeptHeads(services: Services, caseId: string): Promise<LedgerHead[]> {
  try {
    const text = await readFile(fileOf(services, caseId), 'utf8');
    return text.split('\n').flatMap(readLine);
  } catch (error) {
    if (isMissing(error)) return [];
    throw error;
  }
}

function readLine(line: string): LedgerHead[] {
  try {
    const parsed = ledgerHead.safeParse(JSON.parse(line));
    return parsed.success ? [parsed.data] : [];
  } catch {
    return [];
  }
}

const folderOf = ({ config }: Services): string => join(config.dataDir, 'ledger-heads');

const fileOf = (services: Services, caseId: string): string =>
  join(folderOf(services), `${caseId}.jsonl`);
