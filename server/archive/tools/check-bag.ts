import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { readFile, readdir, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { belongsIn, decodeBagPath, encodeBagPath, type ManifestKind } from '../bag-path';
import type { Report } from './finding';

const declaration = 'BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n';

/**
 * Checks a bag's folder by RFC 8493, and more strictly where our own bags leave nothing open: hashes
 * in lower case, exactly two spaces, a line end after every line, no tag file that is not listed.
 */
export async function checkBag(folder: string, report: Report): Promise<void> {
  const files = await list(folder, '');
  const payload = files.filter((file) => file.path.startsWith('data/'));
  const tags = files.filter((file) => !file.path.startsWith('data/'));

  await report.part('bagit.txt', async () => {
    if ((await text(folder, 'bagit.txt')) !== declaration) throw new Error('is not as it must be');
    return 'BagIt 1.0';
  });
  await report.part('bag-info.txt', async () => {
    const octets = payload.reduce((sum, file) => sum + file.size, 0);
    const stated = /^Payload-Oxum: (\d+\.\d+)$/m.exec(await text(folder, 'bag-info.txt'))?.[1];
    const found = `${octets}.${payload.length}`;
    if (stated !== found)
      throw new Error(`says ${stated ?? 'nothing'} of the payload, it is ${found}`);
    return `${payload.length} files, ${octets} bytes`;
  });
  const ownTags = tags.filter((file) => !file.path.startsWith('tagmanifest-'));
  for (const algorithm of ['sha256', 'sha512']) {
    await checkManifest(folder, report, 'payload', algorithm, payload);
    await checkManifest(folder, report, 'tags', algorithm, ownTags);
  }
  const known = /^(bagit|bag-info|(tag)?manifest-(sha256|sha512))\.txt$/;
  for (const { path } of tags) {
    if (!known.test(path)) report.wrong(path, 'does not belong to this bag');
  }
}

async function checkManifest(
  folder: string,
  report: Report,
  kind: ManifestKind,
  algorithm: string,
  files: readonly ListedFile[],
): Promise<void> {
  const name = `${kind === 'payload' ? 'manifest' : 'tagmanifest'}-${algorithm}.txt`;
  await report.part(name, async () => {
    const listed = readManifest(await text(folder, name), kind, (m) => report.wrong(name, m));
    for (const { path } of files) {
      if (!listed.has(path)) report.wrong(path, `is in the bag but not in ${name}`);
    }
    const present = new Set(files.map((file) => file.path));
    for (const [path, hash] of listed) {
      if (!present.has(path)) report.wrong(path, `is in ${name} but not in the bag`);
      else if ((await hashFile(join(folder, path), algorithm)) !== hash) {
        report.wrong(path, `is not the file that ${name} names`);
      }
    }
    return `${listed.size} files have their ${algorithm === 'sha256' ? 'SHA-256' : 'SHA-512'}`;
  });
}

/** Path to hash; every line that is not as it must be is told. */
function readManifest(
  content: string,
  kind: ManifestKind,
  wrong: (message: string) => void,
): Map<string, string> {
  const listed = new Map<string, string>();
  const lines = content.split('\n');
  if (lines.pop() !== '') wrong('does not end with a line end');
  lines.forEach((line, i) => {
    const match = /^([0-9a-f]{64}|[0-9a-f]{128}) {2}(\S.*)$/.exec(line);
    const path = match ? decodeBagPath(match[2]) : '';
    if (!match || encodeBagPath(path) !== match[2]) wrong(`line ${i + 1} cannot be read`);
    else if (!belongsIn(kind, path)) wrong(`line ${i + 1} names a path that may not be there`);
    else if (listed.has(path)) wrong(`line ${i + 1} names "${path}" again`);
    else listed.set(path, match[1]);
  });
  return listed;
}

export interface ListedFile {
  readonly path: string;
  readonly size: number;
}

/** All files below a folder; a link or a device in a bag is refused. */
async function list(folder: string, below: string): Promise<ListedFile[]> {
  const found: ListedFile[] = [];
  const entries = await readdir(join(folder, below), { withFileTypes: true });
  for (const entry of entries.sort((a, b) => (a.name < b.name ? -1 : 1))) {
    const path = below === '' ? entry.name : `${below}/${entry.name}`;
    if (entry.isDirectory()) found.push(...(await list(folder, path)));
    else if (entry.isFile()) found.push({ path, size: (await stat(join(folder, path))).size });
    else throw new Error(`${path} is neither a file nor a folder`);
  }
  return found;
}

/** Hash of a file, read in pieces. */
export async function hashFile(file: string, algorithm: string): Promise<string> {
  const hash = createHash(algorithm);
  for await (const chunk of createReadStream(file, { highWaterMark: 1 << 20 })) {
    hash.update(chunk as Buffer);
  }
  return hash.digest('hex');
}

/** A file as text; bytes that are no UTF-8, or a byte order mark, are refused. */
export async function text(folder: string, path: string): Promise<string> {
  const bytes = await readFile(join(folder, path));
  return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
}
