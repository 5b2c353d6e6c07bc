import { Op, type Transaction } from 'sequelize';
import type { releaseCase } from '#shared/contracts/disclosure';
import type { Mark } from '#shared/contracts/survey';
import type * as z from 'zod';
import type { ReleaseSnapshot, SnapshotComputation, SnapshotExhibit } from '../archive/snapshot';
import { namesOf } from '../cases/case-file';
import type { CaseScope } from '../cases/scope';
import type { PartyRecord } from '../database/models/case';
import { ComputationRecord } from '../database/models/computation';
import type { ExhibitFileRecord, ExhibitRecord } from '../database/models/exhibit';
import { MarkRecord } from '../database/models/mark';
import { ReconstructionRecord } from '../database/models/reconstruction';
import { findingsOf } from '../findings/use-cases';
import { presentMark } from '../survey/presenter';

export interface SnapshotInput {
  readonly id: string;
  readonly number: number;
  readonly releasedAt: Date;
  readonly laboratory: string;
  readonly party: PartyRecord;
  readonly entry: z.output<(typeof releaseCase)['body']>;
  /** The released exhibits with their files, in order of number. */
  readonly exhibits: readonly ReleasedExhibit[];
}

export interface ReleasedExhibit {
  readonly record: ExhibitRecord;
  readonly files: readonly ExhibitFileRecord[];
}

const caution =
  'These results depend on the measurements and assumptions listed with them. They are for use by a ' +
  'qualified person who answers for them, and do not replace local law, codes or licensed practice.';

/** Everything that the party may see, read in one transaction and from then on frozen. */
export async function takeSnapshot(
  scope: CaseScope,
  input: SnapshotInput,
  transaction: Transaction,
): Promise<ReleaseSnapshot> {
  const { record } = scope;
  await record.reload({ transaction });
  const findings = await findingsOf(scope, transaction);
  const exhibits = input.exhibits.map(snapshotExhibit);
  return {
    format: 'centrode.release/1',
    summary: {
      releaseId: input.id,
      releaseNumber: input.number,
      caseNumber: record.number,
      title: record.title,
      party: input.party.name,
      laboratory: input.laboratory,
      releasedAt: input.releasedAt.toISOString(),
      speedUnit: record.speedUnit,
      questions: findings.answers.map(({ questionNumber, question, text }) => ({
        number: questionNumber,
        question,
        answer: text,
      })),
      figures: findings.figures,
      dependsOn: findings.dependsOn,
      against: findings.against,
      exhibits: exhibits.map(({ number, kind, description }) => ({ number, kind, description })),
      withheld: input.entry.withheld,
      caution,
    },
    exhibits,
    withheld: input.entry.withheld,
    marks: await marksOf(scope.caseId, input.entry, transaction),
    computations: await computationsOf(scope.caseId, transaction),
    xAxisBearing: record.xAxisBearing,
  };
}

function snapshotExhibit({ record, files }: ReleasedExhibit): SnapshotExhibit {
  return {
    number: record.number,
    kind: record.kind,
    description: record.description,
    source: record.source,
    collectedBy: record.collectedBy,
    collectedAt: record.collectedAt?.toISOString() ?? null,
    collectedPlace: record.collectedPlace,
    condition: record.conditionOnReceipt,
    packaging: record.packaging,
    sealNumber: record.sealOnReceipt,
    sensitive: Boolean(record.sensitive),
    files: files.map(({ name, mediaType, size, sha256, sha512 }) => ({
      name,
      mediaType,
      size: Number(size),
      sha256,
      sha512,
    })),
  };
}

/** The marks that stand. Of a survey file that is withheld the rows are told, but not word for word. */
async function marksOf(
  caseId: string,
  { withheld }: SnapshotInput['entry'],
  transaction: Transaction,
): Promise<Mark[]> {
  const kept = new Set(withheld.map(({ exhibit }) => exhibit));
  const records = await MarkRecord.findAll({
    where: { caseId, removedAt: { [Op.is]: null } },
    order: [['id', 'ASC']],
    raw: true,
    transaction,
  });
  return records.map((record) => {
    const mark = presentMark(record);
    return mark.source.kind === 'import' && kept.has(mark.source.exhibitNumber)
      ? { ...mark, source: { ...mark.source, fileName: 'withheld', raw: 'withheld' } }
      : mark;
  });
}

/** All of them, also those that no figure rests on: an alternative that was computed is disclosed. */
async function computationsOf(
  caseId: string,
  transaction: Transaction,
): Promise<SnapshotComputation[]> {
  const [records, reconstructions] = await Promise.all([
    ComputationRecord.findAll({
      where: { caseId },
      attributes: { exclude: ['document'] },
      order: [['sequence', 'ASC']],
      transaction,
    }),
    ReconstructionRecord.findAll({
      where: { caseId },
      attributes: ['id', 'assumption'],
      transaction,
    }),
  ]);
  const names = await namesOf(records.map((record) => record.recordedBy));
  const assumptions = new Map(reconstructions.map(({ id, assumption }) => [id, assumption]));
  return records.map((record) => ({
    hash: record.hash,
    kind: record.kind,
    reconstruction: record.reconstructionName,
    assumption: assumptions.get(record.reconstructionId) ?? '',
    station: record.stationName,
    status: record.status,
    recordedAt: record.recordedAt.toISOString(),
    recordedBy: names.get(record.recordedBy) ?? '',
  }));
}
