import type { Request } from 'express';
import { v7 as newId } from 'uuid';
import type * as z from 'zod';
import type { DisclosureItem, readDisclosure } from '#shared/contracts/disclosure';
import type { PartyScope } from '../cases/scope';
import {
  ReleaseArchiveRecord,
  ReleaseOpeningRecord,
  ReleaseRecord,
  ReleaseWithdrawalRecord,
} from '../database/models/release';
import { notFound } from '../http/problems';
import type { Services } from '../services';
import { outlineOf } from './presenter';

/** Releases to the attorney's parties that were not withdrawn, the newest first. */
export async function listOwnDisclosures(party: PartyScope): Promise<{ items: DisclosureItem[] }> {
  const releases = await ReleaseRecord.findAll({
    where: { partyId: [...party.partyIds] },
    order: [['id', 'DESC']],
  });
  const withdrawn = await ReleaseWithdrawalRecord.findAll({
    where: { releaseId: releases.map((release) => release.id) },
  });
  const gone = new Set(withdrawn.map((withdrawal) => withdrawal.releaseId));
  return {
    items: releases
      .filter((release) => !gone.has(release.id))
      .map((release) => {
        const { summary } = outlineOf(release);
        return {
          releaseId: release.id,
          releaseNumber: release.number,
          caseNumber: summary.caseNumber,
          title: summary.title,
          party: summary.party,
          releasedAt: summary.releasedAt,
        };
      }),
  };
}

/** The frozen summary. That it was opened is on record before it is shown. */
export async function openSummary(
  services: Services,
  party: PartyScope,
  releaseId: string,
): Promise<z.input<(typeof readDisclosure)['response']>> {
  const release = await ownRelease(party, releaseId);
  await recordOpening(services, party, release, 'summary');
  const archive = await ReleaseArchiveRecord.findByPk(release.id);
  const ready = archive?.state === 'ready';
  return {
    summary: outlineOf(release).summary,
    archive: {
      ready,
      size: ready ? archive.size : null,
      sha256: ready ? archive.sha256 : null,
    },
  };
}

/**
 * The release whose archive is downloaded. A download that is resumed in the middle is the same
 * opening; it stands in the access log alone.
 */
export async function openArchive(
  services: Services,
  party: PartyScope,
  releaseId: string,
  request: Request,
): Promise<ReleaseRecord> {
  const release = await ownRelease(party, releaseId);
  const range = request.get('Range') ?? '';
  const resumed = /^bytes=[1-9]\d*-/.test(range);
  if (!resumed) await recordOpening(services, party, release, 'archive');
  else await logOpening(services, party, release, 'resumed download of archive', range);
  return release;
}

/** A party sees its own releases and no other: what is withdrawn or another's does not exist. */
async function ownRelease(party: PartyScope, releaseId: string): Promise<ReleaseRecord> {
  const release = await ReleaseRecord.findOne({
    where: { id: releaseId, partyId: [...party.partyIds] },
  });
  if (!release || (await ReleaseWithdrawalRecord.findByPk(releaseId))) {
    throw notFound('This release');
  }
  return release;
}

async function recordOpening(
  services: Services,
  party: PartyScope,
  release: ReleaseRecord,
  what: 'summary' | 'archive',
): Promise<void> {
  await ReleaseOpeningRecord.create({
    id: newId(),
    releaseId: release.id,
    accountId: party.account.id,
    openedAt: new Date(),
    what,
  });
  await logOpening(services, party, release, `opened released ${what}`, '');
}

const logOpening = (
  services: Services,
  party: PartyScope,
  release: ReleaseRecord,
  action: string,
  detail: string,
): Promise<void> =>
  services.accessLog.record({
    actor: party.account,
    action,
    caseId: release.caseId,
    subject: `release ${release.number}`,
    detail,
  });
