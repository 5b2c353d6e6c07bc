import { chmodSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { execFileSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import { QueryTypes, type Sequelize } from 'sequelize';
import type { LedgerEntry, LedgerReport } from '#shared/contracts/custody';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import { connect, run } from '../database/connection';
import { registerTestExhibit, takeInTestFile, testPicture } from '../exhibits/testing';
import { canonicalText, sha256Hex } from '../ledger/canonical';
import { seeded } from '../ledger/testing';
import { startTestApi, testPassword, type TestApi } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';
import { verifyCase } from './verify-case';

/*
 * The one who tampers here owns the database: triggers and rights are no hindrance to them. What they
 * do is undone after each check, so that the next one starts from the same ledger.
 */
let api: TestApi;
let open: TestCase;
let owner: Sequelize;
let exhibit: Exhibit;
let file: ExhibitFile;
let content: Buffer;
const appendOnly = ['custody_events', 'custody_heads', 'exhibit_files'];

beforeAll(async () => {
  api = await startTestApi();
  open = await openTestCase(api);
  owner = connect(api.services.config.databaseOwnerUrl);
  const colleague = await api.as('investigator', 'A. Colleague');
  await assignTo(open.lead, open.id, colleague, 'investigator');
  exhibit = await registerTestExhibit(open.investigator, open.id, { collectedBy: 'R. Ostler' });
  content = await testPicture(1);
  file = await takeInTestFile(open.investigator, open.id, exhibit.id, content, 'a.jpg');
  const path = `/api/cases/${open.id}/exhibits/${exhibit.id}`;
  await open.investigator.post(`${path}/custody`, { kind: 'stored', location: 'cage' }).expect(201);
  const offer = { toId: colleague.id, purpose: 'measuring' };
  const offered = await open.investigator.post(`${path}/hand-over`, offer).expect(201);
  const { sequence } = (offered.body as LedgerEntry).event;
  const answer = { sequence, answer: 'accepted', password: testPassword };
  await colleague.post(`${path}/answer`, answer).expect(201);
  await takeInTestFile(open.investigator, open.id, exhibit.id, Buffer.from('x,y\n1,2\n'), 'b.csv');
  for (const table of appendOnly) {
    for (const verb of ['update', 'delete']) {
      await run(owner, `DROP TRIGGER ${table}_refuse_${verb}`);
    }
  }
});
afterAll(async () => {
  await owner.close();
  await api.stop();
});

const verify = (): Promise<LedgerReport> =>
  verifyCase(api.services, { caseId: open.id, caseNumber: open.file.number });

const found = async (): Promise<string[]> =>
  (await verify()).findings.map(({ code, sequence }) => `${code} ${sequence}`);

const sql = (text: string, values: unknown[] = []) =>
  owner.query(text, { type: QueryTypes.RAW, replacements: values });

type Row = Record<string, unknown>;
const rowsOf = (table: string): Promise<Row[]> =>
  owner.query<Row>(`SELECT * FROM ${table} WHERE case_id = ?`, {
    type: QueryTypes.SELECT,
    replacements: [open.id],
  });

/** Runs what a tamperer does and puts every row back afterwards. */
async function tampered<T>(tamper: () => Promise<unknown>, look: () => Promise<T>): Promise<T> {
  const tables = [...appendOnly, 'custody_chains'];
  const before = await Promise.all(tables.map(rowsOf));
  const exhibits = await rowsOf('exhibits');
  const once = { type: QueryTypes.RAW } as const;
  try {
    await owner.transaction(async (transaction) => {
      await owner.query('SET FOREIGN_KEY_CHECKS = 0', { ...once, transaction });
      await tamper();
    });
    return await look();
  } finally {
    await owner.transaction(async (transaction) => {
      await owner.query('SET FOREIGN_KEY_CHECKS = 0', { ...once, transaction });
      for (const [i, table] of tables.entries()) {
        await owner.query(`DELETE FROM ${table} WHERE case_id = ?`, {
          ...once,
          transaction,
          replacements: [open.id],
        });
        for (const row of before[i]) {
          const names = Object.keys(row);
          await owner.query(
            `INSERT INTO ${table} (${names.join(', ')}) VALUES (${names.map(() => '?').join(', ')})`,
            { ...once, transaction, replacements: Object.values(row) },
          );
        }
      }
      for (const row of exhibits) {
        await owner.query(
          'UPDATE exhibits SET location = ?, holder_id = ?, seal = ? WHERE id = ?',
          {
            ...once,
            transaction,
            replacements: [row['location'], row['holder_id'], row['seal'], row['id']],
          },
        );
      }
      await owner.query('SET FOREIGN_KEY_CHECKS = 1', { ...once, transaction });
    });
  }
}

const free = (text: string, values: unknown[] = []) =>
  owner.transaction(async (transaction) => {
    const how = { type: QueryTypes.RAW, transaction } as const;
    await owner.query('SET FOREIGN_KEY_CHECKS = 0', how);
    await owner.query(text, { ...how, replacements: values });
    await owner.query('SET FOREIGN_KEY_CHECKS = 1', how);
  });

/** The text of an event with something changed, as a careful forger writes it. */
async function forged(sequence: number, change: Row): Promise<{ text: string; hash: string }> {
  const [row] = (await rowsOf('custody_events')).filter((each) => each['sequence'] === sequence);
  const text = canonicalText({ ...(JSON.parse(String(row['canonical'])) as Row), ...change });
  return { text, hash: sha256Hex(text) };
}

describe('verifying a case', () => {
  it('finds nothing in what was written', async () => {
    expect(await verify()).toMatchObject({ events: 7, files: 2, findings: [] });
  });

  it('names each event whose text was changed (every event, seeded changes)', async () => {
    const random = seeded(26);
    const changes: Row[] = [{ note: 'x' }, { receivedBy: 'x' }, { condition: 'x' }, { zone: 'x' }];
    for (let sequence = 1; sequence <= 7; sequence++) {
      const change = changes[Math.floor(random() * changes.length)];
      const { text, hash } = await forged(sequence, change);
      const where = 'WHERE case_id = ? AND sequence = ?';
      const names = await tampered(
        () =>
          sql(`UPDATE custody_events SET canonical = ?, hash = ? ${where}`, [
            text,
            hash,
            open.id,
            sequence,
          ]),
        found,
      );
      expect(names).toEqual(
        expect.arrayContaining([`changed ${sequence}`, `head-mismatch ${sequence}`]),
      );
      expect(names.filter((name) => name.startsWith('changed'))).toHaveLength(1);
    }
  });

  it('names each event whose row was removed (every event)', async () => {
    for (let sequence = 1; sequence <= 7; sequence++) {
      const remove = 'DELETE FROM custody_events WHERE case_id = ? AND sequence = ?';
      const names = await tampered(() => free(remove, [open.id, sequence]), found);
      expect(names).toEqual(expect.arrayContaining([`missing ${sequence}`]));
      expect(names.filter((name) => name.startsWith('missing'))).toHaveLength(1);
    }
  });

  it('misses the end of the ledger even when its heads and the chain were cut as well', async () => {
    const names = await tampered(async () => {
      await free('DELETE FROM custody_heads WHERE case_id = ? AND sequence > 4', [open.id]);
      await free('DELETE FROM exhibit_files WHERE case_id = ? AND event_sequence > 4', [open.id]);
      await free('DELETE FROM custody_events WHERE case_id = ? AND sequence > 4', [open.id]);
      const [{ hash }] = (await rowsOf('custody_events')).filter((row) => row['sequence'] === 4);
      await sql('UPDATE custody_chains SET sequence = 4, hash = ? WHERE case_id = ?', [
        hash,
        open.id,
      ]);
      await sql('UPDATE exhibits SET holder_id = ?, location = ? WHERE id = ?', [
        open.investigator.id,
        'cage',
        exhibit.id,
      ]);
    }, found);
    expect(names).toEqual(['missing 5', 'missing 6', 'missing 7', 'head-mismatch 7']);
  });

  it.each([
    ['kind', "UPDATE custody_events SET kind = 'sealed' WHERE case_id = ? AND sequence = 4"],
    ['exhibit', 'UPDATE custody_events SET exhibit = NULL WHERE case_id = ? AND sequence = 4'],
    [
      'time',
      "UPDATE custody_events SET recorded_at = '2026-01-01T00:00:00.000000Z' WHERE case_id = ? AND sequence = 4",
    ],
  ])('names the event whose column for its %s was changed', async (_name, change) => {
    expect(await tampered(() => sql(change, [open.id]), found)).toEqual(['columns-differ 4']);
  });

  it('names the exhibit whose register was changed', async () => {
    const change = "UPDATE exhibits SET location = 'elsewhere' WHERE case_id = ?";
    const report = await tampered(() => sql(change, [open.id]), verify);
    expect(report.findings).toEqual([
      {
        code: 'columns-differ',
        sequence: 7,
        message: `The register of ${exhibit.number} differs from the ledger in: location.`,
      },
    ]);
  });

  it('names the file whose row was changed or removed, and the head that was altered', async () => {
    const change =
      "UPDATE exhibit_files SET name = 'z.jpg' WHERE case_id = ? AND event_sequence = 3";
    expect(await tampered(() => sql(change, [open.id]), found)).toEqual([
      'columns-differ 3',
      'columns-differ 3',
    ]);
    const remove = 'DELETE FROM exhibit_files WHERE case_id = ? AND event_sequence = 7';
    expect(await tampered(() => free(remove, [open.id]), found)).toEqual(['columns-differ 7']);
    const head =
      'UPDATE custody_heads SET signature = REVERSE(signature) WHERE case_id = ? AND sequence = 2';
    expect(await tampered(() => sql(head, [open.id]), found)).toEqual(['bad-signature 2']);
  });

  it('names the stored file that was changed (seeded bytes) or removed', async () => {
    const stored = api.services.store.pathOf(file.sha256);
    chmodSync(stored, 0o600);
    const random = seeded(8);
    for (let i = 0; i < 20; i++) {
      const bytes = Buffer.from(content);
      bytes[Math.floor(random() * bytes.length)] ^= 1 << Math.floor(random() * 8);
      writeFileSync(stored, bytes);
      expect(await found()).toEqual(['file-changed 3']);
    }
    rmSync(stored);
    expect(await found()).toEqual(['file-missing 3']);
    writeFileSync(stored, content, { mode: 0o444 });
    expect(await found()).toEqual([]);
  });

  it('when the end was cut off, then nothing can be added on top of it', async () => {
    const cut = 'DELETE FROM custody_events WHERE case_id = ? AND sequence = 7';
    const send = () =>
      open.investigator.post(`/api/cases/${open.id}/exhibits`, {
        kind: 'sample',
        description: 'Paint',
      });
    const answer = await tampered(() => free(cut, [open.id]), send);
    expect(answer.status).toBe(503);
    expect(answer.body.title).toBe('The custody ledger does not agree with itself');
  });

  it('agrees with sha256sum and sha512sum, none of our code taking part', () => {
    const stored = api.services.store.pathOf(file.sha256);
    const sum = (program: string): string =>
      execFileSync(program, [stored]).toString().split(' ')[0];
    expect(sum('sha256sum')).toBe(file.sha256);
    expect(sum('sha512sum')).toBe(file.sha512);
    expect(Buffer.compare(readFileSync(stored), content)).toBe(0);
  });

  it('when it is asked for, then the check is an event, and what it found an alarm', async () => {
    const path = `/api/cases/${open.id}/custody/verification`;
    const clean = await open.lead.post(path).expect(200);
    expect(clean.body).toMatchObject({ events: 7, findings: [] });
    const ledger = await open.lead.get(`/api/cases/${open.id}/custody`).expect(200);
    expect((ledger.body.entries as LedgerEntry[]).at(-1)?.event).toMatchObject({
      kind: 'integrity checked',
      exhibit: null,
      note: '7 events and 2 files checked: nothing differs',
    });
    const stored = api.services.store.pathOf(file.sha256);
    rmSync(stored);
    const alarm = await open.lead.post(path).expect(200);
    expect(alarm.body.findings).toHaveLength(1);
    writeFileSync(stored, content, { mode: 0o444 });
    const log = await open.lead.get(`/api/cases/${open.id}/events`).expect(200);
    expect(log.body.items[0]).toMatchObject({ action: 'integrity alarm' });
    await (await api.as('investigator')).post(path).expect(404);
    await (await api.nobody().signIn()).post(path).expect(401);
  });
});
