import type { ComputationSummary } from '#shared/contracts/motion';
import { namesOf } from '../cases/case-file';
import type { CaseScope } from '../cases/scope';
import { CaseRecord } from '../database/models/case';
import { ComputationRecord } from '../database/models/computation';
import { notFound, stale, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { compute } from './compute-pool';
import { standingMarks } from './marks';
import { documentOf, presentRecord, reconstructionOf } from './reconstructions';

/** Recorded computations of the case, newest first. */
export async function listComputations(scope: CaseScope): Promise<{ items: ComputationSummary[] }> {
  const records = await ComputationRecord.findAll({
    where: { caseId: scope.caseId },
    attributes: { exclude: ['document'] },
    order: [['sequence', 'DESC']],
  });
  const names = await namesOf(records.map((record) => record.recordedBy));
  return { items: records.map((record) => present(record, names.get(record.recordedBy) ?? '')) };
}

/** The exact text that was hashed. */
export async function computationText(scope: CaseScope, hash: string): Promise<string> {
  const record = await ComputationRecord.findOne({ where: { caseId: scope.caseId, hash } });
  if (!record) throw notFound('This computation');
  return record.document;
}

/**
 * Computes a station from what is saved, in a worker thread, and keeps input and result under the
 * hash of their canonical text. Nothing that the browser computed is taken over. The same content
 * again is the same record: it keeps its first date and author.
 */
export async function recordStation(
  services: Services,
  scope: CaseScope,
  reconstructionId: string,
  { stationId, version }: { stationId: string; version: number },
): Promise<ComputationSummary> {
  const reconstruction = await reconstructionOf(scope, reconstructionId);
  if (reconstruction.version !== version) throw stale(await presentRecord(reconstruction));
  const document = documentOf(reconstruction);
  const station = document.stations.find((one) => one.id === stationId);
  if (!station) throw unprocessable('stationId', 'The saved reconstruction has no such station.');

  const answer = await compute({
    document,
    marks: await standingMarks(scope.caseId),
    stationId,
  });
  if (!answer.ok) throw unprocessable(answer.field, answer.message);

  const record = await keep(services, scope, {
    hash: answer.hash,
    kind: answer.kind,
    reconstructionId,
    reconstructionName: reconstruction.name,
    stationId,
    stationName: station.name,
    status: answer.status,
    document: answer.text,
  });
  await services.accessLog.record({
    actor: scope.account,
    action: 'recorded computation',
    caseId: scope.caseId,
    subject: record.hash,
    detail: `${reconstruction.name}, version ${version}, station ${stationId}: ${answer.status}`,
  });
  const names = await namesOf([record.recordedBy]);
  return present(record, names.get(record.recordedBy) ?? '');
}

type Content = Pick<
  ComputationRecord,
  | 'hash'
  | 'kind'
  | 'reconstructionId'
  | 'reconstructionName'
  | 'stationId'
  | 'stationName'
  | 'status'
  | 'document'
>;

/** Adds the record under the case's lock, so that two at once neither collide nor share a number. */
function keep(services: Services, scope: CaseScope, content: Content): Promise<ComputationRecord> {
  const { caseId } = scope;
  return services.sequelize.transaction(async (transaction) => {
    await CaseRecord.findByPk(caseId, { transaction, lock: transaction.LOCK.UPDATE });
    const known = await ComputationRecord.findOne({
      where: { caseId, hash: content.hash },
      transaction,
    });
    if (known) return known;
    const last = await ComputationRecord.max<number | null, ComputationRecord>('sequence', {
      where: { caseId },
      transaction,
    });
    return ComputationRecord.create(
      {
        ...content,
        caseId,
        sequence: (last ?? 0) + 1,
        recordedBy: scope.account.id,
        recordedAt: new Date(),
      },
      { transaction },
    );
  });
}

const present = (record: ComputationRecord, recordedBy: string): ComputationSummary => ({
  hash: record.hash,
  kind: record.kind,
  reconstructionId: record.reconstructionId,
  reconstructionName: record.reconstructionName,
  stationId: record.stationId,
  stationName: record.stationName,
  status: record.status,
  recordedAt: record.recordedAt.toISOString(),
  recordedBy,
});
