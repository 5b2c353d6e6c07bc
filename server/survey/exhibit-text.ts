import type { CaseScope } from '../cases/scope';
import { ExhibitFileRecord, ExhibitRecord } from '../database/models/exhibit';
import { notFound, tooLarge, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { decodeText } from '../store/text';

export interface ExhibitText {
  readonly exhibitNumber: string;
  readonly name: string;
  readonly text: string;
}

const mostBytes = 10 * 1024 * 1024;

/** The text of a file of an exhibit of the case, hashed while it is read. */
export async function readExhibitText(
  services: Services,
  { caseId }: CaseScope,
  exhibitId: string,
  fileId: string,
): Promise<ExhibitText> {
  const [exhibit, file] = await Promise.all([
    ExhibitRecord.findOne({ where: { id: exhibitId, caseId } }),
    ExhibitFileRecord.findOne({ where: { id: fileId, exhibitId, caseId } }),
  ]);
  if (!exhibit || !file) throw notFound('This file');
  if (file.size > mostBytes) throw tooLarge('A survey file may hold at most 10 MiB.');
  const pieces: Buffer[] = [];
  for await (const piece of services.store.read(file.sha256)) pieces.push(piece as Buffer);
  const decoded = decodeText(Buffer.concat(pieces));
  if (!decoded) throw unprocessable('fileId', 'This file is not text.');
  return { exhibitNumber: exhibit.number, name: file.name, text: decoded.text };
}
