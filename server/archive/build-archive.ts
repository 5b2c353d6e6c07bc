import { randomUUID } from 'node:crypto';
import { open, rename, rm } from 'node:fs/promises';
import { dirname } from 'node:path';
import type { ReleasedSummary } from '#shared/contracts/disclosure';
import type { ArchiveSource } from './archive-source';
import { bagOf } from './bag';
import { checkZip } from './check-zip';
import { payloadOf } from './payload';
import { writeZip } from './write-zip';

export interface BuildOptions {
  readonly signal?: AbortSignal;
  /** Share done, 0 to 1. */
  readonly progress?: (share: number) => void;
}

export interface BuiltArchive {
  readonly size: number;
  readonly sha256: string;
}

/** Name of the bag's folder, and of the ZIP before ".zip". */
export function bagFolderOf(summary: ReleasedSummary): string {
  const { caseNumber, releaseNumber } = summary;
  return `${caseNumber.replace(/[^A-Za-z0-9-]+/g, '-')}-release-${releaseNumber}`;
}

/**
 * Builds the archive of a release: a bag (RFC 8493) in a ZIP. It is written to a temporary file
 * beside the target, read back and compared, flushed to the disk, and only then given its name; so
 * the target is whole or not there. The same source gives the same bytes.
 *
 * @throws ArchiveMismatch when a stored file is not what its record says
 */
export async function buildArchive(
  source: ArchiveSource,
  target: string,
  options: BuildOptions = {},
): Promise<BuiltArchive> {
  const { summary } = source.snapshot;
  const releasedAt = new Date(summary.releasedAt);
  const folder = bagFolderOf(summary);
  const payload = payloadOf(source, folder);
  const bag = bagOf(payload, {
    organization: summary.laboratory,
    identifier: `${summary.caseNumber} release ${summary.releaseNumber}`,
    group: summary.caseNumber,
    description: `${summary.title}. Released to ${summary.party}.`,
    date: releasedAt.toISOString().slice(0, 10),
  });
  const total = bag.reduce((sum, entry) => sum + entry.size, 0);
  const temporary = `${target}.${randomUUID()}.part`;
  try {
    const built = await writeZip(bag, temporary, {
      folder,
      date: releasedAt,
      signal: options.signal,
      progress: (bytes) => options.progress?.((0.7 * bytes) / total),
    });
    await checkZip(temporary, folder, bag, options.signal);
    await rename(temporary, target);
    const parent = await open(dirname(target));
    await parent.sync().finally(() => parent.close());
    options.progress?.(1);
    return built;
  } catch (error) {
    await rm(temporary, { force: true });
    throw error;
  }
}
