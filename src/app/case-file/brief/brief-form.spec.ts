import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { MatRadioButtonHarness } from '@angular/material/radio/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { editBrief } from '#shared/contracts/cases';
import { FakeApi } from '../../../../test/web/fake-api';
import { openCaseFile } from '../../../../test/web/open-case';
import { caseFileOf } from '../../../../test/web/records';
import { ApiProblem } from '../../core/api/api-problem';
import { BriefForm } from './brief-form';

const file = caseFileOf({ xAxisBearing: 1.0908 });

describe('the brief', () => {
  let api: FakeApi;
  let fixture: ComponentFixture<BriefForm>;
  let loader: HarnessLoader;

  beforeEach(async () => {
    api = new FakeApi().on(editBrief, ({ body }) => ({ ...file, ...body, version: 5 }));
    TestBed.configureTestingModule({ providers: [api.provider(), openCaseFile(file).provider] });
    fixture = TestBed.createComponent(BriefForm);
    loader = TestbedHarnessEnvironment.documentRootLoader(fixture);
    await fixture.whenStable();
  });

  async function field(label: string): Promise<MatFormFieldHarness> {
    return loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
  }
  async function type(label: string, value: string): Promise<void> {
    await (await (await field(label)).getControl(MatInputHarness))?.setValue(value);
  }
  async function press(label: string): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text: label }))).click();
    await fixture.whenStable();
  }

  it('when nothing was changed, then nothing is sent', async () => {
    expect(fixture.componentInstance.isChanged()).toBe(false);
    await press('Save the brief');
    expect(api.to(editBrief)).toHaveLength(0);
  });

  it('when a field was changed, then that field alone is sent with the version', async () => {
    await type('Place', 'Marl Lane, at the milestone');
    await press('Save the brief');
    const [sent] = api.to(editBrief);
    expect(sent?.body).toEqual({ place: 'Marl Lane, at the milestone' });
    expect(sent?.ifMatch).toBe(4);
  });

  it('when a bearing is typed, then it is kept in radians; nonsense is refused beside the field', async () => {
    await type('Bearing of the scene’s x axis', 'north-east');
    await press('Save the brief');
    expect(api.to(editBrief)).toHaveLength(0);
    expect(await (await field('Bearing of the scene’s x axis')).hasErrors()).toBe(true);
    await type('Bearing of the scene’s x axis', '90 deg');
    await press('Save the brief');
    expect(api.to(editBrief)[0]?.body.xAxisBearing).toBeCloseTo(Math.PI / 2, 12);
  });

  it('when both changed the same field, then it is asked; the other changes of both are kept', async () => {
    const theirs = { ...file, place: 'Below the quarry', commissionedBy: 'The court', version: 5 };
    api.on(editBrief, ({ ifMatch, body }) =>
      ifMatch === 4
        ? new ApiProblem(412, 'Changed by somebody else', '', [], theirs)
        : { ...theirs, ...body, version: 6 },
    );
    await type('Place', 'At the milestone');
    await type('Jurisdiction', 'Tarn crown court');
    await press('Save the brief');
    expect(fixture.nativeElement.textContent).toContain('Below the quarry');
    await (await loader.getHarness(MatRadioButtonHarness.with({ label: 'theirs' }))).check();
    await press('Save what was chosen');
    const last = api.to(editBrief).at(-1);
    expect(last?.ifMatch).toBe(5);
    expect(last?.body).toEqual({ jurisdiction: 'Tarn crown court' });
  });
});
