import { v7 as newId } from 'uuid';
import type * as z from 'zod';
import type { Reconstruction, addReconstruction } from '#shared/contracts/motion';
import {
  reconstructionDocument,
  type ReconstructionDocument,
} from '#shared/engine/documents/reconstruction';
import { namesOf } from '../cases/case-file';
import type { CaseScope } from '../cases/scope';
import { ReconstructionRecord } from '../database/models/reconstruction';
import { invalid, notFound, stale } from '../http/problems';
import type { Services } from '../services';
import { markIdsOfCase } from './marks';

type Entry = z.output<(typeof addReconstruction)['body']>;

/** Every alternative of the case, the oldest first. */
export async function listReconstructions(scope: CaseScope): Promise<{ items: Reconstruction[] }> {
  const records = await ReconstructionRecord.findAll({
    where: { caseId: scope.caseId },
    order: [['id', 'ASC']],
  });
  const names = await namesOf(records.map((record) => record.changedBy));
  return { items: records.map((record) => present(record, names.get(record.changedBy) ?? '')) };
}

export async function beginReconstruction(
  services: Services,
  scope: CaseScope,
  entry: Entry,
): Promise<Reconstruction> {
  await checkMarks(scope, entry.document);
  const record = await ReconstructionRecord.create({
    id: newId(),
    caseId: scope.caseId,
    name: entry.name,
    assumption: entry.assumption,
    document: JSON.stringify(entry.document),
    version: 1,
    changedBy: scope.account.id,
    changedAt: new Date(),
  });
  await services.accessLog.record({
    actor: scope.account,
    action: 'began reconstruction',
    caseId: scope.caseId,
    subject: entry.name,
    detail: entry.assumption,
  });
  return present(record, scope.account.name);
}

/** Saves over exactly the version that was edited; a newer one is answered with what stands. */
export async function saveReconstruction(
  services: Services,
  scope: CaseScope,
  id: string,
  version: number,
  entry: Entry,
): Promise<Reconstruction> {
  await checkMarks(scope, entry.document);
  const [changed] = await ReconstructionRecord.update(
    {
      name: entry.name,
      assumption: entry.assumption,
      document: JSON.stringify(entry.document),
      version: version + 1,
      changedBy: scope.account.id,
      changedAt: new Date(),
    },
    { where: { id, caseId: scope.caseId, version } },
  );
  const record = await reconstructionOf(scope, id);
  if (changed === 0) throw stale(await presentRecord(record));
  await services.accessLog.record({
    actor: scope.account,
    action: 'saved reconstruction',
    caseId: scope.caseId,
    subject: entry.name,
    detail: `version ${version + 1}`,
  });
  return presentRecord(record);
}

/** @throws 404 for one of another case */
export async function reconstructionOf(
  scope: CaseScope,
  id: string,
): Promise<ReconstructionRecord> {
  const record = await ReconstructionRecord.findOne({ where: { id, caseId: scope.caseId } });
  if (!record) throw notFound('This reconstruction');
  return record;
}

export async function presentRecord(record: ReconstructionRecord): Promise<Reconstruction> {
  const names = await namesOf([record.changedBy]);
  return present(record, names.get(record.changedBy) ?? '');
}

export const documentOf = (record: ReconstructionRecord): ReconstructionDocument =>
  reconstructionDocument.parse(JSON.parse(record.document));

function present(record: ReconstructionRecord, changedBy: string): Reconstruction {
  return {
    id: record.id,
    name: record.name,
    assumption: record.assumption,
    document: documentOf(record),
    version: record.version,
    changedAt: record.changedAt.toISOString(),
    changedBy,
  };
}

/** Work in progress may be incomplete, but a mark that it names must be one of this case. */
async function checkMarks(scope: CaseScope, document: ReconstructionDocument): Promise<void> {
  const ids = await markIdsOfCase(scope.caseId);
  const unknown = document.stations.flatMap((station, s) =>
    station.marks.flatMap((assignment, m) =>
      ids.has(assignment.markId)
        ? []
        : [
            {
              field: `document.stations.${s}.marks.${m}.markId`,
              message: `Station ${station.name}: this mark is not a mark of the case.`,
            },
          ],
    ),
  );
  if (unknown.length > 0) throw invalid(unknown);
}
