import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatErrorHarness, MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { MatRadioButtonHarness } from '@angular/material/radio/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import type { Mark } from '#shared/contracts/survey';
import { ApiProblem } from '../../core/api/api-problem';
import { MarkForm } from './mark-form';
import { SurveyMarks } from './survey-marks';
import { aMark, FakeServer, surveyProviders } from './testing';

let server: FakeServer;
let fixture: ComponentFixture<MarkForm>;
let loader: HarnessLoader;

beforeEach(() => {
  server = new FakeServer()
    .answer('GET', 'marks', { items: [], imports: [] })
    .answer('GET', 'mark-changes', { items: [] });
  TestBed.configureTestingModule({ providers: [...surveyProviders(server), SurveyMarks] });
});

function open(mark: Mark | null): void {
  fixture = TestBed.createComponent(MarkForm);
  fixture.componentRef.setInput('mark', mark);
  loader = TestbedHarnessEnvironment.loader(fixture);
}
const field = async (label: string): Promise<MatInputHarness> => {
  const found = await loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
  const input = await found.getControl(MatInputHarness);
  if (!input) throw new Error(`no field ${label}`);
  return input;
};
const type = async (label: string, text: string): Promise<void> =>
  (await field(label)).setValue(text);
const press = async (text: string | RegExp): Promise<void> =>
  (await loader.getHarness(MatButtonHarness.with({ text }))).click();
const errors = async (): Promise<string[]> =>
  Promise.all((await loader.getAllHarnesses(MatErrorHarness)).map((error) => error.getText()));

describe('the form of a mark', () => {
  it('enters a mark, lengths in the units that are typed', async () => {
    open(null);
    server.answer('POST', 'marks', aMark());
    await type('Label', '101');
    await type('x', '12.5');
    await type('y', '-3250 mm');
    await type('Standard uncertainty along x', '20 mm');
    await press('Enter the mark');
    expect(server.sent).toHaveLength(1);
    expect(server.sent[0].request.body).toMatchObject({
      label: '101',
      at: [12.5, -3.25],
      sigma: [0.02, 0.02],
      raw: 'x: 12.5; y: -3250 mm; uncertainty x: 20 mm',
    });
    // Ready for the next one, which is mostly measured the same way.
    expect(await (await field('Label')).getValue()).toBe('');
    expect(await (await field('Standard uncertainty along x')).getValue()).toBe('20 mm');
  });

  it('sends nothing without an uncertainty or its unit', async () => {
    open(null);
    await type('Label', '101');
    await type('x', '1');
    await type('y', '2');
    await press('Enter the mark');
    expect(await errors()).toEqual(['Type a value.']);
    await type('Standard uncertainty along x', '20');
    await press('Enter the mark');
    expect((await errors())[0]).toMatch(/^Write the unit too/);
    expect(server.sent).toEqual([]);
  });

  it('asks what a comma means and takes the answer', async () => {
    open(null);
    await type('x', '1,250');
    const choices = await loader.getAllHarnesses(MatButtonHarness.with({ text: /^1/ }));
    expect(await Promise.all(choices.map((choice) => choice.getText()))).toEqual(['1.250', '1250']);
    await choices[0].click();
    expect(await (await field('x')).getValue()).toBe('1.250');
  });

  it('shows what the server says beside the field', async () => {
    open(null);
    server.answer(
      'POST',
      'marks',
      new ApiProblem(422, 'Please correct', '', [{ field: 'label', message: 'stands already' }]),
    );
    await type('Label', '101');
    await type('x', '1');
    await type('y', '2');
    await type('Standard uncertainty along x', '2 cm');
    await press('Enter the mark');
    expect(await errors()).toEqual(['Stands already.']);
    expect(await (await field('Label')).getValue()).toBe('101');
  });

  it('changes a mark with its reason, from the version that was opened', async () => {
    open(aMark({ version: 3 }));
    server.answer('PUT', 'marks/:markId', aMark({ version: 4 }));
    await type('x', '12.6 m');
    await press('Save the change');
    expect(await errors()).toEqual(['This is needed.']);
    await type('Reason for the change', 'Read again');
    await press('Save the change');
    expect(server.sent[0].request).toMatchObject({
      ifMatch: 3,
      body: { at: [12.6, -3.25], reason: 'Read again' },
    });
  });

  it('shows both versions when somebody else saved, and loses nothing that was typed', async () => {
    open(aMark());
    const theirs = aMark({ at: [12.9, -3.25], note: 'by the kerb', version: 2 });
    server.answer('PUT', 'marks/:markId', new ApiProblem(412, 'Changed', '', [], theirs));
    await type('x', '12.6 m');
    await type('Height', '0.1 m');
    await type('Reason for the change', 'Read again');
    await press('Save the change');
    const text = (fixture.nativeElement as HTMLElement).textContent;
    expect(text).toMatch(/Somebody else saved this mark/);
    expect(text).toMatch(/12\.6 m\s*12\.9 m/);
    expect(await (await field('x')).getValue()).toBe('12.6 m');
    server.answer('PUT', 'marks/:markId', aMark({ version: 3 }));
    await (await loader.getHarness(MatRadioButtonHarness.with({ label: 'yours' }))).check();
    await press('Save what was chosen');
    expect(server.sent[1].request).toMatchObject({
      ifMatch: 2,
      body: { at: [12.6, -3.25], height: 0.1, note: 'by the kerb', reason: 'Read again' },
    });
  });
});
