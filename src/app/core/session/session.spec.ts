import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { type Route, Router, provideRouter } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import type { Account, AccountRole } from '#shared/contracts/accounts';
import { Api } from '../api/api';
import { attorneyOnly, home, leadOnly, signedIn, signedOut, staffOnly } from './guards';
import { Session } from './session';

@Component({ template: '' })
class Page {}

const page = (path: string, canActivate: Route['canActivate'] = []): Route => ({
  path,
  component: Page,
  canActivate,
});

const accountOf = (role: AccountRole): Account => ({
  id: '0190b6f4-0000-7000-8000-000000000009',
  name: 'Edda Varo',
  email: 'edda.varo@quellmere.example',
  role,
  active: true,
});

describe('the session', () => {
  let session: Session;
  let http: HttpTestingController;

  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(),
        provideHttpClientTesting(),
        provideRouter([
          page('', [home]),
          page('sign-in', [signedOut]),
          page('cases', [staffOnly]),
          page('laboratory', [leadOnly]),
          page('disclosures', [attorneyOnly]),
          page('anything', [signedIn]),
        ]),
      ],
    });
    session = TestBed.inject(Session);
    http = TestBed.inject(HttpTestingController);
  });

  async function signInAs(role: AccountRole | null): Promise<void> {
    const loaded = session.load();
    http
      .expectOne('/api/session')
      .flush({ account: role === null ? null : accountOf(role), csrfToken: 'token' });
    await loaded;
  }
  async function landsOn(from: string): Promise<string> {
    const harness = await RouterTestingHarness.create();
    await harness.navigateByUrl(from);
    return TestBed.inject(Router).url;
  }

  it('when it is read, then the account and the token are known', async () => {
    await signInAs('investigator');
    expect(session.account()?.name).toBe('Edda Varo');
    expect(session.isStaff()).toBe(true);
    expect(session.isLead()).toBe(false);
    expect(TestBed.inject(Api).csrfToken()).toBe('token');
  });

  it('when it cannot be read, then the reason is kept for the page to show', async () => {
    const loaded = session.load();
    http.expectOne('/api/session').error(new ProgressEvent('error'));
    await loaded;
    expect(session.problem()?.status).toBe(0);
  });

  it('when someone signs in, then the account comes from the answer', async () => {
    const done = session.signIn('edda.varo@quellmere.example', 'a long pass phrase');
    const sent = http.expectOne({ method: 'POST', url: '/api/session' });
    sent.flush({ account: accountOf('laboratory-lead'), csrfToken: 'new' });
    await done;
    expect(session.isLead()).toBe(true);
  });

  it('when someone signs out, then the page is left and a new token is fetched', async () => {
    await signInAs('investigator');
    const done = session.signOut();
    http.expectOne({ method: 'DELETE', url: '/api/session' }).flush(null);
    await Promise.resolve();
    await new Promise((later) => setTimeout(later));
    http.expectOne('/api/session').flush({ account: null, csrfToken: 'fresh' });
    await done;
    expect(session.account()).toBeNull();
    expect(TestBed.inject(Api).csrfToken()).toBe('fresh');
    expect(TestBed.inject(Router).url).toBe('/sign-in');
  });

  it.each<[AccountRole | null, string, string]>([
    [null, '/', '/sign-in'],
    [null, '/cases', '/sign-in?to=%2Fcases'],
    [null, '/anything', '/sign-in?to=%2Fanything'],
    ['laboratory-lead', '/', '/cases'],
    ['laboratory-lead', '/laboratory', '/laboratory'],
    ['laboratory-lead', '/disclosures', '/cases'],
    ['investigator', '/', '/cases'],
    ['investigator', '/laboratory', '/cases'],
    ['investigator', '/sign-in', '/cases'],
    ['attorney', '/', '/disclosures'],
    ['attorney', '/cases', '/disclosures'],
    ['attorney', '/disclosures', '/disclosures'],
  ])('when %s opens %s, then the page is %s', async (role, from, to) => {
    await signInAs(role);
    expect(await landsOn(from)).toBe(to);
  });
});
