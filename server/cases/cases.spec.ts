import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import type { CaseFile } from '#shared/contracts/cases';
import { startTestApi, type TestApi } from '../testing/api';
import { assignTo, noConflict, openTestCase } from '../testing/factories';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

describe('cases', () => {
  it('when the lead opens a case, then it gets the next number of the year', async () => {
    const lead = await api.as('laboratory-lead');
    const first = await lead.post('/api/cases', { title: 'One', kind: 'other' }).expect(201);
    const second = await lead.post('/api/cases', { title: 'Two', kind: 'other' }).expect(201);
    const [a, b] = [first, second].map((answer) => Number(String(answer.body.number).slice(5)));
    expect(b).toBe(a + 1);
    expect(first.body.stage).toBe('opened');
  });

  it('when ten cases are opened at once, then no number is given twice', async () => {
    const lead = await api.as('laboratory-lead');
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, i) =>
        lead.post('/api/cases', { title: `Case ${i}`, kind: 'other' }).expect(201),
      ),
    );
    expect(new Set(answers.map((answer) => answer.body.number)).size).toBe(10);
  });

  it('when the title is empty, then the answer names the field', async () => {
    const lead = await api.as('laboratory-lead');
    const answer = await lead.post('/api/cases', { title: ' ', kind: 'other' }).expect(422);
    expect(answer.type).toBe('application/problem+json');
    expect(answer.body.errors).toEqual([{ field: 'title', message: 'must not be empty' }]);
  });

  it('when an investigator is not assigned, then the case does not exist for them', async () => {
    const { id, investigator } = await openTestCase(api);
    const stranger = await api.as('investigator');
    await stranger.get(`/api/cases/${id}`).expect(404);
    await investigator.get(`/api/cases/${id}`).expect(200);
    const own = await investigator.get('/api/cases').expect(200);
    expect(own.body.items.map((item: { id: string }) => item.id)).toEqual([id]);
    expect((await stranger.get('/api/cases').expect(200)).body.items).toEqual([]);
  });

  it('when a lead investigator is assigned, then the case moves to assigned', async () => {
    const { file, investigator } = await openTestCase(api);
    expect(file.stage).toBe('assigned');
    expect(file.leadInvestigator).toBe(investigator.account?.name);
  });

  it('when a possible conflict is declared, then assigning needs a reason', async () => {
    const { lead, id } = await openTestCase(api);
    const person = await api.as('investigator');
    const body = {
      accountId: person.id,
      role: 'investigator',
      declaration: { conflict: true, statement: 'A cousin works for the haulier.' },
    };
    const refused = await lead.post(`/api/cases/${id}/assignments`, body).expect(422);
    expect(refused.body.errors[0].field).toBe('overrideReason');
    await lead
      .post(`/api/cases/${id}/assignments`, { ...body, overrideReason: 'Nobody else can read it.' })
      .expect(201);
  });

  it('when somebody investigates a case, then they cannot be its technical reviewer', async () => {
    const { lead, investigator, id } = await openTestCase(api);
    const answer = await lead
      .post(`/api/cases/${id}/assignments`, {
        accountId: investigator.id,
        role: 'technical-reviewer',
        declaration: noConflict,
      })
      .expect(409);
    expect(answer.body.detail).toMatch(/reviews what they made/);
  });

  it('when two people edit one brief, then the later one is shown what stands', async () => {
    const { lead, investigator, id, file } = await openTestCase(api);
    const path = `/api/cases/${id}`;
    await lead.patch(path, { place: 'Marl Lane' }, file.version).expect(200);
    const late = await investigator.patch(path, { place: 'Marl Road' }, file.version).expect(412);
    expect(late.body.current.place).toBe('Marl Lane');
    await lead.call('patch', path, { place: 'x' }).expect(428);
  });

  it('when an assignment ends, then the door closes at once', async () => {
    const { lead, investigator, id } = await openTestCase(api);
    const file = (await investigator.get(`/api/cases/${id}`).expect(200)).body as CaseFile;
    await lead.delete(`/api/cases/${id}/assignments/${file.assignments[0].id}`).expect(204);
    await investigator.get(`/api/cases/${id}`).expect(404);
  });

  it('when an attorney is assigned for a party, then the case file stays closed to them', async () => {
    const { lead, id, file } = await openTestCase(api);
    const attorney = await api.as('attorney');
    await assignTo(lead, id, attorney, 'attorney', file.parties[0].id);
    await attorney.get(`/api/cases/${id}`).expect(404);
    await attorney.get('/api/cases').expect(404);
  });
});
