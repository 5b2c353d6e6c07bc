import { provideHttpClient } from '@angular/common/http';
import { provideHttpClientTesting } from '@angular/common/http/testing';
import { type HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { signal } from '@angular/core';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { provideRouter } from '@angular/router';
import { describe, expect, it } from '@jest/globals';
import type { Exhibit } from '#shared/contracts/exhibits';
import { Session } from '../../core/session/session';
import { Dialogs } from '../../ui/confirm-dialog/dialogs';
import { CurrentCase } from '../current-case';
import { ExhibitDetail } from './exhibit-detail';
import { caseId, otherId, ownId, testExhibit, testFile, testOffer } from './testing';
import { Uploads } from './uploads';

interface Shown {
  readonly fixture: ComponentFixture<ExhibitDetail>;
  readonly loader: HarnessLoader;
  /** Requests that dialogs were opened with. */
  readonly asked: unknown[];
  readonly text: () => string;
}

async function show(exhibit: Exhibit, custody = true, accountId = ownId): Promise<Shown> {
  const asked: unknown[] = [];
  TestBed.configureTestingModule({
    providers: [
      provideHttpClient(),
      provideHttpClientTesting(),
      provideRouter([]),
      Uploads,
      {
        provide: CurrentCase,
        useValue: { id: signal(caseId), may: signal({ custody }) },
      },
      { provide: Session, useValue: { account: signal({ id: accountId }) } },
      {
        provide: Dialogs,
        useValue: {
          open: (_load: unknown, request: unknown) => {
            asked.push(request);
            return Promise.resolve(undefined);
          },
        },
      },
    ],
  });
  const fixture = TestBed.createComponent(ExhibitDetail);
  fixture.componentRef.setInput('exhibit', exhibit);
  await fixture.whenStable();
  return {
    fixture,
    loader: TestbedHarnessEnvironment.loader(fixture),
    asked,
    text: () => (fixture.nativeElement as HTMLElement).textContent ?? '',
  };
}

const buttons = async ({ loader }: Shown): Promise<string[]> =>
  Promise.all((await loader.getAllHarnesses(MatButtonHarness)).map((button) => button.getText()));

describe('one exhibit', () => {
  it('when I hold it, then I can hand it over and record what was done', async () => {
    const shown = await show(testExhibit());
    expect(await buttons(shown)).toEqual(
      expect.arrayContaining(['Hand over …', 'Record what was done …', 'Whole custody']),
    );
    expect(shown.text()).toContain('Held by Ines Farrow, cage 2; sealed with S-7.');
    const button = await shown.loader.getHarness(MatButtonHarness.with({ text: 'Hand over …' }));
    await button.click();
    expect(shown.asked).toEqual([{ caseId, exhibit: testExhibit() }]);
  });

  it('when somebody else holds it, then I can do neither', async () => {
    const shown = await show(testExhibit(), true, otherId);
    const names = await buttons(shown);
    expect(names).not.toContain('Hand over …');
    expect(names).not.toContain('Record what was done …');
  });

  it('when it is offered to me, then I accept or refuse that very offer', async () => {
    const exhibit = testExhibit({ custody: testOffer() });
    const shown = await show(exhibit, true, otherId);
    expect(await buttons(shown)).toEqual(expect.arrayContaining(['Accept …', 'Refuse …']));
    await (await shown.loader.getHarness(MatButtonHarness.with({ text: 'Accept …' }))).click();
    expect(shown.asked).toEqual([
      { caseId, exhibit, pending: exhibit.custody.pending, answer: 'accept' },
    ]);
  });

  it('when I offered it, then I can withdraw the offer and nothing else', async () => {
    const shown = await show(testExhibit({ custody: testOffer() }));
    const names = await buttons(shown);
    expect(names).toContain('Withdraw the offer …');
    expect(names).not.toContain('Hand over …');
    expect(shown.text()).toContain('Until it is accepted, Ines Farrow answers for it.');
  });

  it('when an offer waits for more than two days, then that is said', async () => {
    const old = testOffer({ offeredAt: '2020-01-01T00:00:00.000000Z' });
    expect((await show(testExhibit({ custody: old }))).text()).toContain('more than two days');
  });

  it('when I may not work on custody, then there is no place for files', async () => {
    const shown = await show(testExhibit(), false);
    expect(await buttons(shown)).not.toContain('Choose files');
    expect(shown.text()).toContain('This exhibit has no file.');
  });

  it('when it is sensitive, then its picture is blurred until asked for', async () => {
    const shown = await show(testExhibit({ sensitive: true, files: [testFile()] }));
    const address = (): string =>
      (shown.fixture.nativeElement as HTMLElement).querySelector('img')?.getAttribute('src') ?? '';
    expect(address()).toContain('size=thumbnail-blurred');
    await (await shown.loader.getHarness(MatButtonHarness.with({ text: 'Show it' }))).click();
    expect(address()).toMatch(/size=thumbnail$/);
    await (await shown.loader.getHarness(MatButtonHarness.with({ text: 'Blur' }))).click();
    expect(address()).toContain('size=thumbnail-blurred');
  });

  it('when a picture leaves doubts, then each is told in words', async () => {
    const shown = await show(testExhibit({ files: [testFile({ sameContentAs: ['2026-014/2'] })] }));
    expect(shown.text()).toContain('The camera wrote the time without its zone.');
    expect(shown.text()).toContain('The same content is in 2026-014/2.');
  });

  it('when the stated hash does not agree, then that stands beside the file', async () => {
    const file = testFile({ statedSha256: '00'.repeat(32) });
    const shown = await show(testExhibit({ files: [file] }));
    expect(shown.text()).toContain('The hash that the giver stated does not agree');
  });
});
