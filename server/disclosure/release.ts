import type { Transaction } from 'sequelize';
import { v7 as newId } from 'uuid';
import type * as z from 'zod';
import type { Release, releaseCase } from '#shared/contracts/disclosure';
import { passwordMatches } from '../accounts/passwords';
import type { CaseScope } from '../cases/scope';
import { withLedger } from '../custody/ledger';
import { PartyRecord } from '../database/models/case';
import { ExhibitFileRecord, ExhibitRecord } from '../database/models/exhibit';
import { FindingsRecord } from '../database/models/findings';
import { ReleaseArchiveRecord, ReleaseRecord } from '../database/models/release';
import { conflict, invalid, unprocessable } from '../http/problems';
import { canonicalText, sha256Hex } from '../ledger/canonical';
import type { Services } from '../services';
import { presentRelease } from './presenter';
import { takeSnapshot, type ReleasedExhibit } from './snapshot';

type Entry = z.output<(typeof releaseCase)['body']>;
type Remember = (transaction: Transaction, answer: unknown) => Promise<void>;

/**
 * Releases the findings, the chosen exhibits and all computations of a case to one party: checks,
 * freezes, records in the ledger and signs. The archive is built afterwards, from what was frozen.
 */
export async function releaseToParty(
  services: Services,
  scope: CaseScope,
  entry: Entry,
  remember: Remember,
): Promise<Release> {
  await signAgain(services, scope, entry);
  const party = await partyOf(scope, entry);
  await checkFindings(scope);
  checkChoice(entry, await exhibitsOf(scope));
  const intact = await checkFiles(services, scope, entry);

  const release = await withLedger(services, scope, async (ledger) => {
    const { transaction } = ledger;
    // Asked again under the lock: what came in meanwhile is neither released nor withheld yet.
    const exhibits = await exhibitsOf(scope, transaction);
    checkChoice(entry, exhibits);
    const released = await filesOf(entry, exhibits, transaction);
    if (released.some(({ files }) => files.some((file) => !intact.has(file.sha256)))) {
      throw conflict('A file was taken in at this moment. Look at the exhibits and release again.');
    }
    const id = newId();
    const number = await nextNumber(scope, transaction);
    const releasedAt = new Date();
    const snapshot = canonicalText(
      await takeSnapshot(
        scope,
        {
          id,
          number,
          releasedAt,
          laboratory: services.config.laboratory,
          party,
          entry,
          exhibits: released,
        },
        transaction,
      ),
    );
    const snapshotHash = sha256Hex(snapshot);
    const { event } = await ledger.append({
      kind: 'released',
      exhibit: null,
      receivedBy: party.name,
      purpose: 'disclosure',
      note: `Release ${number} to ${party.name}; SHA-256 of what was released: ${snapshotHash}`,
    });
    const record = await ReleaseRecord.create(
      {
        id,
        caseId: scope.caseId,
        number,
        partyId: party.id,
        releasedAt,
        releasedBy: scope.account.id,
        snapshot,
        snapshotHash,
        ledgerSequence: event.sequence,
      },
      { transaction },
    );
    const archive = await ReleaseArchiveRecord.create(
      { releaseId: id, state: 'building', size: null, sha256: null, message: '' },
      { transaction },
    );
    const presented = presentRelease(record, {
      releasedBy: scope.account.name,
      archive,
      openings: [],
    });
    await remember(transaction, presented);
    return presented;
  });
  await services.accessLog.record({
    actor: scope.account,
    action: 'released case',
    caseId: scope.caseId,
    subject: `release ${release.number}`,
    detail: `to ${party.name}`,
  });
  services.archives.build(release.id);
  return release;
}

/** A release is signed with the password, also by whom is signed in. */
async function signAgain(services: Services, scope: CaseScope, entry: Entry): Promise<void> {
  if (await passwordMatches(scope.account.passwordHash, entry.password)) return;
  await services.accessLog.record({
    actor: scope.account,
    action: 'refused',
    caseId: scope.caseId,
    subject: 'release: the password was not right',
  });
  throw unprocessable('password', 'This is not your password. Nothing was released.');
}

async function partyOf(scope: CaseScope, { partyId }: Entry): Promise<PartyRecord> {
  const party = await PartyRecord.findOne({ where: { id: partyId, caseId: scope.caseId } });
  if (!party) throw unprocessable('partyId', 'This is not a party of the case.');
  return party;
}

async function checkFindings(scope: CaseScope): Promise<void> {
  if ((await FindingsRecord.count({ where: { caseId: scope.caseId } })) === 0) {
    throw unprocessable('findings', 'There are no findings yet: save them before a release.');
  }
}

const exhibitsOf = (scope: CaseScope, transaction?: Transaction): Promise<ExhibitRecord[]> =>
  ExhibitRecord.findAll({
    where: { caseId: scope.caseId },
    order: [['ordinal', 'ASC']],
    transaction,
  });

/** Every exhibit of the case is named once: released, or withheld with a reason. */
function checkChoice(entry: Entry, exhibits: readonly ExhibitRecord[]): void {
  const numbers = new Set(exhibits.map(({ number }) => number));
  const errors: { field: string; message: string }[] = [];
  const named = new Set<string>();
  const name = (field: string, number: string): void => {
    if (!numbers.has(number)) errors.push({ field, message: `There is no exhibit ${number}.` });
    else if (named.has(number)) errors.push({ field, message: `${number} is named twice.` });
    named.add(number);
  };
  entry.exhibits.forEach((number, i) => name(`exhibits.${i}`, number));
  entry.withheld.forEach(({ exhibit, reason, explanation }, i) => {
    name(`withheld.${i}.exhibit`, exhibit);
    if (reason === 'other' && explanation.trim() === '') {
      errors.push({
        field: `withheld.${i}.explanation`,
        message: `Say why ${exhibit} is withheld.`,
      });
    }
  });
  const missing = [...numbers].filter((number) => !named.has(number));
  if (missing.length > 0) {
    errors.push({
      field: 'exhibits',
      message: `Neither released nor withheld with a reason: ${missing.join(', ')}.`,
    });
  }
  if (errors.length > 0) throw invalid(errors);
}

async function filesOf(
  entry: Entry,
  exhibits: readonly ExhibitRecord[],
  transaction?: Transaction,
): Promise<ReleasedExhibit[]> {
  const chosen = exhibits.filter(({ number }) => entry.exhibits.includes(number));
  const files = await ExhibitFileRecord.findAll({
    where: { exhibitId: chosen.map(({ id }) => id) },
    order: [['id', 'ASC']],
    transaction,
  });
  return chosen.map((record) => ({
    record,
    files: files.filter((file) => file.exhibitId === record.id),
  }));
}

/** Hashes every file that would be released again; one that is not what was taken in blocks it. */
async function checkFiles(
  services: Services,
  scope: CaseScope,
  entry: Entry,
): Promise<ReadonlySet<string>> {
  const intact = new Set<string>();
  const spoilt = new Set<string>();
  for (const { record, files } of await filesOf(entry, await exhibitsOf(scope))) {
    for (const { name, size, sha256, sha512 } of files) {
      const found = await services.store.measure(sha256);
      const same =
        found?.sha256 === sha256 && found.sha512 === sha512 && found.size === Number(size);
      if (same) intact.add(sha256);
      else spoilt.add(`${record.number} (${name}: ${found ? 'changed' : 'missing'})`);
    }
  }
  if (spoilt.size === 0) return intact;
  const which = [...spoilt].join(', ');
  await services.accessLog.record({
    actor: scope.account,
    action: 'refused',
    caseId: scope.caseId,
    subject: 'release: stored files are not what was taken in',
    detail: which,
  });
  throw conflict(`Stored files are not what was taken in: ${which}. Nothing was released.`);
}

async function nextNumber(scope: CaseScope, transaction: Transaction): Promise<number> {
  const last = await ReleaseRecord.max<number | null, ReleaseRecord>('number', {
    where: { caseId: scope.caseId },
    transaction,
  });
  return (last ?? 0) + 1;
}
