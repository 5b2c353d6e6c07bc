import { readFileSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import { archiveName, belongsIn, decodeBagPath, encodeBagPath, exhibitFolder } from './bag-path';

const vectors = JSON.parse(
  readFileSync('test/reference/vectors/bagit_rfc8493_paths.json', 'utf8'),
) as { encode: { path: string; manifest: string }[]; must_reject_paths: string[] };

describe('paths of a bag', () => {
  it.each(vectors.encode)('writes $path as $manifest and reads it back', ({ path, manifest }) => {
    expect(encodeBagPath(path)).toBe(manifest);
    expect(decodeBagPath(manifest)).toBe(path);
  });

  it.each(vectors.must_reject_paths)('refuses %s', (entry) => {
    const [, path, kind] = /^(.*?)(?: \(in (payload|tag) manifest\))?$/.exec(entry) ?? [];
    expect(belongsIn(kind === 'tag' ? 'tags' : 'payload', path)).toBe(false);
  });

  it('takes payload files in the payload manifest and tag files in the other', () => {
    expect(belongsIn('payload', 'data/a/b.txt')).toBe(true);
    expect(belongsIn('tags', 'bag-info.txt')).toBe(true);
    expect(belongsIn('tags', 'tagmanifest-sha256.txt')).toBe(false);
  });

  it('makes plain ASCII names whatever the giver called the file', () => {
    const hash = '9f86d081884c7d65'.padEnd(64, '0');
    expect(archiveName(3, hash, 'Straße % 1.JPG')).toBe('003-9f86d081884c.jpg');
    expect(archiveName(1, hash, '../../etc/passwd')).toBe('001-9f86d081884c.bin');
    expect(archiveName(1, hash, 'a.b\r\nc.d e')).toBe('001-9f86d081884c.bin');
    expect(exhibitFolder('2026-014/3')).toBe('2026-014-3');
    expect(() => exhibitFolder('../')).toThrow('needs a letter');
  });
});
