import { v7 as newId } from 'uuid';
import type { MotionSolution } from '#shared/engine/documents/motion-solution';
import { ComputationRecord } from '../database/models/computation';
import { ReconstructionRecord } from '../database/models/reconstruction';
import { canonicalText, sha256Hex } from '../ledger/canonical';

const bodies = [
  {
    id: 'arm',
    name: 'the arm',
    points: [{ id: 'tip', name: 'tip', at: [2, 0], sigma: [0, 0] }],
    outline: [],
  },
];
const at = new Date('2026-11-20T08:00:00.000Z');

/** An alternative with one body, and a computation of it whose result is given: no engine is needed. */
export async function recordTestComputation(
  caseId: string,
  accountId: string,
  motion: MotionSolution,
  sequence = 1,
): Promise<string> {
  const reconstruction = await ReconstructionRecord.create({
    id: newId(),
    caseId,
    name: `Alternative ${sequence}`,
    assumption: 'The wheel did not slip.',
    document: JSON.stringify({
      format: 'centrode.reconstruction/1',
      bodies,
      joints: [],
      stations: [],
    }),
    version: 1,
    changedBy: accountId,
    changedAt: at,
  });
  const document = canonicalText({
    format: 'centrode.computation/1',
    kind: 'station',
    engine: 'by hand',
    input: { bodies },
    options: { sequence },
    seed: null,
    result: { solution: motion },
  });
  await ComputationRecord.create({
    caseId,
    hash: sha256Hex(document),
    sequence,
    kind: 'station',
    reconstructionId: reconstruction.id,
    reconstructionName: reconstruction.name,
    stationId: 's1',
    stationName: 'first mark',
    status: motion.status,
    document,
    recordedBy: accountId,
    recordedAt: at,
  });
  return sha256Hex(document);
}
