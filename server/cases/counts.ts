import { QueryTypes } from 'sequelize';
import { CaseRecord } from '../database/models/case';

/** How much each section of a case holds, for its navigation. */
export async function caseCounts(caseId: string) {
  const sequelize = CaseRecord.sequelize;
  if (!sequelize) throw new Error('Models are not tied to a connection');
  const [counts] = await sequelize.query<Record<string, number>>(
    `SELECT (SELECT COUNT(*) FROM marks WHERE case_id = :caseId AND removed_at IS NULL) AS marks,
            (SELECT COUNT(*) FROM computations WHERE case_id = :caseId) AS computations,
            (SELECT COUNT(*) FROM exhibits WHERE case_id = :caseId) AS exhibits,
            (SELECT COUNT(*) FROM releases WHERE case_id = :caseId) AS releases`,
    { type: QueryTypes.SELECT, replacements: { caseId } },
  );
  return {
    exhibits: Number(counts['exhibits']),
    marks: Number(counts['marks']),
    computations: Number(counts['computations']),
    releases: Number(counts['releases']),
  };
}
