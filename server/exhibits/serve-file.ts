import type { Request, Response } from 'express';
import { pipeline } from 'node:stream/promises';
import type { CaseScope } from '../cases/scope';
import { DerivativeRecord, ExhibitFileRecord } from '../database/models/exhibit';
import { HttpProblem, notFound, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { ContentChanged } from '../store/checked-read';
import type { PictureSize } from '../store/picture';
import { decodeText } from '../store/text';

/** Types that do nothing by themselves; everything else leaves as plain bytes. */
const inert = /^(image\/(?!svg)|video\/|audio\/|text\/(plain|csv)$|application\/(pdf|zip)$)/;

/** A file of an exhibit of the case, or 404. */
export async function fileOf(
  { caseId }: CaseScope,
  exhibitId: string,
  id: string,
): Promise<ExhibitFileRecord> {
  const file = await ExhibitFileRecord.findOne({ where: { id, exhibitId, caseId } });
  if (!file) throw notFound('This file');
  return file;
}

/** Sends the original as an attachment, or the range of it that was asked for. */
export async function sendOriginal(
  services: Services,
  file: ExhibitFileRecord,
  request: Request,
  response: Response,
): Promise<void> {
  const size = await presentSize(services, file.sha256);
  response.attachment(file.name).set({
    'Content-Type': inert.test(file.mediaType) ? file.mediaType : 'application/octet-stream',
    'Content-Security-Policy': "default-src 'none'; sandbox",
    'Accept-Ranges': 'bytes',
    // Compressed, the bytes would not be those that the ledger names.
    'Cache-Control': 'private, no-store, no-transform',
    'Repr-Digest': `sha-256=:${Buffer.from(file.sha256, 'hex').toString('base64')}:`,
  });
  const range = rangeOf(request, size);
  if (range === 'none') {
    response.set('Content-Range', `bytes */${size}`);
    throw new HttpProblem(416, 'No such range', `The file has ${size} bytes.`);
  }
  if (range) {
    response.status(206).set('Content-Range', `bytes ${range.start}-${range.end}/${size}`);
  }
  response.set('Content-Length', String(range ? range.end - range.start + 1 : size));
  await send(services, file, file.sha256, response, range ?? undefined);
}

/** Sends what was made of a picture for the screen. */
export async function sendPicture(
  services: Services,
  file: ExhibitFileRecord,
  size: PictureSize,
  response: Response,
): Promise<void> {
  const derivative = await DerivativeRecord.findOne({ where: { fileId: file.id, kind: size } });
  if (!derivative) throw notFound('A picture of this file');
  const bytes = await presentSize(services, derivative.sha256);
  response.set({
    'Content-Type': derivative.mediaType,
    'Content-Length': String(bytes),
    'Content-Security-Policy': "default-src 'none'; sandbox",
    'Cache-Control': 'private, no-store, no-transform',
  });
  await send(services, file, derivative.sha256, response);
}

const mostTextBytes = 10 * 1024 * 1024;

/** The text of a text or CSV file. */
export async function readTextOf(
  { store }: Services,
  file: ExhibitFileRecord,
): Promise<{ name: string; encoding: string; text: string }> {
  if (Number(file.size) > mostTextBytes) {
    throw unprocessable('file', 'The file is larger than 10 MiB: download it instead.');
  }
  const pieces: Buffer[] = [];
  for await (const piece of store.read(file.sha256)) pieces.push(piece as Buffer);
  const decoded = decodeText(Buffer.concat(pieces));
  if (!decoded) throw unprocessable('file', `"${file.name}" is not a text file.`);
  return { name: file.name, ...decoded };
}

async function send(
  services: Services,
  file: ExhibitFileRecord,
  sha256: string,
  response: Response,
  range?: { start: number; end: number },
): Promise<void> {
  try {
    await pipeline(services.store.read(sha256, range), response);
  } catch (error) {
    // The one who asked went away: nothing is wrong.
    if ((error as NodeJS.ErrnoException).code === 'ERR_STREAM_PREMATURE_CLOSE') return;
    if (error instanceof ContentChanged) {
      services.log.error({ err: error }, 'stored content was changed');
      await services.accessLog.record({
        actor: null,
        action: 'integrity alarm',
        caseId: file.caseId,
        subject: file.name,
        detail: error.message,
      });
    }
    // Too late for a problem answer: the connection was cut, so the copy is seen to be incomplete.
    if (!response.headersSent) throw error;
  }
}

async function presentSize({ store, log }: Services, sha256: string): Promise<number> {
  const size = await store.sizeOf(sha256);
  if (size !== null) return size;
  log.error({ sha256 }, 'stored content is missing');
  throw new HttpProblem(
    500,
    'The stored file is missing',
    'The record is there but its content is not. Tell the laboratory lead to verify the ledger of the case.',
  );
}

/** One range, as video players ask; several at once get the whole file. */
function rangeOf(request: Request, size: number): { start: number; end: number } | 'none' | null {
  const ranges = request.range(size);
  if (ranges === -1) return 'none';
  if (ranges === undefined || ranges === -2 || ranges.type !== 'bytes' || ranges.length !== 1) {
    return null;
  }
  return ranges[0];
}
