import { stat } from 'node:fs/promises';
import type { Response } from 'express';
import { bagFolderOf } from '../archive/build-archive';
import { ReleaseArchiveRecord, type ReleaseRecord } from '../database/models/release';
import { HttpProblem, conflict } from '../http/problems';
import type { Services } from '../services';
import { isMissing } from '../store/file-store';
import { archivePath } from './archive-jobs';
import { outlineOf } from './presenter';

/** Sends the archive as a download that can be resumed: Range, and If-Range by its SHA-256. */
export async function sendArchive(
  services: Services,
  release: ReleaseRecord,
  response: Response,
): Promise<void> {
  const archive = await ReleaseArchiveRecord.findByPk(release.id);
  if (archive?.state === 'failed') {
    throw conflict(`The archive could not be built: ${archive.message}`);
  }
  if (archive?.state !== 'ready' || archive.sha256 === null) {
    throw conflict('The archive is still being built. Try again shortly.');
  }
  const file = archivePath(services.config, release.id);
  if ((await sizeOf(file)) !== Number(archive.size)) {
    services.archives.build(release.id);
    throw new HttpProblem(
      503,
      'Not available now',
      'The archive is not at hand and is being built again. Try again shortly.',
    );
  }
  const { summary } = outlineOf(release);
  response.attachment(`${bagFolderOf(summary)}.zip`);
  response.set({ ETag: `"${archive.sha256}"`, 'Last-Modified': release.releasedAt.toUTCString() });
  await new Promise<void>((done, failed) => {
    response.sendFile(file, { dotfiles: 'allow', cacheControl: false }, (error?: Error) => {
      // Whoever breaks the download off comes back for the rest.
      if (error && !response.headersSent) failed(problemOf(error, Number(archive.size)));
      else done();
    });
  });
}

async function sizeOf(file: string): Promise<number | null> {
  try {
    return (await stat(file)).size;
  } catch (error) {
    if (isMissing(error)) return null;
    throw error;
  }
}

function problemOf(error: Error, size: number): Error {
  const { status } = error as { status?: unknown };
  if (status !== 416) return error;
  return new HttpProblem(416, 'No such part', `The archive has ${size} bytes.`);
}
