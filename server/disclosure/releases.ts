import { UniqueConstraintError } from 'sequelize';
import type { Release } from '#shared/contracts/disclosure';
import type { CaseScope } from '../cases/scope';
import { ReleaseRecord, ReleaseWithdrawalRecord } from '../database/models/release';
import { conflict, notFound } from '../http/problems';
import type { Services } from '../services';
import { presentReleases } from './presenter';

/** What was released of the case, the oldest first. */
export async function releasesOf(scope: CaseScope): Promise<{ items: Release[] }> {
  const releases = await ReleaseRecord.findAll({
    where: { caseId: scope.caseId },
    order: [['number', 'ASC']],
  });
  return { items: await presentReleases(releases) };
}

/** @throws 404 for one of another case */
export async function releaseOf(scope: CaseScope, id: string): Promise<ReleaseRecord> {
  const release = await ReleaseRecord.findOne({ where: { id, caseId: scope.caseId } });
  if (!release) throw notFound('This release');
  return release;
}

/** From now on the party finds nothing there; the release and its archive stay on record here. */
export async function withdraw(
  services: Services,
  scope: CaseScope,
  id: string,
  reason: string,
): Promise<Release> {
  const release = await releaseOf(scope, id);
  try {
    await ReleaseWithdrawalRecord.create({
      releaseId: id,
      withdrawnAt: new Date(),
      withdrawnBy: scope.account.id,
      reason,
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw conflict('This release was withdrawn before.');
    }
    throw error;
  }
  await services.accessLog.record({
    actor: scope.account,
    action: 'withdrew release',
    caseId: scope.caseId,
    subject: `release ${release.number}`,
    detail: reason,
  });
  const [presented] = await presentReleases([release]);
  return presented;
}
