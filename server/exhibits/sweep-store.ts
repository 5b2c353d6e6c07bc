import { DerivativeRecord, ExhibitFileRecord } from '../database/models/exhibit';
import type { Services } from '../services';
import { sweep } from '../store/sweep';

/** Clears what an earlier run left half taken in; called before the server listens. */
export async function sweepStore(services: Services): Promise<void> {
  const swept = await sweep(services.store, isRecorded);
  if (swept.unfinished + swept.unrecorded + swept.kept > 0) {
    services.log.warn(swept, 'leftovers of intakes that never ended were swept');
  }
}

/** True if a row names the content. */
async function isRecorded(sha256: string): Promise<boolean> {
  const [file, derivative] = await Promise.all([
    ExhibitFileRecord.findOne({ where: { sha256 }, attributes: ['id'] }),
    DerivativeRecord.findOne({ where: { sha256 }, attributes: ['fileId'] }),
  ]);
  return file !== null || derivative !== null;
}
