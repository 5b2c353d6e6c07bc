/** In a manifest only LF, CR and % are percent-encoded (RFC 8493, 2.1.3). */
export function encodeBagPath(path: string): string {
  return path.replaceAll('%', '%25').replaceAll('\n', '%0A').replaceAll('\r', '%0D');
}

export function decodeBagPath(path: string): string {
  return path.replace(/%(0A|0D|25)/gi, (_, code: string) =>
    String.fromCharCode(Number.parseInt(code, 16)),
  );
}

/** Whether a path stays inside the bag on any system (RFC 8493, 5.1 and 5.2). */
export function staysInside(path: string): boolean {
  if (path === '' || path.startsWith('/') || path.startsWith('~') || path.includes('\\'))
    return false;
  if (/^[A-Za-z]:/.test(path) || path.includes('\0')) return false;
  return path.split('/').every((part) => part !== '' && part !== '.' && part !== '..');
}

export type ManifestKind = 'payload' | 'tags';

/** Whether a path may stand in that kind of manifest. */
export function belongsIn(kind: ManifestKind, path: string): boolean {
  if (!staysInside(path)) return false;
  const payload = path.startsWith('data/');
  return kind === 'payload' ? payload : !payload && !/^tagmanifest-[^/]*$/.test(path);
}

/** Folder of an exhibit: its number with ASCII letters, digits, point and hyphen only. */
export function exhibitFolder(number: string): string {
  const folder = number.replace(/[^A-Za-z0-9.-]+/g, '-').replace(/^[.-]+/, '');
  if (folder === '') throw new RangeError('An exhibit number needs a letter or a digit.');
  return folder;
}

/** "003-9f86d081884c.jpg": place in the exhibit, beginning of the hash, ending of the own name. */
export function archiveName(place: number, sha256: string, ownName: string): string {
  const ending = /\.([A-Za-z0-9]{1,8})$/.exec(ownName)?.[1].toLowerCase() ?? 'bin';
  return `${String(place).padStart(3, '0')}-${sha256.slice(0, 12)}.${ending}`;
}
