import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import { startTestApi, type TestApi } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

jest.setTimeout(30_000);

let api: TestApi;
let opened: TestCase;
let notes: string;

beforeAll(async () => {
  api = await startTestApi();
  opened = await openTestCase(api);
  notes = `/api/cases/${opened.id}/notes`;
}, 60_000);
afterAll(() => api.stop());

describe('notes', () => {
  it('when two people write at once, then each note has its own number', async () => {
    const custodian = await api.as('investigator', 'C. Keeper');
    await assignTo(opened.lead, opened.id, custodian, 'evidence-custodian');
    await Promise.all([
      opened.investigator.post(notes, { text: 'Rain since 9.' }).expect(201),
      custodian
        .post(notes, { text: 'Came late.', happenedAt: '2026-11-30T08:15:00.000Z' })
        .expect(201),
    ]);
    const { body } = await opened.lead.get(notes).expect(200);
    expect(body.items.map((note: { number: number }) => note.number)).toEqual([1, 2]);
    expect(body.items).toContainEqual(
      expect.objectContaining({ author: 'C. Keeper', happenedAt: '2026-11-30T08:15:00.000Z' }),
    );
  });

  it('when a note was wrong, then a new one names it and both stay', async () => {
    await opened.investigator
      .post(notes, { text: 'Rain since 10.', correctsNumber: 1 })
      .expect(201)
      .expect(({ body }) => expect(body).toMatchObject({ number: 3, correctsNumber: 1 }));
    await opened.investigator
      .post(notes, { text: 'x', correctsNumber: 9 })
      .expect(422)
      .expect(({ body }) => expect(body.errors[0].field).toBe('correctsNumber'));
    const { body } = await opened.investigator.get(notes).expect(200);
    expect(body.items).toHaveLength(3);
  });

  it('when somebody changes a note in the database itself, then the database refuses', async () => {
    const { sequelize } = api.services;
    const update = sequelize.query("UPDATE notes SET text = 'nothing'", {
      type: QueryTypes.UPDATE,
    });
    await expect(update).rejects.toThrow(/append-only|denied/);
    const remove = sequelize.query('DELETE FROM notes', { type: QueryTypes.DELETE });
    await expect(remove).rejects.toThrow(/append-only|denied/);
  });

  it('refuses an empty note, a reviewer’s note, a stranger and nobody', async () => {
    await opened.investigator.post(notes, { text: '' }).expect(422);
    const reviewer = await api.as('investigator');
    await reviewer.get(notes).expect(404);
    await assignTo(opened.lead, opened.id, reviewer, 'technical-reviewer');
    await reviewer.get(notes).expect(200);
    await reviewer.post(notes, { text: 'x' }).expect(403);
    await (await api.as('attorney')).get(notes).expect(404);
    await (await api.nobody().signIn()).get(notes).expect(401);
  });
});

describe('recorded events', () => {
  it('gives what was done in the case, newest first, page by page', async () => {
    const events = `/api/cases/${opened.id}/events`;
    const all = (await opened.lead.get(events).expect(200)).body.items as {
      sequence: number;
      action: string;
      actor: string;
      subject: string;
    }[];
    expect(all).toContainEqual(
      expect.objectContaining({ action: 'wrote note', subject: 'note 3' }),
    );
    expect(all.map((event) => event.sequence)).toEqual(
      all.map((event) => event.sequence).sort((a, b) => b - a),
    );
    const paged: number[] = [];
    let after = '';
    for (let i = 0; i < 100; i++) {
      const { body } = await opened.lead.get(`${events}?limit=2${after}`).expect(200);
      paged.push(...body.items.map((event: { sequence: number }) => event.sequence));
      if (body.next === null) break;
      after = `&after=${body.next}`;
    }
    expect(paged).toEqual(all.map((event) => event.sequence));
    await opened.lead.get(`${events}?after=x`).expect(400);
  });

  it('shows nothing of another case', async () => {
    const other = await openTestCase(api);
    const { body } = await other.lead.get(`/api/cases/${other.id}/events`).expect(200);
    expect(JSON.stringify(body)).not.toContain('note');
    await other.investigator.get(`/api/cases/${opened.id}/events`).expect(404);
  });
});
