import type { PictureMetadata } from '#shared/contracts/exhibits';
import type { CameraMetadata } from '../store/metadata';

type Doubt = PictureMetadata['doubts'][number];

/** What a picture's metadata is held against. */
export interface Circumstances {
  readonly takenInAt: Date;
  /** When the exhibit was collected, if somebody said so. */
  readonly collectedAt: Date | null;
  /** Day of the incident, if the brief tells it. */
  readonly incidentOn: string | null;
  /** Where the pictures of the case were taken for the most part; null if too few say. */
  readonly middle: Position | null;
}

export interface Position {
  readonly latitude: number;
  readonly longitude: number;
}

const minute = 60 * 1000;
const hour = 60 * minute;
/** Zones reach from UTC−12 to UTC+14: a local time alone fixes the moment only to this. */
const earliestZone = 14 * hour;
const latestZone = 12 * hour;
/** A phone's position may be off by hundreds of metres between buildings (common practice). */
const farMetres = 2000;
/** Fewer positions do not tell where the scene is. */
const enoughPositions = 4;

/**
 * What an investigator should look at twice before relying on a picture's time or place. A doubt is
 * no finding: there are innocent reasons for each of them.
 */
export function doubtsOf(metadata: CameraMetadata | null, about: Circumstances): Doubt[] {
  if (metadata === null) {
    return [
      doubt('no-metadata', 'The file carries no metadata: time, camera and place are not known.'),
    ];
  }
  return [
    ...zoneDoubts(metadata),
    ...orderDoubts(metadata, about),
    ...clockDoubts(metadata),
    ...editDoubts(metadata),
    ...placeDoubts(metadata, about.middle),
  ];
}

function zoneDoubts({ takenAtLocal, takenAtOffset }: CameraMetadata): Doubt[] {
  if (takenAtLocal === null) {
    return [doubt('no-time', 'The camera wrote no time of taking.')];
  }
  if (takenAtOffset !== null) return [];
  return [
    doubt(
      'zone-unknown',
      'The camera wrote the time without its zone: the moment is known only if the setting of its clock is.',
    ),
  ];
}

function orderDoubts(metadata: CameraMetadata, about: Circumstances): Doubt[] {
  const earliest = earliestMoment(metadata);
  if (earliest === null) return [];
  const doubts: Doubt[] = [];
  if (earliest > about.takenInAt.getTime() + minute) {
    doubts.push(
      doubt(
        'after-intake',
        `By the camera's clock the picture was taken after it arrived here (${utc(about.takenInAt)}).`,
      ),
    );
  }
  if (about.collectedAt !== null && earliest > about.collectedAt.getTime() + 12 * hour) {
    doubts.push(
      doubt(
        'after-collection',
        `By the camera's clock the picture was taken after the exhibit was collected (${utc(about.collectedAt)}).`,
      ),
    );
  }
  const latest = metadata.takenAtOffset === null ? earliest + earliestZone + latestZone : earliest;
  if (
    about.incidentOn !== null &&
    latest < Date.parse(`${about.incidentOn}T00:00:00Z`) - latestZone
  ) {
    doubts.push(
      doubt(
        'before-incident',
        `By the camera's clock (${metadata.takenAtLocal?.replace('T', ' ')}) the picture was taken before the incident of ${about.incidentOn}.`,
      ),
    );
  }
  return doubts;
}

/** The first moment at which the picture can have been taken, ms since 1970; null if no time is told. */
function earliestMoment({ takenAtLocal, takenAtOffset }: CameraMetadata): number | null {
  if (takenAtLocal === null) return null;
  return takenAtOffset === null
    ? Date.parse(`${takenAtLocal}Z`) - earliestZone
    : Date.parse(`${takenAtLocal}${takenAtOffset}`);
}

/** Satellites know the time; a camera's clock is right only if somebody set it. */
function clockDoubts({ takenAtLocal, takenAtOffset, satelliteTime }: CameraMetadata): Doubt[] {
  if (takenAtLocal === null || satelliteTime === null) return [];
  const satellites = Date.parse(satelliteTime);
  const local = Date.parse(`${takenAtLocal}Z`);
  const quarter = 15 * minute;
  const difference =
    takenAtOffset === null
      ? // Whole quarters of an hour may be the zone; what is left over is the clock.
        local - satellites - quarter * Math.round((local - satellites) / quarter)
      : Date.parse(`${takenAtLocal}${takenAtOffset}`) - satellites;
  // A receiver may hold a position that is a few minutes old.
  if (Math.abs(difference) <= 5 * minute) return [];
  const minutes = Math.round(Math.abs(difference) / minute);
  return [
    doubt(
      'clock-differs',
      `The camera's clock and the satellites' time (${satelliteTime}) differ by ${minutes} min.`,
    ),
  ];
}

/** Words in the names of programs that alter pictures; no such list is complete. */
const editors = /retouch|edit|paint|enhanc|convert|develop|studio|shop|room/i;

function editDoubts({
  takenAtLocal,
  changedAtLocal,
  software,
  editHistory,
}: CameraMetadata): Doubt[] {
  const by = software === null ? '' : ` by "${software}"`;
  if (editHistory) {
    return [
      doubt(
        'edited',
        `The metadata tells of editing${by}: ask for the file as the camera wrote it.`,
      ),
    ];
  }
  if (software !== null && editors.test(software)) {
    return [
      doubt(
        'edited',
        `The file was written by "${software}", which sounds like an editing program.`,
      ),
    ];
  }
  if (takenAtLocal !== null && changedAtLocal !== null && changedAtLocal > takenAtLocal) {
    return [
      doubt(
        'saved-later',
        `The file was written again at ${changedAtLocal}${by}, after it was taken.`,
      ),
    ];
  }
  return [];
}

function placeDoubts({ latitude, longitude }: CameraMetadata, middle: Position | null): Doubt[] {
  if (latitude === null || longitude === null || middle === null) return [];
  const metres = distance({ latitude, longitude }, middle);
  if (metres <= farMetres) return [];
  return [
    doubt(
      'far-away',
      `The position in the picture lies ${(metres / 1000).toFixed(1)} km from most pictures of the case.`,
    ),
  ];
}

/** The median position: a stray picture or two do not move it. */
export function middleOf(positions: readonly Position[]): Position | null {
  if (positions.length < enoughPositions) return null;
  return {
    latitude: median(positions.map((position) => position.latitude)),
    longitude: median(positions.map((position) => position.longitude)),
  };
}

/**
 * Great-circle distance in metres (haversine formula, mean Earth radius 6 371 008.8 m after IUGG).
 * Good to 0.6 %, which is far finer than the question.
 */
export function distance(a: Position, b: Position): number {
  const radians = (degrees: number): number => (degrees * Math.PI) / 180;
  const half = (angle: number): number => Math.sin(radians(angle) / 2) ** 2;
  const h =
    half(b.latitude - a.latitude) +
    Math.cos(radians(a.latitude)) * Math.cos(radians(b.latitude)) * half(b.longitude - a.longitude);
  return 2 * 6_371_008.8 * Math.asin(Math.min(1, Math.sqrt(h)));
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

const doubt = (code: string, message: string): Doubt => ({ code, message });

const utc = (time: Date): string => `${time.toISOString().slice(0, 16).replace('T', ' ')} UTC`;
