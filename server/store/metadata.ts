import { open } from 'node:fs/promises';
import exifr from 'exifr';

/** What a picture's own metadata says, as the camera wrote it; nothing is made of it here. */
export interface CameraMetadata {
  readonly make: string | null;
  readonly model: string | null;
  readonly lens: string | null;
  readonly focalLengthMm: number | null;
  /** "2026-11-03T14:05:22", in whatever zone the camera's clock was set to. */
  readonly takenAtLocal: string | null;
  /** "+01:00" if the camera wrote one. */
  readonly takenAtOffset: string | null;
  /** When the file was last written by a program, same clock. */
  readonly changedAtLocal: string | null;
  /** From the satellites, UTC. */
  readonly satelliteTime: string | null;
  readonly latitude: number | null;
  readonly longitude: number | null;
  readonly software: string | null;
  /** The metadata tells of steps of editing. */
  readonly editHistory: boolean;
}

/**
 * Reads EXIF, GPS and XMP. Values are not revived: the library would read capture times in this
 * machine's zone. Null where the file holds none. Runs in the worker, under its time limit.
 */
export async function readMetadata(path: string): Promise<CameraMetadata | null> {
  const tags = await readTags(path);
  if (tags === null) return null;
  const text = (name: string): string | null => cleaned(tags[name]);
  const number = (name: string): number | null => finite(tags[name]);
  const metadata: CameraMetadata = {
    make: text('Make'),
    model: text('Model'),
    lens: text('LensModel'),
    focalLengthMm: number('FocalLength'),
    takenAtLocal: localTime(tags['DateTimeOriginal'] ?? tags['CreateDate']),
    takenAtOffset: offset(tags['OffsetTimeOriginal'] ?? tags['OffsetTimeDigitized']),
    changedAtLocal: localTime(tags['ModifyDate']),
    satelliteTime: satelliteTime(tags['GPSDateStamp'], tags['GPSTimeStamp']),
    latitude: within(number('latitude'), 90),
    longitude: within(number('longitude'), 180),
    software: text('Software') ?? text('CreatorTool'),
    editHistory: tags['History'] !== undefined || tags['DerivedFrom'] !== undefined,
  };
  return Object.values(metadata).some((value) => value !== null && value !== false)
    ? metadata
    : null;
}

async function readTags(path: string): Promise<Record<string, unknown> | null> {
  try {
    const tags = (await exifr.parse(await beginningOf(path), {
      tiff: true,
      exif: true,
      gps: true,
      xmp: true,
      icc: false,
      iptc: false,
      reviveValues: false,
      translateValues: false,
      mergeOutput: true,
    })) as Record<string, unknown> | undefined;
    return tags && Object.keys(tags).length > 0 ? tags : null;
  } catch {
    // Damaged metadata is not a reason to refuse the picture; it is then a picture without metadata.
    return null;
  }
}

/** Metadata stand at the beginning. The library, given a path, leaves damaged files open. */
const mostBytes = 16 * 1024 * 1024;

async function beginningOf(path: string): Promise<Buffer> {
  const file = await open(path, 'r');
  try {
    const { size } = await file.stat();
    const buffer = Buffer.alloc(Math.min(size, mostBytes));
    const { bytesRead } = await file.read(buffer, 0, buffer.length, 0);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}

function cleaned(value: unknown): string | null {
  if (typeof value !== 'string') return null;
  const text = value.replace(/[\u0000-\u001f\u007f]+/g, ' ').trim();
  return text === '' ? null : text.slice(0, 200);
}

const finite = (value: unknown): number | null =>
  typeof value === 'number' && Number.isFinite(value) ? value : null;

const within = (value: number | null, most: number): number | null =>
  value !== null && Math.abs(value) <= most ? value : null;

/** EXIF writes "2026:11:03 14:05:22"; XMP writes ISO 8601. Both without a zone here. */
function localTime(value: unknown): string | null {
  const match =
    typeof value === 'string'
      ? /^(\d{4})[:-](\d\d)[:-](\d\d)[ T](\d\d):(\d\d):(\d\d)/.exec(value)
      : null;
  if (!match) return null;
  const [, year, month, day, hour, minute, second] = match;
  const text = `${year}-${month}-${day}T${hour}:${minute}:${second}`;
  // The year 0000 or a 31st of February is a clock that was never set.
  const time = new Date(`${text}Z`);
  return !Number.isNaN(time.getTime()) && time.toISOString().startsWith(text) ? text : null;
}

const offset = (value: unknown): string | null =>
  typeof value === 'string' ? (/^[+-]\d\d:\d\d/.exec(value.trim())?.[0] ?? null) : null;

function satelliteTime(date: unknown, time: unknown): string | null {
  if (typeof date !== 'string' || !/^\d{4}:\d\d:\d\d/.test(date)) return null;
  const parts = Array.from(
    typeof time === 'string' ? time.split(':') : ((time as ArrayLike<unknown> | undefined) ?? []),
    Number,
  );
  if (parts.length !== 3 || parts.some((part) => !Number.isFinite(part))) return null;
  const [hour, minute, second] = parts.map((part) => String(Math.floor(part)).padStart(2, '0'));
  const local = localTime(`${date.slice(0, 10)} ${hour}:${minute}:${second}`);
  return local === null ? null : `${local}Z`;
}
