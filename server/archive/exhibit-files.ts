import type { ArchiveSource } from './archive-source';
import { archiveName, exhibitFolder } from './bag-path';
import { csv, type CsvCell } from './csv';
import { madeEntry, type BagEntry } from './entry';
import type { SnapshotExhibit, SnapshotFile } from './snapshot';

/** Where a file of an exhibit lies in the bag, seen from the bag's folder. */
export function exhibitPath(exhibit: SnapshotExhibit, place: number): string {
  const file = exhibit.files[place];
  return `data/exhibits/${exhibitFolder(exhibit.number)}/${archiveName(place + 1, file.sha256, file.name)}`;
}

export interface ListedFile {
  readonly exhibit: SnapshotExhibit;
  readonly file: SnapshotFile;
  readonly path: string;
}

/** Every released file in order of exhibits. */
export const listFiles = (exhibits: readonly SnapshotExhibit[]): ListedFile[] =>
  exhibits.flatMap((exhibit) =>
    exhibit.files.map((file, place) => ({ exhibit, file, path: exhibitPath(exhibit, place) })),
  );

const header = ['exhibit', 'kind', 'path', 'own_name', 'media_type', 'bytes', 'sha256', 'sha512'];

/** The table of the files' own names; the names in the bag are made, plain ASCII. */
export const filesCsv = (exhibits: readonly SnapshotExhibit[]): string =>
  csv(
    header,
    listFiles(exhibits).map(({ exhibit, file, path }): CsvCell[] => [
      exhibit.number,
      exhibit.kind,
      path,
      file.name,
      file.mediaType,
      file.size,
      file.sha256,
      file.sha512,
    ]),
  );

/** The released originals: bytes from the store, names and hashes from the frozen snapshot. */
export const exhibitEntries = (source: ArchiveSource): BagEntry[] => [
  madeEntry('data/exhibits/files.csv', filesCsv(source.snapshot.exhibits)),
  ...listFiles(source.snapshot.exhibits).map(({ file, path }) => ({
    path,
    size: file.size,
    sha256: file.sha256,
    sha512: file.sha512,
    open: () => source.openFile(file.sha256),
  })),
];
