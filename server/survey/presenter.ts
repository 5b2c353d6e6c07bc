import * as z from 'zod';
import {
  markChange,
  markSource,
  rejectedRow,
  type Mark,
  type MarkChange,
  type SurveyImport,
} from '#shared/contracts/survey';
import type { MarkHistoryRecord, MarkRecord, SurveyImportRecord } from '../database/models/mark';

export const presentMark = (record: MarkRecord): Mark => ({
  id: record.id,
  label: record.label,
  kind: record.kind,
  at: [record.x, record.y],
  covariance: [
    [record.varX, record.covXy],
    [record.covXy, record.varY],
  ],
  height: record.height,
  trace: record.trace,
  order: record.place,
  note: record.note,
  source: markSource.parse(JSON.parse(record.source)),
  version: record.version,
});

const rejectedRows = z.array(rejectedRow);

export const presentImport = (record: SurveyImportRecord, by: string): SurveyImport => ({
  id: record.id,
  exhibitNumber: record.exhibitNumber,
  fileName: record.fileName,
  importedAt: record.importedAt.toISOString(),
  by,
  accepted: record.accepted,
  rejected: rejectedRows.parse(JSON.parse(record.rejected)),
});

export const presentChange = (
  record: MarkHistoryRecord,
  by: string,
  withdrawn: boolean,
): MarkChange => ({
  markId: record.markId,
  version: record.version,
  withdrawn,
  before: markChange.shape.before.parse(JSON.parse(record.beforeChange)),
  reason: record.reason,
  by,
  at: record.changedAt.toISOString(),
});
