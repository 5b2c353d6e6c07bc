import type { Mark } from '#shared/contracts/survey';
import { MarkRecord } from '../database/models/mark';
import { presentMark } from '../survey/presenter';

/** The marks of a case that were not withdrawn, in a fixed order. */
export async function standingMarks(caseId: string): Promise<Mark[]> {
  const records = await MarkRecord.findAll({
    where: { caseId, removedAt: null },
    order: [['id', 'ASC']],
  });
  return records.map(presentMark);
}

/** Ids of all marks that the case ever had: a reconstruction may still name a withdrawn one. */
export async function markIdsOfCase(caseId: string): Promise<Set<string>> {
  const records = await MarkRecord.findAll({ where: { caseId }, attributes: ['id'] });
  return new Set(records.map((record) => record.id));
}
