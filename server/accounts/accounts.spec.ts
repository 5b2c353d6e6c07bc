import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import request from 'supertest';
import { startTestApi, testPassword, type TestApi } from '../testing/api';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

describe('signing in', () => {
  it('when the password is right, then the session has the account and a new id', async () => {
    const person = await api.as('investigator');
    const agent = request.agent(api.address);
    const before = await agent.get('/api/session').expect(200);
    expect(before.body.account).toBeNull();
    const cookie = before.get('Set-Cookie')?.[0].split(';')[0];
    const answer = await agent
      .post('/api/session')
      .set('X-CSRF-Token', before.body.csrfToken)
      .send({ email: person.account?.email.toUpperCase(), password: testPassword })
      .expect(200);
    expect(answer.body.account.id).toBe(person.id);
    expect(answer.body.account).not.toHaveProperty('passwordHash');
    expect(answer.get('Set-Cookie')?.[0].split(';')[0]).not.toBe(cookie);
    expect(answer.get('Set-Cookie')?.[0]).toMatch(/HttpOnly; SameSite=Strict/);
  });

  it('when account or password are wrong, then both get the same answer', async () => {
    const person = await api.as('investigator');
    const agent = request.agent(api.address);
    const token = (await agent.get('/api/session')).body.csrfToken;
    const send = (email: string, password: string) =>
      agent.post('/api/session').set('X-CSRF-Token', token).send({ email, password }).expect(401);
    const unknown = await send('nobody@test.example', testPassword);
    const wrong = await send(String(person.account?.email), 'not the password');
    expect(wrong.body).toEqual(unknown.body);
  });

  it('when a change comes without the token, then it is refused', async () => {
    const lead = await api.as('laboratory-lead');
    await lead
      .call('post', '/api/cases', { title: 'x', kind: 'other' })
      .set('X-CSRF-Token', '')
      .expect(403);
    await lead.post('/api/cases', { title: 'x', kind: 'other' }).expect(201);
  });

  it('when somebody signs out, then the session is worth nothing', async () => {
    const person = await api.as('investigator');
    await person.get('/api/cases').expect(200);
    await person.delete('/api/session').expect(204);
    await person.get('/api/cases').expect(401);
  });

  it('when an account is closed, then its session ends at once', async () => {
    const person = await api.as('investigator');
    await person.account?.update({ active: false });
    await person.get('/api/cases').expect(401);
  });
});

describe('accounts', () => {
  it('when the lead adds an account, then it can sign in; a second with its address is refused', async () => {
    const lead = await api.as('laboratory-lead');
    const entry = {
      name: 'N. Ewe',
      email: 'ewe@test.example',
      role: 'investigator',
      password: 'long enough to use',
    };
    await lead.post('/api/accounts', entry).expect(201);
    const again = await lead.post('/api/accounts', entry).expect(422);
    expect(again.body.errors[0].field).toBe('email');
    const short = await lead.post('/api/accounts', { ...entry, password: 'short' }).expect(422);
    expect(short.body.errors[0].field).toBe('password');
  });
});
