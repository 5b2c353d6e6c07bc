import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import { AccessEventRecord } from '../database/models/access-event';
import { startTestApi, type TestApi } from '../testing/api';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

describe('the access log', () => {
  it('when many events are told at once, then every one stands in one unbroken chain', async () => {
    const told = Array.from({ length: 300 }, (_, i) => `subject ${i}`);
    await Promise.all(
      told.map((subject) =>
        api.services.accessLog.record({ actor: null, action: 'tried', caseId: null, subject }),
      ),
    );
    const events = await AccessEventRecord.findAll({ order: [['sequence', 'ASC']] });
    let previous = '0'.repeat(64);
    events.forEach((event, index) => {
      const content = JSON.parse(event.canonical) as { sequence: number; previous: string };
      expect(content.sequence).toBe(index + 1);
      expect(content.previous).toBe(previous);
      expect(createHash('sha256').update(event.canonical).digest('hex')).toBe(event.hash);
      previous = event.hash;
    });
    const subjects = events.map((event) => JSON.parse(event.canonical).subject as string);
    expect(subjects.filter((subject) => subject.startsWith('subject '))).toEqual(told);
  });

  it('when somebody is refused, then that is an event too', async () => {
    const investigator = await api.as('investigator');
    await investigator
      .post('/api/accounts', {
        name: 'x',
        email: 'x@y.example',
        role: 'attorney',
        password: 'long enough to use',
      })
      .expect(403);
    const refused = await AccessEventRecord.findAll({ where: { action: 'refused' } });
    expect(refused.map((event) => event.actorId)).toContain(investigator.id);
  });
});
