import { createHash } from 'node:crypto';
import { mkdir, rm, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import * as prettier from 'prettier';

/** The files of one scene, by path inside its folder, before anything is written. */
export type Files = Map<string, Buffer>;

export async function jsonFile(value: unknown): Promise<Buffer> {
  const options = { parser: 'json', printWidth: 100 };
  return Buffer.from(await prettier.format(JSON.stringify(value), options));
}

export function digest(content: Buffer): string {
  return createHash('sha256').update(content).digest('hex');
}

const MEDIA_TYPES: Record<string, string> = {
  csv: 'text/csv',
  json: 'application/json',
  jpg: 'image/jpeg',
  pdf: 'application/pdf',
};

export function fileEntry(
  files: Files,
  path: string,
  title: string,
): { path: string; title: string; mediaType: string; bytes: number; sha256: string } {
  const content = files.get(path);
  const mediaType = MEDIA_TYPES[path.split('.').pop() ?? ''];
  if (content === undefined || mediaType === undefined) throw new Error(`No such file: ${path}`);
  return { path, title, mediaType, bytes: content.length, sha256: digest(content) };
}

/** Replaces a folder by exactly these files. */
export async function writeFolder(folder: string, files: Files): Promise<void> {
  await rm(folder, { recursive: true, force: true });
  for (const [path, content] of files) {
    const target = join(folder, path);
    await mkdir(dirname(target), { recursive: true });
    await writeFile(target, content);
  }
}

/** Rounds every number in plain data, so that truth files stay readable. */
export function rounded<T>(value: T, digits: number): T {
  const round = (item: unknown): unknown => {
    if (typeof item === 'number') return Number(item.toFixed(digits));
    if (Array.isArray(item)) return item.map(round);
    if (item !== null && typeof item === 'object') {
      return Object.fromEntries(Object.entries(item).map(([key, part]) => [key, round(part)]));
    }
    return item;
  };
  return round(value) as T;
}
