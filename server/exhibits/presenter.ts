import { Op, QueryTypes } from 'sequelize';
import type { Exhibit, ExhibitFile, PictureMetadata } from '#shared/contracts/exhibits';
import { presentEvent } from '../custody/presenter';
import { AccountRecord } from '../database/models/account';
import { CaseRecord } from '../database/models/case';
import { CustodyEventRecord } from '../database/models/custody';
import { DerivativeRecord, ExhibitFileRecord, ExhibitRecord } from '../database/models/exhibit';
import type { CameraMetadata } from '../store/metadata';
import { doubtsOf, middleOf, type Position } from './doubts';

/** Everything that exhibits of one case are shown with, read in a handful of queries. */
interface Surroundings {
  /** By exhibit. */
  readonly files: ReadonlyMap<string, readonly ExhibitFileRecord[]>;
  /** Files that have a picture for the screen. */
  readonly pictured: ReadonlySet<string>;
  /** Numbers of the exhibits that hold a content, by its SHA-256. */
  readonly holdersOfContent: ReadonlyMap<string, readonly string[]>;
  readonly middle: Position | null;
  readonly incidentOn: string | null;
  readonly names: ReadonlyMap<string, string>;
  readonly offers: ReadonlyMap<number, ReturnType<typeof presentEvent>>;
}

/** Exhibits of one case as people see them. */
export async function presentExhibits(records: readonly ExhibitRecord[]): Promise<Exhibit[]> {
  if (records.length === 0) return [];
  const around = await surroundingsOf(records);
  return records.map((record) => present(record, around));
}

/** A new exhibit has no files and no offers yet: nothing needs to be read to show it. */
export const presentNew = (record: ExhibitRecord, holder: AccountRecord): Exhibit =>
  present(record, {
    files: new Map(),
    pictured: new Set(),
    holdersOfContent: new Map(),
    middle: null,
    incidentOn: null,
    names: new Map([[holder.id, holder.name]]),
    offers: new Map(),
  });

export async function presentExhibit(record: ExhibitRecord): Promise<Exhibit> {
  const [shown] = await presentExhibits([record]);
  return shown;
}

async function surroundingsOf(records: readonly ExhibitRecord[]): Promise<Surroundings> {
  const { caseId } = records[0];
  const files = await ExhibitFileRecord.findAll({
    where: { exhibitId: records.map((record) => record.id) },
    order: [
      ['takenInAt', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const [pictured, holdersOfContent, middle, incident, names, offers] = await Promise.all([
    picturedFiles(files),
    contentHolders(caseId, files),
    middlePosition(caseId),
    CaseRecord.findByPk(caseId, { attributes: ['incidentOn'] }),
    namesOf(records),
    offersOf(caseId, records),
  ]);
  return {
    files: grouped(files),
    pictured,
    holdersOfContent,
    middle,
    incidentOn: incident?.incidentOn ?? null,
    names,
    offers,
  };
}

function present(record: ExhibitRecord, around: Surroundings): Exhibit {
  return {
    id: record.id,
    number: record.number,
    kind: record.kind,
    description: record.description,
    source: record.source,
    collectedBy: record.collectedBy,
    collectedAt: record.collectedAt?.toISOString() ?? null,
    collectedPlace: record.collectedPlace,
    condition: record.conditionOnReceipt,
    packaging: record.packaging,
    sealNumber: record.sealOnReceipt,
    sensitive: Boolean(record.sensitive),
    parentNumber: record.parentNumber,
    registeredAt: record.registeredAt.toISOString(),
    version: record.version,
    custody: custodyOf(record, around),
    files: (around.files.get(record.id) ?? []).map((file) => presentFile(file, record, around)),
  };
}

function custodyOf(record: ExhibitRecord, { names, offers }: Surroundings): Exhibit['custody'] {
  const offer = record.pendingSequence === null ? undefined : offers.get(record.pendingSequence);
  const nameOf = (id: string | null): string => (id === null ? '' : (names.get(id) ?? ''));
  return {
    holderId: record.holderId,
    holder: record.holderId === null ? null : nameOf(record.holderId),
    location: record.location,
    sealNumber: record.seal,
    pending:
      offer && record.pendingToId !== null
        ? {
            sequence: offer.sequence,
            fromId: offer.recordedBy.id,
            from: offer.recordedBy.name,
            toId: record.pendingToId,
            to: nameOf(record.pendingToId),
            offeredAt: offer.recordedAt,
            purpose: offer.purpose,
          }
        : null,
  };
}

function presentFile(
  file: ExhibitFileRecord,
  exhibit: ExhibitRecord,
  around: Surroundings,
): ExhibitFile {
  return {
    id: file.id,
    name: file.name,
    mediaType: file.mediaType,
    size: Number(file.size),
    sha256: file.sha256,
    sha512: file.sha512,
    statedSha256: file.statedSha256,
    takenInAt: file.takenInAt.toISOString(),
    picture: file.mediaType.startsWith('image/') ? pictureOf(file, exhibit, around) : null,
    hasThumbnail: around.pictured.has(file.id),
    sameContentAs: (around.holdersOfContent.get(file.sha256) ?? []).filter(
      (number) => number !== exhibit.number,
    ),
  };
}

function pictureOf(
  file: ExhibitFileRecord,
  exhibit: ExhibitRecord,
  { middle, incidentOn }: Surroundings,
): PictureMetadata {
  const metadata = file.metadata === null ? null : (JSON.parse(file.metadata) as CameraMetadata);
  return {
    width: file.width,
    height: file.height,
    make: metadata?.make ?? null,
    model: metadata?.model ?? null,
    lens: metadata?.lens ?? null,
    focalLengthMm: metadata?.focalLengthMm ?? null,
    takenAtLocal: metadata?.takenAtLocal ?? null,
    takenAtOffset: metadata?.takenAtOffset ?? null,
    latitude: metadata?.latitude ?? null,
    longitude: metadata?.longitude ?? null,
    software: metadata?.software ?? null,
    doubts: doubtsOf(metadata, {
      takenInAt: file.takenInAt,
      collectedAt: exhibit.collectedAt,
      incidentOn,
      middle,
    }),
  };
}

async function picturedFiles(files: readonly ExhibitFileRecord[]): Promise<Set<string>> {
  const derivatives = await DerivativeRecord.findAll({
    where: { fileId: files.map((file) => file.id), kind: 'thumbnail' },
    attributes: ['fileId'],
  });
  return new Set(derivatives.map(({ fileId }) => fileId));
}

/** Within the case: that another case holds the same content is nobody's business here. */
async function contentHolders(
  caseId: string,
  files: readonly ExhibitFileRecord[],
): Promise<Map<string, string[]>> {
  const alike = await ExhibitFileRecord.findAll({
    where: { caseId, sha256: [...new Set(files.map((file) => file.sha256))] },
    attributes: ['sha256', 'exhibitId'],
  });
  const exhibits = await ExhibitRecord.findAll({
    where: { id: [...new Set(alike.map((file) => file.exhibitId))] },
    attributes: ['id', 'number'],
    order: [['ordinal', 'ASC']],
  });
  const rankOf = new Map(exhibits.map(({ id, number }, rank) => [id, { number, rank }]));
  const held = alike
    .flatMap(({ sha256, exhibitId }) => {
      const exhibit = rankOf.get(exhibitId);
      return exhibit ? [{ sha256, ...exhibit }] : [];
    })
    .sort((a, b) => a.rank - b.rank);
  const holders = new Map<string, string[]>();
  for (const { sha256, number } of held) {
    holders.set(sha256, [...new Set([...(holders.get(sha256) ?? []), number])]);
  }
  return holders;
}

async function middlePosition(caseId: string): Promise<Position | null> {
  const { sequelize } = ExhibitFileRecord;
  if (!sequelize) throw new Error('Models are not tied to a connection');
  const positions = await sequelize.query<Position>(
    `SELECT latitude, longitude FROM exhibit_files
      WHERE case_id = ? AND latitude IS NOT NULL AND longitude IS NOT NULL`,
    { type: QueryTypes.SELECT, replacements: [caseId] },
  );
  return middleOf(positions);
}

function grouped(files: readonly ExhibitFileRecord[]): Map<string, ExhibitFileRecord[]> {
  const groups = new Map<string, ExhibitFileRecord[]>();
  for (const file of files) {
    const group = groups.get(file.exhibitId);
    if (group) group.push(file);
    else groups.set(file.exhibitId, [file]);
  }
  return groups;
}

async function namesOf(records: readonly ExhibitRecord[]): Promise<Map<string, string>> {
  const ids = records.flatMap(({ holderId, pendingToId }) =>
    [holderId, pendingToId].filter((id) => id !== null),
  );
  const accounts = await AccountRecord.findAll({
    where: { id: [...new Set(ids)] },
    attributes: ['id', 'name'],
  });
  return new Map(accounts.map(({ id, name }) => [id, name]));
}

async function offersOf(caseId: string, records: readonly ExhibitRecord[]) {
  const sequences = records.flatMap(({ pendingSequence }) => pendingSequence ?? []);
  const events = await CustodyEventRecord.findAll({
    where: { caseId, sequence: { [Op.in]: sequences } },
  });
  return new Map(events.map((event) => [event.sequence, presentEvent(event)]));
}
