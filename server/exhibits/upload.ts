import type { Request, RequestHandler } from 'express';
import multer, { type StorageEngine } from 'multer';
import { badRequest, tooLarge, unprocessable } from '../http/problems';
import type { FileStore } from '../store/file-store';
import { TooManyBytes, type Received } from '../store/receive';

/** A file that came with a request, whole, and not yet taken in. */
export interface UploadedFile extends Received {
  /** As the sender called it, made safe to show; never used as a path. */
  readonly name: string;
}

const uploads = new WeakMap<Request, UploadedFile>();

/** Takes one file of a multipart request (field `file`) into the store's temporary files. */
export function receiveUpload(store: FileStore, mostBytes: number): RequestHandler {
  const tooBig = () =>
    tooLarge(`The file is larger than ${inWords(mostBytes)}, which is the most that is taken.`);
  const parse = multer({
    storage: storeEngine(store, mostBytes),
    defParamCharset: 'utf8',
    limits: {
      fieldNameSize: 100,
      fieldSize: 1000,
      fields: 4,
      files: 1,
      parts: 5,
      headerPairs: 40,
      fieldNestingDepth: 0,
      fileSize: mostBytes,
    },
  }).single('file');
  return (request, response, next) => {
    // What is not taken in by the end of the request is forgotten, however the request ends.
    response.once('close', () => {
      const left = uploads.get(request);
      if (left) void store.discard(left);
    });
    const announced = Number(request.get('Content-Length') ?? 0);
    // The envelope of a multipart body is far below one mebibyte.
    if (announced > mostBytes + 1024 * 1024) {
      next(tooBig());
      return;
    }
    parse(request, response, (error: unknown) => {
      if (error === undefined) next();
      else if (error instanceof TooManyBytes || codeOf(error) === 'LIMIT_FILE_SIZE') next(tooBig());
      else if (error instanceof multer.MulterError) next(badRequest(`${error.message}.`));
      else next(error);
    });
  };
}

/** The file that came with the request; 422 where there is none or nothing in it. */
export function uploadedFile(request: Request): UploadedFile {
  const upload = uploads.get(request);
  if (!upload) throw unprocessable('file', 'Choose a file.');
  if (upload.size === 0) throw unprocessable('file', 'The file is empty (0 bytes).');
  return upload;
}

function storeEngine(store: FileStore, mostBytes: number): StorageEngine {
  return {
    _handleFile: (request, file, done) => {
      store.receive(file.stream as AsyncIterable<Buffer>, mostBytes).then(
        (received) => {
          uploads.set(request, { ...received, name: safeName(file.originalname) });
          done(null, { path: received.path, size: received.size });
        },
        (error: unknown) => done(error),
      );
    },
    _removeFile: (request, _file, done) => {
      const received = uploads.get(request);
      uploads.delete(request);
      if (!received) done(null);
      else
        store.discard(received).then(
          () => done(null),
          (error: unknown) => done(error as Error),
        );
    },
  };
}

/** Control characters and marks that turn the direction of writing can make a name lie. */
const deceiving = /[\p{Cc}\p{Cs}\u200e\u200f\u202a-\u202e\u2066-\u2069]/gu;

export function safeName(given: string): string {
  const base = given.split(/[/\\]/).at(-1) ?? '';
  const clean = base.replace(deceiving, '_').normalize('NFC').trim();
  return clean === '' || /^\.+$/.test(clean) ? 'file' : shortened(clean, 255);
}

/** Keeps the ending: it is what people know a file by. Never cuts through a pair of surrogates. */
function shortened(name: string, most: number): string {
  if (name.length <= most) return name;
  const ending = /\.[^.]{1,12}$/.exec(name)?.[0] ?? '';
  return name.slice(0, most - ending.length).replace(/\p{Cs}$/u, '') + ending;
}

const codeOf = (error: unknown): unknown => (error as { code?: unknown }).code;

function inWords(bytes: number): string {
  const units = ['bytes', 'KiB', 'MiB', 'GiB', 'TiB'];
  const power = Math.min(Math.floor(Math.log2(bytes) / 10), units.length - 1);
  return `${Number((bytes / 1024 ** power).toFixed(1))} ${units[power]}`;
}
