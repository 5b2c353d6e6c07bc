import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatSortHarness } from '@angular/material/sort/testing';
import { Router, provideRouter, withComponentInputBinding } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import type { AccountRole } from '#shared/contracts/accounts';
import { readSession } from '#shared/contracts/accounts';
import { listCases } from '#shared/contracts/cases';
import { FakeApi } from '../../../test/web/fake-api';
import { accountOf, caseSummaryOf } from '../../../test/web/records';
import { ApiProblem } from '../core/api/api-problem';
import { Clock } from '../core/clock';
import { Session } from '../core/session/session';
import { CaseList } from './case-list';

const spin = caseSummaryOf();
const press = caseSummaryOf({ number: '2026-011', title: 'Press 4', dueOn: '2026-12-02' });
const junction = caseSummaryOf({
  number: '2026-016',
  title: 'Junction of Mere and Coil Road',
  stage: 'opened',
  leadInvestigator: null,
  dueOn: null,
});

describe('the case list', () => {
  let api: FakeApi;
  let page: RouterTestingHarness;
  let loader: HarnessLoader;

  beforeEach(() => {
    api = new FakeApi().on(listCases, () => ({ items: [junction, spin, press], next: null }));
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: 'cases', component: CaseList }], withComponentInputBinding()),
        api.provider(),
      ],
    });
    TestBed.inject(Clock).today.set('2026-12-01');
  });

  async function openAs(role: AccountRole, address = '/cases'): Promise<void> {
    api.on(readSession, () => ({ account: accountOf(role), csrfToken: 't' }));
    await TestBed.inject(Session).load();
    page = await RouterTestingHarness.create(address);
    loader = TestbedHarnessEnvironment.loader(page.fixture);
    await page.fixture.whenStable();
  }
  const text = (): string => page.routeNativeElement?.textContent ?? '';
  const titles = (): string[] =>
    [...(page.routeNativeElement?.querySelectorAll('tbody a') ?? [])].map(
      (link) => link.textContent ?? '',
    );

  it('when the lead opens it, then the figures and the whole laboratory are there', async () => {
    await openAs('laboratory-lead');
    expect(text()).toContain('Cases of the laboratory');
    expect(titles().slice(0, 3)).toEqual([
      'Junction of Mere and Coil Road',
      'Spin on Marl Lane bend',
      'Press 4',
    ]);
    const stage = await loader.getHarnessOrNull(MatButtonHarness.with({ text: /Open a case/ }));
    expect(stage).not.toBeNull();
    expect(text()).toContain('1 without a lead investigator, 1 due within');
  });

  it('when nobody leads a case in work, then the lead can assign, an investigator cannot', async () => {
    await openAs('laboratory-lead');
    const assign = await loader.getHarness(MatButtonHarness.with({ text: 'Assign …' }));
    expect(await (await assign.host()).getAttribute('aria-label')).toBe(
      'Assign a lead investigator to Junction of Mere and Coil Road',
    );
  });

  it('when an investigator opens it, then nothing can be opened or assigned', async () => {
    await openAs('investigator');
    expect(text()).toContain('Your cases');
    expect(await loader.getAllHarnesses(MatButtonHarness)).toHaveLength(0);
  });

  it('when little time is left, then that is said in words and not by colour alone', async () => {
    await openAs('investigator');
    expect(text()).toContain('▲ 1 d');
    expect(text()).toContain('17 d');
  });

  it('when a text is typed, then the list follows and the address keeps it', async () => {
    await openAs('investigator');
    const find = page.routeNativeElement?.querySelector('input');
    if (!find) throw new Error('There is no field to find a case by');
    find.value = 'press';
    find.dispatchEvent(new Event('input'));
    await page.fixture.whenStable();
    expect(titles()).toEqual(['Press 4']);
    expect(TestBed.inject(Router).url).toBe('/cases?find=press');
  });

  it('when the address names a stage, then only its cases are shown', async () => {
    await openAs('investigator', '/cases?stage=opened');
    expect(titles()).toEqual(['Junction of Mere and Coil Road']);
    expect(text()).toContain('1 of 3 cases');
  });

  it('when it is sorted by due date, then the most pressing case is first', async () => {
    await openAs('investigator');
    const sort = await loader.getHarness(MatSortHarness);
    const [due] = await sort.getSortHeaders({ label: 'Due' });
    await due?.click();
    await page.fixture.whenStable();
    expect(titles()).toEqual([
      'Press 4',
      'Spin on Marl Lane bend',
      'Junction of Mere and Coil Road',
    ]);
  });

  it('when there are older cases, then they are read on demand', async () => {
    api.on(listCases, ({ query }) =>
      query?.after === undefined
        ? { items: [spin], next: '2026-014' }
        : { items: [press], next: null },
    );
    await openAs('investigator');
    expect(text()).toContain('1 of 1 cases read so far');
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Read older cases' }))).click();
    await page.fixture.whenStable();
    expect(titles()).toEqual(['Spin on Marl Lane bend', 'Press 4']);
    expect(api.to(listCases)[1]?.query?.after).toBe('2026-014');
  });

  it('when the server cannot be reached, then it says so and tries again when asked', async () => {
    api.on(listCases, () => new ApiProblem(0, 'The server cannot be reached'));
    await openAs('investigator');
    expect(text()).toContain('The server cannot be reached');
    api.on(listCases, () => ({ items: [spin], next: null }));
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Try again' }))).click();
    await page.fixture.whenStable();
    expect(titles()).toEqual(['Spin on Marl Lane bend']);
  });
});
