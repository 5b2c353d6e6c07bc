import { HttpHeaders, provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { afterEach, beforeEach, describe, expect, it } from '@jest/globals';
import { addParty, editBrief, listCases, readCase } from '#shared/contracts/cases';
import { releaseCase } from '#shared/contracts/disclosure';
import { readSession } from '#shared/contracts/accounts';
import { listMarks, removeMark } from '#shared/contracts/survey';
import { address } from './address';
import { Api } from './api';
import { ApiProblem } from './api-problem';

const caseId = '0190b6f4-0000-7000-8000-000000000001';
const partyId = '0190b6f4-0000-7000-8000-000000000002';
const markId = '0190b6f4-0000-7000-8000-000000000003';

async function problemOf(call: Promise<unknown>): Promise<ApiProblem> {
  try {
    await call;
  } catch (error) {
    if (error instanceof ApiProblem) return error;
    throw error;
  }
  throw new Error('The call was expected to fail');
}

describe('the typed client', () => {
  let api: Api;
  let http: HttpTestingController;

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [provideHttpClient(), provideHttpClientTesting()],
    });
    api = TestBed.inject(Api);
    http = TestBed.inject(HttpTestingController);
  });
  afterEach(() => http.verify());

  it('when an endpoint has parameters and a query, then both are in the address', async () => {
    const answer = api.call(listCases, { query: { limit: 50, after: '2026-003' } });
    http.expectOne('/api/cases?limit=50&after=2026-003').flush({ items: [], next: null });
    expect(await answer).toEqual({ items: [], next: null });
  });

  it('when something is read, then no token goes along', async () => {
    api.csrfToken.set('token-1');
    const answer = api.call(readSession, {});
    const sent = http.expectOne('/api/session');
    expect(sent.request.headers.has('X-CSRF-Token')).toBe(false);
    sent.flush({ account: null, csrfToken: 'a' });
    expect((await answer).csrfToken).toBe('a');
  });

  it('when something is changed, then the token goes along', async () => {
    api.csrfToken.set('token-1');
    const answer = api.call(addParty, {
      params: { caseId },
      body: { name: 'Claimant', role: 'claimant' },
    });
    const sent = http.expectOne({ method: 'POST', url: `/api/cases/${caseId}/parties` });
    expect(sent.request.headers.get('X-CSRF-Token')).toBe('token-1');
    expect(sent.request.body).toEqual({ name: 'Claimant', role: 'claimant' });
    sent.flush(
      { id: partyId, name: 'Claimant', role: 'claimant' },
      { status: 201, statusText: '' },
    );
    expect((await answer).id).toBe(partyId);
  });

  it('when a version is edited, then If-Match names it in quotes', async () => {
    const answer = problemOf(
      api.call(editBrief, { params: { caseId }, body: { place: 'Bend' }, ifMatch: 7 }),
    );
    const sent = http.expectOne({ method: 'PATCH', url: `/api/cases/${caseId}` });
    expect(sent.request.headers.get('If-Match')).toBe('"7"');
    sent.flush(
      {
        type: 'about:blank',
        title: 'Changed by somebody else',
        status: 412,
        current: { version: 8 },
      },
      { status: 412, statusText: 'Precondition Failed' },
    );
    const problem = await answer;
    expect(problem.status).toBe(412);
    expect(problem.current).toEqual({ version: 8 });
  });

  it('when an act must be done once, then its key goes along', () => {
    const body = { partyId, exhibits: [], withheld: [], password: 'x' };
    const key = 'key-of-this-act';
    void api.call(releaseCase, { params: { caseId }, body, idempotencyKey: key }).catch(() => 0);
    const sent = http.expectOne(`/api/cases/${caseId}/releases`);
    expect(sent.request.headers.get('Idempotency-Key')).toBe(key);
  });

  it('when nothing comes back, then the answer is undefined', async () => {
    const answer = api.call(removeMark, {
      params: { caseId, markId },
      query: { reason: 'counted twice' },
      ifMatch: 1,
    });
    http
      .expectOne(`/api/cases/${caseId}/marks/${markId}?reason=counted+twice`)
      .flush(null, { status: 204, statusText: '' });
    await expect(answer).resolves.toBeUndefined();
  });

  it('when fields are at fault, then each keeps its message', async () => {
    const answer = problemOf(
      api.call(addParty, { params: { caseId }, body: { name: '', role: 'claimant' } }),
    );
    http.expectOne(`/api/cases/${caseId}/parties`).flush(
      {
        type: 'about:blank',
        title: 'Please correct',
        status: 422,
        errors: [{ field: 'name', message: 'must not be empty' }],
      },
      { status: 422, statusText: '', headers: new HttpHeaders() },
    );
    expect((await answer).messageFor('name')).toBe('must not be empty');
  });

  it('when the server is not reached, then that is said and remembered', async () => {
    const answer = problemOf(api.call(listMarks, { params: { caseId } }));
    http.expectOne(`/api/cases/${caseId}/marks`).error(new ProgressEvent('error'));
    expect((await answer).status).toBe(0);
    expect(api.offline()).toBe(true);
  });

  it('when the answer breaks the contract, then it is a problem and not data', async () => {
    const answer = problemOf(api.call(readCase, { params: { caseId } }));
    http.expectOne(`/api/cases/${caseId}`).flush({ id: 'not an id' });
    expect((await answer).title).toBe('The answer of the server cannot be read');
  });

  it('when the session is over, then that is announced', async () => {
    let told = 0;
    api.signedOut.subscribe(() => {
      told += 1;
    });
    const answer = problemOf(api.call(readCase, { params: { caseId } }));
    http.expectOne(`/api/cases/${caseId}`).flush(null, { status: 401, statusText: '' });
    await answer;
    expect(told).toBe(1);
  });

  it('when it is called off, then the request ends and the caller learns of it', async () => {
    const abort = new AbortController();
    const answer = api.call(readCase, { params: { caseId }, abort: abort.signal });
    const sent = http.expectOne(`/api/cases/${caseId}`);
    abort.abort();
    await expect(answer).rejects.toThrow();
    expect(sent.cancelled).toBe(true);
  });
});

describe('an address', () => {
  it('encodes what it is given', () => {
    expect(address(readCase, { caseId: 'a/b' })).toBe('/api/cases/a%2Fb');
  });

  it('is refused when a parameter is missing', () => {
    expect(() => address(readCase, {})).toThrow('"caseId" is missing');
  });
});
