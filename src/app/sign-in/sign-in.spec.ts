import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { Router, provideRouter } from '@angular/router';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { signIn } from '#shared/contracts/accounts';
import { FakeApi } from '../../../test/web/fake-api';
import { accountOf } from '../../../test/web/records';
import { ApiProblem } from '../core/api/api-problem';
import { SignIn } from './sign-in';

describe('signing in', () => {
  let api: FakeApi;

  beforeEach(() => {
    api = new FakeApi().on(signIn, () => ({ account: accountOf('investigator'), csrfToken: 't' }));
    TestBed.configureTestingModule({
      providers: [provideRouter([{ path: '**', children: [] }]), api.provider()],
    });
  });

  async function enter(to?: string): Promise<HTMLElement> {
    const fixture = TestBed.createComponent(SignIn);
    if (to !== undefined) fixture.componentRef.setInput('to', to);
    const page = fixture.nativeElement as HTMLElement;
    await fixture.whenStable();
    const [email, password] = [...page.querySelectorAll('input')];
    if (!email || !password) throw new Error('The two fields are not there');
    email.value = ' varo@quellmere.example ';
    password.value = 'drawing table 26';
    const loader = TestbedHarnessEnvironment.loader(fixture);
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Sign in' }))).click();
    await fixture.whenStable();
    return page;
  }

  it('when the password is right, then the page that was wanted opens', async () => {
    await enter('/cases/1/motion?station=S3');
    expect(api.to(signIn)[0]?.body).toEqual({
      email: 'varo@quellmere.example',
      password: 'drawing table 26',
    });
    expect(TestBed.inject(Router).url).toBe('/cases/1/motion?station=S3');
  });

  it.each(['//elsewhere.example/x', '/\\elsewhere.example', 'https://elsewhere.example'])(
    'when %s is asked for, then the person stays here',
    async (to) => {
      await enter(to);
      expect(TestBed.inject(Router).url).toBe('/cases');
    },
  );

  it('when it is refused, then the reason is shown and the password is gone', async () => {
    api.on(signIn, () => new ApiProblem(401, 'Not signed in', 'Address or password is wrong.'));
    const page = await enter();
    expect(page.textContent).toContain('Address or password is wrong.');
    expect([...page.querySelectorAll('input')].map((input) => input.value)[1]).toBe('');
  });
});
