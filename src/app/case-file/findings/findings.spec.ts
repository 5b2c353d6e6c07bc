import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatRadioButtonHarness } from '@angular/material/radio/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { type Findings as Record, editFindings, readFindings } from '#shared/contracts/findings';
import { FakeApi } from '../../../../test/web/fake-api';
import { openCaseFile } from '../../../../test/web/open-case';
import { caseFileOf, findingsOf } from '../../../../test/web/records';
import { ApiProblem } from '../../core/api/api-problem';
import { Findings } from './findings';

describe('the findings', () => {
  let api: FakeApi;
  let fixture: ComponentFixture<Findings>;
  let loader: HarnessLoader;

  beforeEach(() => {
    api = new FakeApi().on(readFindings, () => findingsOf());
  });

  async function open(may = caseFileOf().may): Promise<void> {
    TestBed.configureTestingModule({
      providers: [provideRouter([]), api.provider(), openCaseFile(caseFileOf({ may })).provider],
    });
    fixture = TestBed.createComponent(Findings);
    loader = TestbedHarnessEnvironment.documentRootLoader(fixture);
    await fixture.whenStable();
  }
  const text = (): string => fixture.nativeElement.textContent;
  async function press(label: string | RegExp): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text: label }))).click();
    await fixture.whenStable();
  }
  async function type(label: string, value: string): Promise<void> {
    const field = await loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
    await (await field.getControl(MatInputHarness))?.setValue(value);
  }

  it('when they are read, then answers, figures with their range, and what is missing are shown', async () => {
    await open();
    expect(text()).toContain('About 71 km/h.');
    expect(text()).toContain('Not answered yet.');
    expect(text()).toContain('1 of 2');
    expect(text()).toContain('71 km/h');
    expect(text()).toContain('67 to 75');
    expect(text()).toContain('19.8 m/s');
  });

  it('when the case is not theirs to work on, then nothing can be edited', async () => {
    await open({ work: false, custody: false, direct: false, assign: true });
    expect(await loader.getHarnessOrNull(MatButtonHarness.with({ text: /Edit/ }))).toBeNull();
  });

  it('when they are saved, then choices are sent, not values, with the version that was edited', async () => {
    api.on(editFindings, ({ body }) => ({ ...findingsOf(), against: body.against, version: 4 }));
    await open();
    await press(/Edit the findings/);
    await type('Strongest points against', 'The road dried.');
    await press('Save the findings');
    const [sent] = api.to(editFindings);
    expect(sent?.ifMatch).toBe(3);
    expect(sent?.body.against).toBe('The road dried.');
    expect(Object.keys(sent?.body.figures[0] ?? {}).sort()).toEqual([
      'body',
      'branch',
      'computation',
      'point',
      'quantity',
    ]);
    expect(text()).toContain('Version 4');
  });

  it('when somebody else saved meanwhile, then both versions are shown and the choice is saved', async () => {
    const theirs: Record = findingsOf({
      dependsOn: 'Theirs.',
      against: 'Also theirs.',
      version: 4,
    });
    api.on(editFindings, ({ ifMatch, body }) =>
      ifMatch === 3
        ? new ApiProblem(412, 'Changed by somebody else', '', [], theirs)
        : { ...theirs, dependsOn: body.dependsOn, against: body.against, version: 5 },
    );
    await open();
    await press(/Edit the findings/);
    await type('What these depend on most', 'Mine.');
    await press('Save the findings');
    expect(text()).toContain('Somebody else saved this version of the findings');
    expect(text()).toContain('Theirs.');
    const save = await loader.getHarness(MatButtonHarness.with({ text: 'Save what was chosen' }));
    expect(await save.isDisabled()).toBe(true);
    await (await loader.getHarness(MatRadioButtonHarness.with({ label: 'yours' }))).check();
    await press('Save what was chosen');
    const last = api.to(editFindings).at(-1);
    expect(last?.ifMatch).toBe(4);
    expect(last?.body.dependsOn).toBe('Mine.');
    expect(last?.body.against).toBe('Also theirs.');
  });

  it('when work is not saved, then leaving asks', async () => {
    await open();
    expect(fixture.componentInstance.hasUnsavedWork()).toBe(false);
    await press(/Edit the findings/);
    await type('Strongest points against', 'Half a sentence');
    expect(fixture.componentInstance.hasUnsavedWork()).toBe(true);
  });
});
