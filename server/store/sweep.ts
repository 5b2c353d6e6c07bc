import { readdir, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { isMissing, type FileStore } from './file-store';
import { isAbandoned } from './owner-mark';

/** Younger files may belong to an intake in another process that shares the store. */
const graceMs = 60 * 60 * 1000;

export interface Swept {
  /** Arriving files that never became whole. */
  readonly unfinished: number;
  /** Whole files whose row was never written: removed. */
  readonly unrecorded: number;
  /** Whole files whose row was written just before the end: kept. */
  readonly kept: number;
}

/**
 * Clears what a crash left behind. Only what has a name under `incoming` is touched: content that was
 * settled is never removed here. `isRecorded` asks the database whether a row names the content.
 */
export async function sweep(
  store: FileStore,
  isRecorded: (sha256: string) => Promise<boolean>,
): Promise<Swept> {
  const counts = { unfinished: 0, unrecorded: 0, kept: 0 };
  const names = await readdir(store.incomingDir);
  const inUse = new Set<string>();
  const left: string[] = [];
  for (const name of names) {
    if (isAbandoned(name) || (await isOld(join(store.incomingDir, name)))) left.push(name);
    else inUse.add(contentOf(name));
  }
  for (const name of left) {
    const sha256 = contentOf(name);
    if (sha256 === '') {
      counts.unfinished += 1;
    } else if (await isRecorded(sha256)) {
      counts.kept += 1;
    } else {
      counts.unrecorded += 1;
      // Somebody else may be taking in the same content at this moment and rely on it.
      if (!inUse.has(sha256)) await rm(store.pathOf(sha256), { force: true });
    }
    await rm(join(store.incomingDir, name), { force: true });
  }
  return counts;
}

/** The SHA-256 in the name of a published file; empty for one that is still arriving. */
const contentOf = (name: string): string => /\.([0-9a-f]{64})$/.exec(name)?.[1] ?? '';

async function isOld(path: string): Promise<boolean> {
  try {
    // The time of the last change of the file's names counts, not that of its content.
    return Date.now() - (await stat(path)).ctimeMs >= graceMs;
  } catch (error) {
    if (isMissing(error)) return false;
    throw error;
  }
}
