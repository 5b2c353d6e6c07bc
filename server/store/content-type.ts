import { open } from 'node:fs/promises';
import { extname } from 'node:path';
import { fileTypeFromFile } from 'file-type';
import { decodeText } from './text';

/** A file that is not what its name says; nobody should have to find that out in court. */
export class ContradictingType extends Error {}

const isoVideo = ['video/mp4', 'video/quicktime', 'video/x-m4v', 'video/3gpp', 'video/3gpp2'];
const heif = ['image/heic', 'image/heif', 'image/heic-sequence', 'image/heif-sequence'];
const plain = ['text/plain', 'text/csv', 'application/json', 'application/xml', 'text/html'];
const office = 'application/vnd.openxmlformats-officedocument';

/** What the content may be where the name has one of these endings; other endings promise nothing. */
const promised: Readonly<Record<string, readonly string[]>> = {
  '.jpg': ['image/jpeg'],
  '.jpeg': ['image/jpeg'],
  '.png': ['image/png', 'image/apng'],
  '.gif': ['image/gif'],
  '.webp': ['image/webp'],
  '.bmp': ['image/bmp'],
  '.avif': ['image/avif'],
  '.tif': ['image/tiff'],
  '.tiff': ['image/tiff'],
  '.heic': heif,
  '.heif': heif,
  '.svg': ['image/svg+xml'],
  '.pdf': ['application/pdf'],
  '.mp4': isoVideo,
  '.m4v': isoVideo,
  '.mov': isoVideo,
  '.avi': ['video/vnd.avi'],
  '.mkv': ['video/matroska', 'video/webm'],
  '.webm': ['video/webm', 'video/matroska'],
  '.zip': ['application/zip'],
  '.docx': [`${office}.wordprocessingml.document`, 'application/zip'],
  '.xlsx': [`${office}.spreadsheetml.sheet`, 'application/zip'],
  '.pptx': [`${office}.presentationml.presentation`, 'application/zip'],
  '.csv': ['text/csv'],
  '.tsv': ['text/plain'],
  '.txt': plain,
  '.log': plain,
  '.json': ['application/json'],
  '.geojson': ['application/json'],
  '.xml': ['application/xml', 'image/svg+xml', 'text/html'],
  '.html': ['text/html', 'text/plain', 'application/xml'],
  '.htm': ['text/html', 'text/plain', 'application/xml'],
};

/** Formats that are themselves text: a short sample of them reads as text and is yet more than that. */
const textual = new Set(['application/pdf', 'application/postscript', 'application/rtf']);

/**
 * The media type, found from the content; the sender's word counts for nothing.
 * @throws ContradictingType where the ending of the name promises something else.
 */
export async function findMediaType(path: string, name: string): Promise<string> {
  const ending = extname(name).toLowerCase();
  const found = await typeOfContent(path, ending);
  const allowed = promised[ending];
  if (allowed && !allowed.includes(found)) {
    throw new ContradictingType(
      `The name ends in "${ending}" but the content is ${describe(found)}. Nothing was kept.`,
    );
  }
  return found;
}

async function typeOfContent(path: string, ending: string): Promise<string> {
  const sample = await firstBytes(path, 64 * 1024);
  const recognised = (await fileTypeFromFile(path))?.mime;
  const text = decodeText(sample, true);
  if (text === null) {
    // Several formats are ZIP files within; a .zip may hold any of them.
    const zipped = sample.subarray(0, 4).toString('latin1') === 'PK\u0003\u0004';
    if (zipped && ending === '.zip') return 'application/zip';
    return recognised ?? 'application/octet-stream';
  }
  if (recognised !== undefined && textual.has(recognised)) return recognised;
  return typeOfText(text.text, ending);
}

/** CSV and plain text have no signature: what reads as text is text, and markup is told apart. */
function typeOfText(text: string, ending: string): string {
  const start = text.trimStart().slice(0, 4096).toLowerCase();
  if (start.startsWith('<')) {
    if (/<svg[\s>]/.test(start)) return 'image/svg+xml';
    if (/^<!doctype html|<html[\s>]|<script[\s>]|<body[\s>]/.test(start)) return 'text/html';
    return 'application/xml';
  }
  if (ending === '.csv') return 'text/csv';
  if (ending === '.json' || ending === '.geojson') {
    return /^[[{"\d-]/.test(start) ? 'application/json' : 'text/plain';
  }
  return 'text/plain';
}

async function firstBytes(path: string, most: number): Promise<Buffer> {
  const file = await open(path, 'r');
  try {
    const buffer = Buffer.alloc(most);
    const { bytesRead } = await file.read(buffer, 0, most, 0);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}

const describe = (mediaType: string): string =>
  mediaType === 'application/octet-stream' ? 'of no known kind' : mediaType;
