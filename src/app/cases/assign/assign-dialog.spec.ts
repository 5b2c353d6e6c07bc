import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MAT_DIALOG_DATA, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { MatRadioButtonHarness } from '@angular/material/radio/testing';
import { MatSelectHarness } from '@angular/material/select/testing';
import { beforeEach, describe, expect, it } from '@jest/globals';
import { listAccounts } from '#shared/contracts/accounts';
import { type Assignment, assign, readCase } from '#shared/contracts/cases';
import { FakeApi } from '../../../../test/web/fake-api';
import { accountOf, caseFileOf } from '../../../../test/web/records';
import { ApiProblem } from '../../core/api/api-problem';
import { AssignDialog, type AssignRequest } from './assign-dialog';

const file = caseFileOf();
const oduya = accountOf('investigator', 'J. Oduya');
const thorne = accountOf('attorney', 'A. Thorne');

describe('the assignment', () => {
  let api: FakeApi;
  let fixture: ComponentFixture<AssignDialog>;
  let loader: HarnessLoader;
  let closedWith: unknown;

  beforeEach(async () => {
    closedWith = 'open';
    api = new FakeApi()
      .on(readCase, () => file)
      .on(listAccounts, () => ({ items: [oduya, thorne] }))
      .on(assign, ({ body }) => ({
        ...(body as Assignment),
        id: oduya.id,
        name: 'J. Oduya',
        assignedAt: '',
      }));
    TestBed.configureTestingModule({
      providers: [
        api.provider(),
        {
          provide: MAT_DIALOG_DATA,
          useValue: {
            caseId: file.id,
            role: 'lead-investigator',
            loads: [{ name: 'J. Oduya', count: 2, share: 1 }],
          } satisfies AssignRequest,
        },
        { provide: MatDialogRef, useValue: { close: (value: unknown) => (closedWith = value) } },
      ],
    });
    fixture = TestBed.createComponent(AssignDialog);
    loader = TestbedHarnessEnvironment.documentRootLoader(fixture);
    await fixture.whenStable();
  });

  async function field(label: string): Promise<MatFormFieldHarness> {
    return loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
  }
  async function choose(label: string, option: RegExp | string): Promise<void> {
    const select = await (await field(label)).getControl(MatSelectHarness);
    await select?.clickOptions({ text: option });
  }
  async function type(label: string, value: string): Promise<void> {
    await (await (await field(label)).getControl(MatInputHarness))?.setValue(value);
  }
  async function declare(label: string): Promise<void> {
    await (await loader.getHarness(MatRadioButtonHarness.with({ label }))).check();
  }
  async function press(): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Assign' }))).click();
    await fixture.whenStable();
  }
  async function options(label: string): Promise<string[]> {
    const select = await (await field(label)).getControl(MatSelectHarness);
    await select?.open();
    const texts = await Promise.all(
      ((await select?.getOptions()) ?? []).map((one) => one.getText()),
    );
    await select?.close();
    return texts;
  }

  it('when the dialog opens, then people who can take the role are offered with their load', async () => {
    expect(await options('Person')).toEqual(['J. Oduya · leads 2 in work']);
  });

  it('when nothing is declared, then nothing is sent', async () => {
    await choose('Person', /Oduya/);
    await press();
    expect(api.to(assign)).toHaveLength(0);
    expect(fixture.nativeElement.textContent).toContain('Say which of the two was declared.');
  });

  it('when no conflict is declared, then the assignment is sent with the declaration', async () => {
    await choose('Person', /Oduya/);
    await declare('None');
    await type('In their words', 'I know none of the parties.');
    await press();
    expect(api.to(assign)[0]?.body).toEqual({
      accountId: oduya.id,
      role: 'lead-investigator',
      partyId: null,
      declaration: { conflict: false, statement: 'I know none of the parties.' },
    });
    expect(closedWith).toBe(true);
  });

  it('when a conflict is declared, then assigning all the same needs a reason', async () => {
    await choose('Person', /Oduya/);
    await declare('A possible conflict');
    await type('In their words', 'My brother worked for the haulier.');
    await press();
    expect(api.to(assign)).toHaveLength(0);
    expect(await (await field('Reason to assign all the same')).getTextErrors()).toEqual([
      'This is needed.',
    ]);
    await type('Reason to assign all the same', 'He left the firm ten years ago.');
    await press();
    expect(api.to(assign)[0]?.body.overrideReason).toBe('He left the firm ten years ago.');
  });

  it('when the role is attorney, then only attorneys are offered and a party is needed', async () => {
    await choose('Role in the case', 'attorney');
    expect(await options('Person')).toEqual(['A. Thorne · leads 0 in work']);
    await choose('Person', /Thorne/);
    await declare('None');
    await type('In their words', 'None.');
    await press();
    expect(await (await field('Acts for')).getTextErrors()).toEqual(['This is needed.']);
    await choose('Acts for', /Marlow/);
    await press();
    expect(api.to(assign)[0]?.body.partyId).toBe(file.parties[0]?.id);
  });

  it('when the server refuses a field, then its message is beside the field', async () => {
    api.on(
      assign,
      () =>
        new ApiProblem(422, 'Please correct', '', [
          { field: 'accountId', message: 'there is no such account' },
        ]),
    );
    await choose('Person', /Oduya/);
    await declare('None');
    await type('In their words', 'None.');
    await press();
    expect(await (await field('Person')).getTextErrors()).toEqual(['There is no such account.']);
    expect(closedWith).toBe('open');
  });
});
