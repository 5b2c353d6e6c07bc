import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { MatRadioButtonHarness } from '@angular/material/radio/testing';
import { MatSelectHarness } from '@angular/material/select/testing';
import { provideRouter } from '@angular/router';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { type Release, releaseCase } from '#shared/contracts/disclosure';
import { listExhibits } from '#shared/contracts/exhibits';
import { readFindings } from '#shared/contracts/findings';
import { FakeApi } from '../../../../test/web/fake-api';
import { openCaseFile } from '../../../../test/web/open-case';
import { caseFileOf, exhibitOf, findingsOf, newId } from '../../../../test/web/records';
import { ApiProblem } from '../../core/api/api-problem';
import { ReleaseForm } from './release-form';

const file = caseFileOf();
const made: Release = {
  id: newId(),
  number: 1,
  partyId: file.parties[0]?.id ?? '',
  party: 'H. Marlow',
  releasedAt: '2026-12-01T12:00:00.000Z',
  releasedBy: 'E. Varo',
  exhibits: [],
  withheld: [],
  computations: [],
  archive: { state: 'building', size: null, sha256: null, message: '' },
  withdrawnAt: null,
  openings: [],
};

describe('the release form', () => {
  let api: FakeApi;
  let fixture: ComponentFixture<ReleaseForm>;
  let loader: HarnessLoader;
  let released: Release | null;

  beforeEach(async () => {
    released = null;
    api = new FakeApi()
      .on(listExhibits, () => ({
        items: [exhibitOf('2026-014/1'), exhibitOf('2026-014/2', { sensitive: true })],
      }))
      .on(readFindings, () => findingsOf())
      .on(releaseCase, () => made);
    TestBed.configureTestingModule({
      providers: [provideRouter([]), api.provider(), openCaseFile(file).provider],
    });
    fixture = TestBed.createComponent(ReleaseForm);
    fixture.componentInstance.released.subscribe((release) => (released = release));
    loader = TestbedHarnessEnvironment.documentRootLoader(fixture);
    await fixture.whenStable();
  });

  const text = (): string => fixture.nativeElement.textContent;
  async function press(label: string): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text: label }))).click();
    await fixture.whenStable();
  }
  async function select(label: string, option: string | RegExp): Promise<void> {
    const field = await loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
    await (await field.getControl(MatSelectHarness))?.clickOptions({ text: option });
  }
  async function type(label: string, value: string): Promise<void> {
    const field = await loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
    await (await field.getControl(MatInputHarness))?.setValue(value);
  }
  async function decide(index: number, label: 'release' | 'withhold'): Promise<void> {
    const buttons = await loader.getAllHarnesses(MatRadioButtonHarness.with({ label }));
    await buttons[index]?.check();
    await fixture.whenStable();
  }
  async function sign(): Promise<void> {
    await select('Party', /Marlow/);
    await type('Your password', 'drawing table 26');
  }

  it('when an exhibit is not decided, then nothing is released and the exhibit is pointed out', async () => {
    await sign();
    await press('Release');
    expect(api.to(releaseCase)).toHaveLength(0);
    expect(text()).toContain('Release it, or withhold it with a reason.');
  });

  it('when all that is not sensitive is released at once, then the sensitive item still waits', async () => {
    await press('Release all that are not sensitive');
    expect(text()).toContain('1 released, 0 withheld, 1 to decide.');
  });

  it('when an item is withheld, then its reason goes into the release', async () => {
    await sign();
    await decide(0, 'release');
    await decide(1, 'withhold');
    await press('Release');
    expect(text()).toContain('Say why it is withheld.');
    await select('Reason for exhibit 2026-014/2', 'sensitive');
    await type('Explanation, as the party will read it', 'Shows an injured person.');
    await press('Release');
    expect(api.to(releaseCase)[0]?.body).toEqual({
      partyId: file.parties[0]?.id,
      password: 'drawing table 26',
      exhibits: ['2026-014/1'],
      withheld: [
        { exhibit: '2026-014/2', reason: 'sensitive', explanation: 'Shows an injured person.' },
      ],
    });
    expect(released).toEqual(made);
  });

  it('when an answer is lost and the button pressed again, then it is the same act', async () => {
    api.on(releaseCase, () => new ApiProblem(0, 'The server cannot be reached'));
    await sign();
    await decide(0, 'release');
    await decide(1, 'release');
    await press('Release');
    expect(text()).toContain('The server cannot be reached');
    api.on(releaseCase, () => made);
    await press('Release');
    const [first, second] = api.to(releaseCase);
    expect(first?.idempotencyKey).toBeTruthy();
    expect(second?.idempotencyKey).toBe(first?.idempotencyKey);
    expect(released).toEqual(made);
  });

  it('when questions have no answer, then the releasing person is told', () => {
    expect(text()).toContain('1 of 2 questions have no answer.');
  });
});
