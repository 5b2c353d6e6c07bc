import * as z from 'zod';
import { releasedSummary, withheldItem, type Release } from '#shared/contracts/disclosure';
import { namesOf } from '../cases/case-file';
import {
  ReleaseArchiveRecord,
  ReleaseOpeningRecord,
  ReleaseWithdrawalRecord,
  type ReleaseRecord,
} from '../database/models/release';

/** What is read of a frozen snapshot here; marks and files of exhibits stay unread. */
const outline = z.object({
  summary: releasedSummary,
  exhibits: z.array(z.object({ number: z.string() })),
  withheld: z.array(withheldItem),
  computations: z.array(z.object({ hash: z.string() })),
});

export const outlineOf = (release: ReleaseRecord): z.output<typeof outline> =>
  outline.parse(JSON.parse(release.snapshot));

/** Releases as the laboratory sees them, with who opened them. */
export async function presentReleases(releases: readonly ReleaseRecord[]): Promise<Release[]> {
  const where = { releaseId: releases.map((release) => release.id) };
  const [archives, withdrawals, openings] = await Promise.all([
    ReleaseArchiveRecord.findAll({ where }),
    ReleaseWithdrawalRecord.findAll({ where }),
    ReleaseOpeningRecord.findAll({ where, order: [['id', 'ASC']] }),
  ]);
  const names = await namesOf([
    ...releases.map((release) => release.releasedBy),
    ...openings.map((opening) => opening.accountId),
  ]);
  return releases.map((release) =>
    presentRelease(release, {
      releasedBy: names.get(release.releasedBy) ?? '',
      archive: archives.find((archive) => archive.releaseId === release.id),
      withdrawal: withdrawals.find((withdrawal) => withdrawal.releaseId === release.id),
      openings: openings
        .filter((opening) => opening.releaseId === release.id)
        .map(({ openedAt, accountId, what }) => ({
          at: openedAt.toISOString(),
          by: names.get(accountId) ?? '',
          what,
        })),
    }),
  );
}

interface Around {
  readonly releasedBy: string;
  readonly archive?: ReleaseArchiveRecord;
  readonly withdrawal?: ReleaseWithdrawalRecord;
  readonly openings: Release['openings'];
}

export function presentRelease(release: ReleaseRecord, around: Around): Release {
  const { summary, exhibits, withheld, computations } = outlineOf(release);
  const { archive, withdrawal } = around;
  return {
    id: release.id,
    number: release.number,
    partyId: release.partyId,
    party: summary.party,
    releasedAt: release.releasedAt.toISOString(),
    releasedBy: around.releasedBy,
    exhibits: exhibits.map(({ number }) => number),
    withheld,
    computations: computations.map(({ hash }) => hash),
    archive: {
      state: archive?.state ?? 'building',
      size: archive?.size ?? null,
      sha256: archive?.sha256 ?? null,
      message: archive?.message ?? '',
    },
    withdrawnAt: withdrawal?.withdrawnAt.toISOString() ?? null,
    openings: around.openings,
  };
}
