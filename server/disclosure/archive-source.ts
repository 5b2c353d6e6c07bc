import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { Op } from 'sequelize';
import type { ArchiveLedgerLine, ArchiveSource } from '../archive/archive-source';
import { releaseSnapshot } from '../archive/snapshot';
import { CaseRecord } from '../database/models/case';
import { ComputationRecord } from '../database/models/computation';
import { CustodyEventRecord, CustodyHeadRecord } from '../database/models/custody';
import { ReleaseRecord } from '../database/models/release';
import { canonicalText, sha256Hex } from '../ledger/canonical';
import { readPublicKeys } from '../ledger/signing-key';
import type { Services } from '../services';
import { archiveSchemas } from './schemas';

/**
 * Everything that the archive of a release is made of: the frozen snapshot, and by its word the
 * ledger up to the event that released it, the computations by hash and the stored files by hash.
 */
export async function loadArchiveSource(
  services: Omit<Services, 'archives'>,
  releaseId: string,
): Promise<ArchiveSource> {
  const release = await ReleaseRecord.findByPk(releaseId, { rejectOnEmpty: true });
  if (sha256Hex(release.snapshot) !== release.snapshotHash) {
    throw new RangeError('The snapshot of the release was changed since it was released.');
  }
  const snapshot = releaseSnapshot.parse(JSON.parse(release.snapshot));
  const { caseId, ledgerSequence } = release;
  const upTo = { caseId, sequence: { [Op.lte]: ledgerSequence } };
  const [{ number: caseNumber }, events, heads, computations] = await Promise.all([
    CaseRecord.findByPk(caseId, { rejectOnEmpty: true }),
    CustodyEventRecord.findAll({ where: upTo, order: [['sequence', 'ASC']], raw: true }),
    CustodyHeadRecord.findAll({ where: upTo, order: [['sequence', 'ASC']], raw: true }),
    ComputationRecord.findAll({
      where: { caseId, hash: snapshot.computations.map(({ hash }) => hash) },
      attributes: ['hash', 'document'],
      raw: true,
    }),
  ]);
  const shown = new Set(snapshot.exhibits.map(({ number }) => number));
  return {
    snapshot,
    snapshotText: release.snapshot,
    openFile: (sha256) => services.store.read(sha256),
    ledger: events.map(({ sequence, exhibit, hash, canonical }): ArchiveLedgerLine =>
      exhibit === null || shown.has(exhibit)
        ? { hash, text: canonical }
        : { hash, sequence, withheldExhibit: exhibit },
    ),
    heads: heads.map(({ sequence, hash, signedAt, keyId, signature }) =>
      canonicalText({
        format: 'centrode.ledger-head/1',
        caseNumber,
        sequence,
        hash,
        signedAt,
        keyId,
        signature,
      }),
    ),
    publicKeys: readPublicKeys(join(services.config.dataDir, 'keys')),
    computations: computations.map(({ hash, document }) => ({ hash, text: document })),
    schemas: archiveSchemas(),
    tools: {
      verify: await tool(services, 'verify'),
      recompute: await tool(services, 'recompute'),
    },
  };
}

async function tool(services: Omit<Services, 'archives'>, name: string): Promise<string> {
  try {
    return await readFile(join(services.config.toolsDir, `${name}.mjs`), 'utf8');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
    throw new RangeError(`The archive's tool ${name}.mjs is not built: run npm run build.`);
  }
}
