import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import { v7 as newId } from 'uuid';
import type { LedgerEntry, LedgerEvent } from '#shared/contracts/custody';
import type { CustodyState, Exhibit } from '#shared/contracts/exhibits';
import { registerTestExhibit } from '../exhibits/testing';
import { startTestApi, testPassword, type TestApi, type TestPerson } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

let api: TestApi;
let open: TestCase;
let colleague: TestPerson;
let custodian: TestPerson;
let reviewer: TestPerson;
beforeAll(async () => {
  api = await startTestApi();
  open = await openTestCase(api);
  [colleague, custodian, reviewer] = await Promise.all([
    api.as('investigator', 'A. Colleague'),
    api.as('investigator', 'B. Custodian'),
    api.as('investigator', 'C. Reviewer'),
  ]);
  await assignTo(open.lead, open.id, colleague, 'investigator');
  await assignTo(open.lead, open.id, custodian, 'evidence-custodian');
  await assignTo(open.lead, open.id, reviewer, 'technical-reviewer');
});
afterAll(() => api.stop());

const at = (exhibit: Exhibit, act: string): string =>
  `/api/cases/${open.id}/exhibits/${exhibit.id}/${act}`;

const offer = (from: TestPerson, exhibit: Exhibit, to: TestPerson, over: object = {}) =>
  from.post(at(exhibit, 'hand-over'), { toId: to.id, purpose: 'measuring', ...over });

const reply = (by: TestPerson, exhibit: Exhibit, sequence: number, over: object = {}) =>
  by.post(at(exhibit, 'answer'), {
    sequence,
    answer: 'accepted',
    password: testPassword,
    ...over,
  });

const act = (by: TestPerson, exhibit: Exhibit, body: object) =>
  by.post(at(exhibit, 'custody'), body);

const eventOf = (answer: { body: unknown }): LedgerEvent => (answer.body as LedgerEntry).event;

const stateOf = async (exhibit: Exhibit): Promise<CustodyState> =>
  ((await open.lead.get(`/api/cases/${open.id}/exhibits/${exhibit.id}`)).body as Exhibit).custody;

const eventsOf = async (exhibit?: Exhibit): Promise<LedgerEvent[]> => {
  const query = exhibit ? `?exhibit=${encodeURIComponent(exhibit.number)}` : '';
  const answer = await open.lead.get(`/api/cases/${open.id}/custody${query}`).expect(200);
  return (answer.body.entries as LedgerEntry[]).map(({ event }) => event);
};

describe('a hand-over', () => {
  it('when it is offered and accepted, then the receiver holds the item', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id, { sealNumber: 'S-1' });
    const offered = eventOf(
      await offer(open.investigator, exhibit, colleague, {
        condition: 'sealed, dry',
        method: 'courier',
        tracking: 'T-42',
        location: 'on the way',
      }).expect(201),
    );
    expect(offered).toMatchObject({
      kind: 'handed over',
      releasedBy: open.investigator.account?.name,
      receivedBy: 'A. Colleague',
      sealBefore: 'S-1',
      sealAfter: 'S-1',
      method: 'courier',
      tracking: 'T-42',
    });
    expect(await stateOf(exhibit)).toMatchObject({
      holderId: open.investigator.id,
      location: 'on the way',
      pending: {
        sequence: offered.sequence,
        fromId: open.investigator.id,
        toId: colleague.id,
        to: 'A. Colleague',
        purpose: 'measuring',
      },
    });
    const accepted = eventOf(
      await reply(colleague, exhibit, offered.sequence, { location: 'bench 3' }).expect(201),
    );
    expect(accepted).toMatchObject({
      kind: 'accepted',
      refersTo: offered.sequence,
      receivedBy: 'A. Colleague',
      recordedBy: { id: colleague.id },
    });
    expect(await stateOf(exhibit)).toMatchObject({
      holderId: colleague.id,
      holder: 'A. Colleague',
      location: 'bench 3',
      pending: null,
    });
  });

  it('when it is refused or withdrawn, then the giver goes on holding the item', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const first = eventOf(await offer(open.investigator, exhibit, custodian).expect(201));
    await reply(custodian, exhibit, first.sequence, { answer: 'refused', note: 'no room' }).expect(
      201,
    );
    expect(await stateOf(exhibit)).toMatchObject({ holderId: open.investigator.id, pending: null });
    const second = eventOf(await offer(open.investigator, exhibit, colleague).expect(201));
    await reply(open.investigator, exhibit, second.sequence).expect(403);
    const withdrawn = await reply(open.investigator, exhibit, second.sequence, {
      answer: 'refused',
    }).expect(201);
    expect(eventOf(withdrawn)).toMatchObject({
      kind: 'refused',
      purpose: 'withdrawn by the giver',
    });
    await reply(colleague, exhibit, second.sequence).expect(409);
  });

  it('when somebody does not hold the item, then they cannot give it away', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const answer = await offer(colleague, exhibit, custodian).expect(409);
    expect(answer.body.detail).toContain(`held by ${open.investigator.account?.name}`);
    await offer(open.lead, exhibit, custodian).expect(409);
    expect(await eventsOf(exhibit)).toHaveLength(1);
  });

  it('when one waits, then nothing else can be done with the item', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    await offer(open.investigator, exhibit, colleague).expect(201);
    await offer(open.investigator, exhibit, custodian).expect(409);
    const stored = { kind: 'stored', location: 'shelf 4' };
    await act(open.investigator, exhibit, stored).expect(409);
  });

  it('when it is given to oneself, an attorney or a stranger, then the answer names the field', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const attorney = await api.as('attorney');
    await assignTo(open.lead, open.id, attorney, 'attorney', open.file.parties[0].id);
    const stranger = await api.as('investigator');
    for (const to of [open.investigator, attorney, stranger]) {
      const answer = await offer(open.investigator, exhibit, to).expect(422);
      expect(answer.body.errors[0].field).toBe('toId');
    }
    const receivers = await open.investigator
      .get(`/api/cases/${open.id}/custody/receivers`)
      .expect(200);
    const names = (receivers.body.items as { name: string }[]).map(({ name }) => name);
    expect(names).toEqual(expect.arrayContaining(['A. Colleague', 'B. Custodian', 'C. Reviewer']));
    expect(names).toContain(open.lead.account?.name);
    expect(names).not.toContain(open.investigator.account?.name);
  });

  it('when the password is wrong or another offer is answered, then nothing changes hands', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const { sequence } = eventOf(await offer(open.investigator, exhibit, colleague).expect(201));
    const wrong = await reply(colleague, exhibit, sequence, { password: 'guessed' }).expect(422);
    expect(wrong.body.errors).toEqual([
      { field: 'password', message: 'The password is not right.' },
    ]);
    await reply(colleague, exhibit, sequence - 1).expect(409);
    await reply(custodian, exhibit, sequence).expect(403);
    expect((await stateOf(exhibit)).holderId).toBe(open.investigator.id);
  });

  it('when the seal is another one, then a reason is needed', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id, { sealNumber: 'S-5' });
    const other = { sealNumber: 'S-6' };
    const answer = await offer(open.investigator, exhibit, colleague, other).expect(422);
    expect(answer.body.errors[0].field).toBe('note');
    const explained = { ...other, note: 'S-5 tore on the way; resealed before B. Custodian' };
    const event = eventOf(
      await offer(open.investigator, exhibit, colleague, explained).expect(201),
    );
    expect(event).toMatchObject({ sealBefore: 'S-5', sealAfter: 'S-6' });
  });

  it('when it is a late entry, then it says when it happened, and not what cannot be', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id, {
      collectedAt: '2026-11-03T09:30:00Z',
    });
    const late = (happenedAt: string) =>
      offer(open.investigator, exhibit, colleague, { happenedAt, note: 'told on the telephone' });
    for (const impossible of ['2999-01-01T00:00:00Z', '2026-11-03T09:00:00Z']) {
      const answer = await late(impossible).expect(422);
      expect(answer.body.errors[0].field).toBe('happenedAt');
    }
    const event = eventOf(await late('2026-11-04T10:00:00Z').expect(201));
    expect(event.happenedAt).toBe('2026-11-04T10:00:00Z');
    expect(event.recordedAt > '2026-11-04T10:00:00Z').toBe(true);
  });

  it('when the sender names a time zone, then it stands beside the UTC time', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const first = await offer(open.investigator, exhibit, colleague).set(
      'Time-Zone',
      'Europe/Lisbon',
    );
    expect(eventOf(first).zone).toBe('Europe/Lisbon');
    const second = await reply(colleague, exhibit, eventOf(first).sequence).set(
      'Time-Zone',
      'Nowhere',
    );
    expect(eventOf(second).zone).toBe('UTC');
  });

  it('when fifty are offered at once, then exactly one wins', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const receivers = [colleague, custodian, reviewer, open.lead];
    const statuses = await Promise.all(
      Array.from({ length: 50 }, async (_, i) => {
        const answer = await offer(open.investigator, exhibit, receivers[i % receivers.length]);
        return answer.status;
      }),
    );
    expect(statuses.filter((status) => status === 201)).toHaveLength(1);
    expect(statuses.filter((status) => status === 409)).toHaveLength(49);
    expect((await eventsOf(exhibit)).map(({ kind }) => kind)).toEqual(['received', 'handed over']);
  });

  it('when one offer is answered twice at once, then exactly one answer stands', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const { sequence } = eventOf(await offer(open.investigator, exhibit, colleague).expect(201));
    const answers = await Promise.all([
      reply(colleague, exhibit, sequence),
      reply(colleague, exhibit, sequence, { answer: 'refused' }),
      reply(open.investigator, exhibit, sequence, { answer: 'refused' }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
    expect(await eventsOf(exhibit)).toHaveLength(3);
  });

  it('when one key comes five times at once, then one event is written and all get it', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const key = newId();
    const answers = await Promise.all(
      Array.from({ length: 5 }, () =>
        offer(open.investigator, exhibit, colleague).set('Idempotency-Key', key),
      ),
    );
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201, 201]);
    expect(new Set(answers.map((answer) => (answer.body as LedgerEntry).hash)).size).toBe(1);
    expect(await eventsOf(exhibit)).toHaveLength(2);
    const other = offer(open.investigator, exhibit, custodian).set('Idempotency-Key', key);
    expect((await other).status).toBe(422);
  });
});

describe('what the holder records', () => {
  it('when an item is sealed, stored, examined and opened, then seal and place follow', async () => {
    const exhibit = await registerTestExhibit(custodian, open.id);
    await act(custodian, exhibit, { kind: 'sealed', sealNumber: 'S-9' }).expect(201);
    await act(custodian, exhibit, { kind: 'stored', location: 'cage 2' }).expect(201);
    expect(await stateOf(exhibit)).toMatchObject({ sealNumber: 'S-9', location: 'cage 2' });
    const opened = { kind: 'opened', purpose: 'tread depth', condition: 'unchanged' };
    expect(eventOf(await act(custodian, exhibit, opened).expect(201))).toMatchObject({
      sealBefore: 'S-9',
      sealAfter: '',
      location: 'cage 2',
    });
    await act(custodian, exhibit, { kind: 'examined', purpose: 'tread depth' }).expect(201);
    expect((await stateOf(exhibit)).sealNumber).toBe('');
  });

  it.each([
    [{ kind: 'stored' }, 'location'],
    [{ kind: 'examined' }, 'purpose'],
    [{ kind: 'sealed' }, 'sealNumber'],
    [{ kind: 'opened' }, 'purpose'],
    [{ kind: 'corrected', refersTo: 1 }, 'note'],
    [{ kind: 'corrected', note: 'x' }, 'refersTo'],
    [{ kind: 'disposed' }, 'kind'],
    [{ kind: 'stored', location: 'x', happenedAt: '2999-01-01T00:00:00Z' }, 'happenedAt'],
  ])('when the entry is %j, then the answer names %s', async (body, field) => {
    const exhibit = await registerTestExhibit(custodian, open.id);
    const answer = await act(custodian, exhibit, body).expect(422);
    expect(answer.body.errors[0].field).toBe(field);
  });

  it('when somebody else tries, then they cannot; a reviewer may not at all', async () => {
    const exhibit = await registerTestExhibit(custodian, open.id);
    const body = { kind: 'stored', location: 'shelf' };
    await act(open.investigator, exhibit, body).expect(409);
    await act(reviewer, exhibit, body).expect(403);
    await act(await api.nobody().signIn(), exhibit, body).expect(401);
    await act(await api.as('investigator'), exhibit, body).expect(404);
  });

  it('when an event was wrong, then a correction names it and both stay', async () => {
    const exhibit = await registerTestExhibit(custodian, open.id);
    const stored = { kind: 'stored', location: 'shelf 4' };
    const wrong = eventOf(await act(custodian, exhibit, stored).expect(201));
    const body = {
      kind: 'corrected',
      refersTo: wrong.sequence,
      location: 'shelf 5',
      note: 'It is shelf 5.',
    };
    await act(open.investigator, exhibit, body).expect(403);
    await act(custodian, exhibit, { ...body, refersTo: 1_000_000 }).expect(422);
    await act(custodian, exhibit, body).expect(201);
    const kinds = (await eventsOf(exhibit)).map(({ kind, location }) =>
      `${kind} ${location}`.trim(),
    );
    expect(kinds).toEqual(['received', 'stored shelf 4', 'corrected shelf 5']);
    expect((await stateOf(exhibit)).location).toBe('shelf 5');
  });
});

describe('the ledger in the database', () => {
  it.each(['custody_events', 'custody_heads', 'exhibit_files', 'derivatives'])(
    'refuses to change or delete rows of %s',
    async (table) => {
      await registerTestExhibit(open.investigator, open.id);
      const { sequelize } = api.services;
      const change = (sql: string) => sequelize.query(sql, { type: QueryTypes.RAW });
      await expect(change(`DELETE FROM ${table}`)).rejects.toThrow(/denied/);
      const column = table === 'derivatives' || table === 'exhibit_files' ? 'name' : 'hash';
      await expect(change(`UPDATE ${table} SET ${column} = ''`)).rejects.toThrow(/denied/);
      await expect(change(`TRUNCATE ${table}`)).rejects.toThrow(/denied/);
    },
  );
});
