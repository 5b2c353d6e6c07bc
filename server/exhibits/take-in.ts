import type { Request } from 'express';
import type { Transaction } from 'sequelize';
import { v7 as newId } from 'uuid';
import type { ExhibitFile } from '#shared/contracts/exhibits';
import type { CaseScope } from '../cases/scope';
import { lockExhibit } from '../custody/holding';
import { withLedger } from '../custody/ledger';
import {
  DerivativeRecord,
  ExhibitFileRecord,
  type ExhibitRecord,
} from '../database/models/exhibit';
import { HttpProblem, conflict, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { ContentChanged } from '../store/checked-read';
import type { Published } from '../store/file-store';
import type { Inspection } from '../store/inspect-worker';
import type { Rendition } from '../store/picture';
import { presentExhibit } from './presenter';
import { exhibitOf } from './register';
import { uploadedFile, type UploadedFile } from './upload';

type Accepted = Exclude<Inspection, { refused: string }>;
type Made = Rendition & { readonly stored: Published };

/**
 * Takes a file in whole or not at all: looked into, given its address in the store, then its row and
 * the ledger's event in one transaction. Until that has committed nobody sees anything; what a crash
 * leaves in the store is swept at the next start.
 */
export async function takeIn(
  services: Services,
  scope: CaseScope,
  exhibitId: string,
  request: Request,
  statedSha256: string | null,
  zone: string,
): Promise<ExhibitFile> {
  const upload = uploadedFile(request);
  const exhibit = await exhibitOf(scope, exhibitId);
  await mustBeNew(exhibit, upload.sha256);
  const seen = await services.inspector.inspect({ path: upload.path, name: upload.name });
  if ('refused' in seen) {
    await services.accessLog.record({
      actor: scope.account,
      action: 'refused',
      caseId: scope.caseId,
      subject: upload.name,
      detail: seen.refused,
    });
    throw unprocessable('file', seen.refused);
  }
  const original = await publish(services, upload);
  const made = await storeRenditions(services, seen);
  const id = await record(services, scope, exhibitId, { upload, seen, made, statedSha256, zone });
  for (const file of [original, ...made.map(({ stored }) => stored)]) {
    await services.store.settle(file);
  }
  const shown = await presentExhibit(await exhibitOf(scope, exhibitId));
  const file = shown.files.find((each) => each.id === id);
  if (!file) throw new Error(`File ${id} was taken in and is not there`);
  return file;
}

interface Intake {
  readonly upload: UploadedFile;
  readonly seen: Accepted;
  readonly made: readonly Made[];
  readonly statedSha256: string | null;
  readonly zone: string;
}

/** The row, its derivatives and the event: all or none. */
function record(
  services: Services,
  scope: CaseScope,
  exhibitId: string,
  { upload, seen, made, statedSha256, zone }: Intake,
): Promise<string> {
  const id = newId();
  const { name, size, sha256, sha512 } = upload;
  return withLedger(services, scope, async (ledger) => {
    const { transaction } = ledger;
    const exhibit = await lockExhibit(scope, exhibitId, transaction);
    const same = await ExhibitFileRecord.findOne({ where: { exhibitId, sha256 }, transaction });
    if (same)
      throw conflict(`${exhibit.number} holds the same content already, as "${same.name}".`);
    const { event } = await ledger.append({
      kind: 'file taken in',
      exhibit: exhibit.number,
      zone,
      sealBefore: exhibit.seal,
      sealAfter: exhibit.seal,
      location: exhibit.location,
      note: comparison(sha256, statedSha256),
      files: [{ name, size, sha256, sha512 }],
    });
    await ExhibitFileRecord.create(
      {
        id,
        caseId: scope.caseId,
        exhibitId,
        name,
        mediaType: seen.mediaType,
        size,
        sha256,
        sha512,
        statedSha256,
        takenInAt: new Date(event.recordedAt),
        eventSequence: event.sequence,
        width: seen.picture?.width ?? null,
        height: seen.picture?.height ?? null,
        latitude: seen.metadata?.latitude ?? null,
        longitude: seen.metadata?.longitude ?? null,
        metadata: seen.metadata === null ? null : JSON.stringify(seen.metadata),
      },
      { transaction },
    );
    await DerivativeRecord.bulkCreate(
      made.map(({ size: kind, mediaType, width, height, recipe, stored }) => ({
        fileId: id,
        kind,
        mediaType,
        width,
        height,
        size: stored.size,
        sha256: stored.sha256,
        recipe,
      })),
      { transaction },
    );
    return id;
  });
}

/** Asked before anything is stored, and again under the lock. */
async function mustBeNew(
  { id: exhibitId, number }: ExhibitRecord,
  sha256: string,
  transaction?: Transaction,
): Promise<void> {
  const same = await ExhibitFileRecord.findOne({ where: { exhibitId, sha256 }, transaction });
  if (same) throw conflict(`${number} holds the same content already, as "${same.name}".`);
}

async function publish(services: Services, upload: UploadedFile): Promise<Published> {
  try {
    return await services.store.publish(upload);
  } catch (error) {
    if (!(error instanceof ContentChanged)) throw error;
    services.log.error({ err: error }, 'stored content was changed');
    throw new HttpProblem(
      409,
      'The stored copy was changed',
      'The same content is in the store already, and that copy is not what it was. Nothing was taken in; tell the laboratory lead.',
    );
  }
}

async function storeRenditions({ store }: Services, { picture }: Accepted): Promise<Made[]> {
  const made: Made[] = [];
  for (const rendition of picture?.renditions ?? []) {
    const received = await store.receive(once(rendition.bytes), rendition.bytes.byteLength);
    made.push({ ...rendition, stored: await store.publish(received) });
  }
  return made;
}

async function* once(bytes: Uint8Array): AsyncGenerator<Buffer> {
  yield await Promise.resolve(Buffer.from(bytes));
}

/** The ledger keeps what the giver said beside what was found. */
function comparison(found: string, stated: string | null): string {
  if (stated === null) return '';
  return stated === found
    ? `The giver stated SHA-256 ${stated}: it agrees.`
    : `The giver stated SHA-256 ${stated}: it does not agree with the file as received.`;
}
