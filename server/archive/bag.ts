import { belongsIn, encodeBagPath } from './bag-path';
import { madeEntry, type BagEntry } from './entry';

export interface BagInfo {
  readonly organization: string;
  readonly identifier: string;
  readonly group: string;
  readonly description: string;
  /** YYYY-MM-DD; the date of the release, so that the same release gives the same bytes. */
  readonly date: string;
}

/** A label's value stands on one line: breaks in what people typed become spaces. */
const oneLine = (text: string) => text.replace(/[\r\n\t]+/g, ' ').trim();

function manifest(entries: readonly BagEntry[], algorithm: 'sha256' | 'sha512'): string {
  return entries.map((entry) => `${entry[algorithm]}  ${encodeBagPath(entry.path)}\n`).join('');
}

/**
 * The whole bag of a payload, tag files first, in the order in which it is written (RFC 8493).
 * Payload paths must be distinct even where upper and lower case are one, as on some disks.
 *
 * @throws RangeError when a payload path would leave `data/` or stands there twice
 */
export function bagOf(payload: readonly BagEntry[], info: BagInfo): BagEntry[] {
  const seen = new Set<string>();
  for (const { path } of payload) {
    if (!belongsIn('payload', path)) throw new RangeError(`"${path}" is no path of a payload.`);
    if (seen.has(path.toLowerCase())) throw new RangeError(`"${path}" stands in the bag twice.`);
    seen.add(path.toLowerCase());
  }
  const octets = payload.reduce((sum, entry) => sum + entry.size, 0);
  const tags = [
    madeEntry('bagit.txt', 'BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n'),
    madeEntry(
      'bag-info.txt',
      [
        `Source-Organization: ${oneLine(info.organization)}`,
        `External-Identifier: ${oneLine(info.identifier)}`,
        `Bag-Group-Identifier: ${oneLine(info.group)}`,
        `External-Description: ${oneLine(info.description)}`,
        `Bagging-Date: ${info.date}`,
        `Payload-Oxum: ${octets}.${payload.length}`,
        '',
      ].join('\n'),
    ),
    madeEntry('manifest-sha256.txt', manifest(payload, 'sha256')),
    madeEntry('manifest-sha512.txt', manifest(payload, 'sha512')),
  ];
  return [
    ...tags,
    madeEntry('tagmanifest-sha256.txt', manifest(tags, 'sha256')),
    madeEntry('tagmanifest-sha512.txt', manifest(tags, 'sha512')),
    ...payload,
  ];
}
