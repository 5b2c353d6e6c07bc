import { mkdir, readdir, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { ArchiveMismatch } from '../archive/write-zip';
import { buildArchive } from '../archive/build-archive';
import type { Config } from '../config';
import { ReleaseArchiveRecord } from '../database/models/release';
import type { Services } from '../services';
import { loadArchiveSource } from './archive-source';

const archivesDir = (config: Config): string => join(config.dataDir, 'archives');

/** Where the archive of a release lies; it has this name only when it is whole. */
export const archivePath = (config: Config, releaseId: string): string =>
  join(archivesDir(config), `${releaseId}.zip`);

/**
 * Builds the archives of releases, one after the other, beside the ordinary work. An archive follows
 * from its frozen release alone, so that after a crash it is simply built again.
 */
export class ArchiveJobs {
  private readonly waiting = new Set<string>();
  private readonly stopped = new AbortController();
  private working: Promise<void> = Promise.resolve();

  constructor(private readonly services: Omit<Services, 'archives'>) {}

  /** Takes up what an earlier process left unfinished. Called once, at the start. */
  async resume(): Promise<void> {
    const folder = archivesDir(this.services.config);
    await mkdir(folder, { recursive: true, mode: 0o700 });
    const leftovers = (await readdir(folder)).filter((name) => name.endsWith('.part'));
    await Promise.all(leftovers.map((name) => rm(join(folder, name), { force: true })));
    const unfinished = await ReleaseArchiveRecord.findAll({
      where: { state: ['building', 'failed'] },
      order: [['releaseId', 'ASC']],
    });
    for (const { releaseId } of unfinished) this.build(releaseId);
  }

  /** Queues a release; one that waits already is built once. */
  build(releaseId: string): void {
    if (this.waiting.has(releaseId)) return;
    this.waiting.add(releaseId);
    this.working = this.working.then(() => this.run(releaseId));
  }

  /** Resolves when nothing is being built any more. */
  async idle(): Promise<void> {
    await this.working;
  }

  /** Breaks off; what is unfinished is taken up at the next start. */
  async stop(): Promise<void> {
    this.stopped.abort(new Error('The server stops.'));
    await this.working;
  }

  private async run(releaseId: string): Promise<void> {
    const { config, log } = this.services;
    try {
      this.stopped.signal.throwIfAborted();
      await this.note(releaseId, { state: 'building', size: null, sha256: null, message: '' });
      const source = await loadArchiveSource(this.services, releaseId);
      await mkdir(archivesDir(config), { recursive: true, mode: 0o700 });
      const built = await buildArchive(source, archivePath(config, releaseId), {
        signal: this.stopped.signal,
      });
      await this.note(releaseId, { state: 'ready', ...built, message: '' });
      log.info({ releaseId, size: built.size }, 'archive built');
    } catch (error) {
      if (this.stopped.signal.aborted) return;
      log.error({ err: error, releaseId }, 'archive not built');
      await this.note(releaseId, {
        state: 'failed',
        size: null,
        sha256: null,
        message: reasonOf(error),
      }).catch((noteError: unknown) => log.error({ err: noteError, releaseId }, 'not noted'));
    } finally {
      this.waiting.delete(releaseId);
    }
  }

  private async note(
    releaseId: string,
    state: Pick<ReleaseArchiveRecord, 'state' | 'size' | 'sha256' | 'message'>,
  ): Promise<void> {
    await ReleaseArchiveRecord.update(state, { where: { releaseId } });
  }
}

/** What the laboratory is told; paths and the like stay in the log. */
function reasonOf(error: unknown): string {
  if (error instanceof ArchiveMismatch || error instanceof RangeError) {
    return error.message.slice(0, 1000);
  }
  return 'It could not be built; the reason is in the log of the server. It is tried again at the next start.';
}
