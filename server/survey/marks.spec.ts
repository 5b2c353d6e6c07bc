import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import type { MarkEntry } from '#shared/contracts/survey';
import { startTestApi, type TestApi } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

const entry = (over: Partial<MarkEntry> = {}): MarkEntry => ({
  label: 'M1',
  kind: 'gouge',
  at: [12.5, -3.25],
  sigma: [0.02, 0.01],
  ...over,
});
const marksOf = ({ id }: TestCase) => `/api/cases/${id}/marks`;
const withdraw = (test: TestCase, markId: string, version: number, reason: string) =>
  test.investigator
    .delete(`${marksOf(test)}/${markId}?reason=${encodeURIComponent(reason)}`)
    .set('If-Match', `"${version}"`);

describe('marks', () => {
  it('when a mark is entered, then it stands in the list with its covariance and what was typed', async () => {
    const test = await openTestCase(api);
    const body = entry({ correlation: 0.5, trace: 'T1', order: 3, raw: '12.5 m, -3.25 m ± 2 cm' });
    const made = await test.investigator.post(marksOf(test), body).expect(201);
    expect(made.headers['etag']).toBe('"1"');
    const list = await test.lead.get(marksOf(test)).expect(200);
    expect(list.body).toEqual({ items: [made.body], imports: [] });
    const [[xx, xy], [yx, yy]] = made.body.covariance;
    // Variance is sigma squared, covariance rho times both sigmas (JCGM 100:2008, 5.2.2).
    expect([xx, xy, yx, yy]).toEqual(
      [0.0004, 0.0001, 0.0001, 0.0001].map((v) => expect.closeTo(v, 12)),
    );
    expect(made.body).toMatchObject({
      label: 'M1',
      kind: 'gouge',
      at: [12.5, -3.25],
      height: null,
      trace: 'T1',
      order: 3,
      source: {
        kind: 'entry',
        by: test.investigator.account?.name,
        raw: '12.5 m, -3.25 m ± 2 cm',
      },
      version: 1,
    });
  });

  it('when the uncertainty is missing or not over zero, then the mark is refused', async () => {
    const test = await openTestCase(api);
    const { sigma: _, ...bare } = entry();
    const missing = await test.investigator.post(marksOf(test), bare).expect(422);
    expect(missing.body.errors[0].field).toBe('sigma');
    const zero = await test.investigator
      .post(marksOf(test), entry({ sigma: [0, 0.1] }))
      .expect(422);
    expect(zero.body.errors[0].field).toBe('sigma.0');
    await test.investigator.post(marksOf(test), entry({ correlation: 1 })).expect(422);
    await test.investigator.post(marksOf(test), { ...entry(), kind: 'blob' }).expect(422);
    expect((await test.lead.get(marksOf(test)).expect(200)).body.items).toEqual([]);
  });

  it('when a label stands already, then the answer names the label', async () => {
    const test = await openTestCase(api);
    await test.investigator.post(marksOf(test), entry()).expect(201);
    const again = await test.investigator.post(marksOf(test), entry()).expect(422);
    expect(again.body.errors).toEqual([
      { field: 'label', message: 'Another mark of this case has the label "M1".' },
    ]);
    await test.investigator.post(marksOf(test), entry({ label: 'm1' })).expect(201);
    const other = await openTestCase(api);
    await other.investigator.post(marksOf(other), entry()).expect(201);
  });

  it('when ten people enter one label at once, then one mark stands', async () => {
    const test = await openTestCase(api);
    const answers = await Promise.all(
      Array.from({ length: 10 }, () => test.investigator.post(marksOf(test), entry())),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([
      201,
      ...Array<number>(9).fill(422),
    ]);
  });

  it('when a mark is changed, then what it was stays with the reason', async () => {
    const test = await openTestCase(api);
    const made = (await test.investigator.post(marksOf(test), entry()).expect(201)).body;
    const body = { ...entry({ at: [12.6, -3.25] }), reason: 'Read again from the field book.' };
    const path = `${marksOf(test)}/${made.id}`;
    const changed = await test.investigator.put(path, body, 1).expect(200);
    expect(changed.body).toMatchObject({ version: 2, at: [12.6, -3.25] });
    const { version: _, ...before } = made;
    const changes = await test.lead.get(`/api/cases/${test.id}/mark-changes`).expect(200);
    expect(changes.body.items).toEqual([
      {
        markId: made.id,
        version: 1,
        withdrawn: false,
        before,
        reason: 'Read again from the field book.',
        by: test.investigator.account?.name,
        at: expect.any(String),
      },
    ]);
    await test.investigator.put(path, { ...body, reason: ' ' }, 2).expect(422);
    await test.investigator.call('put', path, body).expect(428);
  });

  it('when two people edit one mark, then the later one is shown what stands and nothing changes', async () => {
    const test = await openTestCase(api);
    const colleague = await api.as('investigator');
    await assignTo(test.lead, test.id, colleague, 'investigator');
    const made = (await test.investigator.post(marksOf(test), entry()).expect(201)).body;
    const path = `${marksOf(test)}/${made.id}`;
    const [one, two] = await Promise.all([
      test.investigator.put(path, { ...entry({ note: 'mine' }), reason: 'a' }, 1),
      colleague.put(path, { ...entry({ note: 'theirs' }), reason: 'b' }, 1),
    ]);
    expect([one.status, two.status].sort()).toEqual([200, 412]);
    const [kept, late] = one.status === 200 ? [one, two] : [two, one];
    expect(late.body.current).toEqual(kept.body);
    const changes = await test.lead.get(`/api/cases/${test.id}/mark-changes`).expect(200);
    expect(changes.body.items).toHaveLength(1);
  });

  it('when a mark is withdrawn, then it leaves the survey, frees its label and stays in the history', async () => {
    const test = await openTestCase(api);
    const made = (await test.investigator.post(marksOf(test), entry()).expect(201)).body;
    await withdraw(test, made.id, 1, 'Taken twice').expect(204);
    expect((await test.lead.get(marksOf(test)).expect(200)).body.items).toEqual([]);
    const [change] = (await test.lead.get(`/api/cases/${test.id}/mark-changes`).expect(200)).body
      .items;
    expect(change).toMatchObject({
      withdrawn: true,
      reason: 'Taken twice',
      before: { label: 'M1' },
    });
    const late = await test.investigator
      .put(`${marksOf(test)}/${made.id}`, { ...entry(), reason: 'x' }, 1)
      .expect(409);
    expect(late.body.detail).toMatch(/withdrawn/);
    await test.investigator.post(marksOf(test), entry()).expect(201);
    await withdraw(test, made.id, 2, 'Again').expect(409);
    await test.investigator
      .delete(`${marksOf(test)}/${made.id}`)
      .set('If-Match', '"2"')
      .expect(400);
  });

  it('when somebody is a stranger to the case, then its marks do not exist for them', async () => {
    const test = await openTestCase(api);
    const made = (await test.investigator.post(marksOf(test), entry()).expect(201)).body;
    const stranger = await api.as('investigator');
    const attorney = await api.as('attorney');
    for (const person of [stranger, attorney]) {
      await person.get(marksOf(test)).expect(404);
      await person.get(`/api/cases/${test.id}/mark-changes`).expect(404);
      await person.post(marksOf(test), entry({ label: 'X' })).expect(404);
      await person.put(`${marksOf(test)}/${made.id}`, { ...entry(), reason: 'x' }, 1).expect(404);
    }
    await api.nobody().get(marksOf(test)).expect(401);
    // The lead sees the survey but does not work in it.
    await test.lead.post(marksOf(test), entry({ label: 'X' })).expect(403);
  });

  it('when a mark of another case is named, then it is not found', async () => {
    const test = await openTestCase(api);
    const other = await openTestCase(api);
    const made = (await other.investigator.post(marksOf(other), entry()).expect(201)).body;
    await test.investigator
      .put(`${marksOf(test)}/${made.id}`, { ...entry(), reason: 'x' }, 1)
      .expect(404);
    await withdraw(test, made.id, 1, 'x').expect(404);
  });

  it('when marks are worked on, then the access log tells it', async () => {
    const test = await openTestCase(api);
    const made = (await test.investigator.post(marksOf(test), entry()).expect(201)).body;
    await test.investigator
      .put(`${marksOf(test)}/${made.id}`, { ...entry(), reason: 'why' }, 1)
      .expect(200);
    await withdraw(test, made.id, 2, 'gone').expect(204);
    const events = await api.services.sequelize.query<{ action: string }>(
      `SELECT action FROM access_events WHERE case_id = ? AND action LIKE '% mark' ORDER BY sequence`,
      { type: QueryTypes.SELECT, replacements: [test.id] },
    );
    expect(events.map((event) => event.action)).toEqual([
      'entered mark',
      'changed mark',
      'withdrew mark',
    ]);
  });
});
