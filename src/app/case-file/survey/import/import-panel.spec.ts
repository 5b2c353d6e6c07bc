import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatCheckboxHarness } from '@angular/material/checkbox/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatNativeSelectHarness } from '@angular/material/input/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { aMark, FakeServer, surveyProviders } from '../testing';
import { SurveyMarks } from '../survey-marks';
import { ImportPanel } from './import-panel';

const file = {
  id: '01930000-0000-7000-8000-0000000000f1',
  name: 'survey.csv',
  mediaType: 'text/csv',
};
const exhibit = {
  id: '01930000-0000-7000-8000-0000000000e1',
  number: '2026-014/3',
  kind: 'survey data',
  files: [file, { ...file, id: 'other', name: 'photograph.jpg', mediaType: 'image/jpeg' }],
};
let server: FakeServer;
let fixture: ComponentFixture<ImportPanel>;
let loader: HarnessLoader;

beforeEach(() => {
  server = new FakeServer()
    .answer('GET', 'marks', { items: [aMark({ label: '7' })], imports: [] })
    .answer('GET', 'mark-changes', { items: [] })
    .answer('GET', 'exhibits', { items: [exhibit] });
  TestBed.configureTestingModule({ providers: [...surveyProviders(server), SurveyMarks] });
});

async function open(text: string): Promise<void> {
  server.answer('GET', 'exhibits/:exhibitId/files/:fileId/text', {
    name: 'survey.csv',
    encoding: 'UTF-8',
    text,
  });
  fixture = TestBed.createComponent(ImportPanel);
  loader = TestbedHarnessEnvironment.loader(fixture);
  await (await select('File')).selectOptions({ text: '2026-014/3: survey.csv' });
}
const select = async (label: string): Promise<MatNativeSelectHarness> => {
  const found = await loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
  const control = await found.getControl(MatNativeSelectHarness);
  if (!control) throw new Error(`no choice ${label}`);
  return control;
};
const button = (): Promise<MatButtonHarness> =>
  loader.getHarness(MatButtonHarness.with({ text: 'Import the accepted rows' }));
const shown = (): string => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');

describe('importing a survey', () => {
  it('shows what is taken and what is not, and imports with the mapping that was shown', async () => {
    await open('Point,E [m],N [m],s [mm],Code\n1,1.5,2,20,gouge\n2,x,2,20,gouge\n7,3,4,20,K7\n');
    expect(shown()).toMatch(/1 row accepted, 2 rejected/);
    expect(shown()).toMatch(/"x" is not a number/);
    expect(shown()).toMatch(/a mark of the case has the label "7" already/);
    server.answer('POST', 'survey-imports', { accepted: 1, rejected: [{}, {}] });
    await (await button()).click();
    expect(server.sent[0].request.body).toMatchObject({
      exhibitId: exhibit.id,
      fileId: file.id,
      strict: false,
      mapping: {
        delimiter: ',',
        decimal: '.',
        unit: 'm',
        sigmaUnit: 'mm',
        label: 'Point',
        x: 'E [m]',
        y: 'N [m]',
        sigmaX: 's [mm]',
        sigmaY: null,
        sigma: null,
        kinds: { gouge: 'gouge' },
      },
    });
  });

  it('asks for what the file does not tell before it shows any row', async () => {
    await open('Point;E [m];N [m];s [mm]\n1;1,5;2,25;20\n');
    expect(shown()).toMatch(/Is the comma in "1,5" the decimal sign/);
    expect(shown()).not.toMatch(/rows accepted/);
    await (await select('Decimal sign')).selectOptions({ text: 'comma: 12,5' });
    expect(shown()).toMatch(/1 row accepted, 0 rejected/);
    expect(shown()).toMatch(/2\.250/);
  });

  it('does not import when all rows are wanted and one is rejected', async () => {
    await open('Point,E [m],N [m],s [mm]\n1,1.5,2,20\n2,1,2,\n');
    expect(await (await button()).isDisabled()).toBe(false);
    await (await loader.getHarness(MatCheckboxHarness)).check();
    expect(await (await button()).isDisabled()).toBe(true);
  });

  it('says when a file is no survey', async () => {
    await open('just a line of prose\n');
    expect(shown()).toMatch(/The file cannot be read: it has no columns/);
  });

  it('says what to do when no exhibit holds a text file', async () => {
    server.answer('GET', 'exhibits', { items: [] });
    fixture = TestBed.createComponent(ImportPanel);
    await fixture.whenStable();
    expect(shown()).toMatch(/Register the survey as an exhibit/);
  });
});
