import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import type { Type } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MAT_DIALOG_DATA, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { MatSelectHarness } from '@angular/material/select/testing';
import { describe, expect, it } from '@jest/globals';
import { caseId, otherId, testExhibit, testOffer } from '../exhibits/testing';
import { AnswerDialog } from './answer-dialog';
import { HandOverDialog } from './hand-over-dialog';

const exhibit = testExhibit({ custody: testOffer() });

function open(dialog: Type<unknown>, data: object) {
  const closed: unknown[] = [];
  TestBed.configureTestingModule({
    providers: [
      provideHttpClient(),
      provideHttpClientTesting(),
      { provide: MAT_DIALOG_DATA, useValue: data },
      { provide: MatDialogRef, useValue: { close: (value: unknown) => closed.push(value) } },
    ],
  });
  const fixture = TestBed.createComponent(dialog);
  fixture.detectChanges();
  const http = TestBed.inject(HttpTestingController);
  const loader = TestbedHarnessEnvironment.documentRootLoader(fixture);
  return { loader, http, closed, stable: () => fixture.whenStable() };
}

const field = (loader: HarnessLoader, label: string | RegExp) =>
  loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));

async function type(loader: HarnessLoader, label: string | RegExp, text: string): Promise<void> {
  const input = await (await field(loader, label)).getControl(MatInputHarness);
  await input?.setValue(text);
}

const press = async (loader: HarnessLoader, text: string): Promise<void> =>
  (await loader.getHarness(MatButtonHarness.with({ text }))).click();

describe('the answer to a hand-over', () => {
  const data = { caseId, exhibit, pending: exhibit.custody.pending, answer: 'accept' };
  const url = `/api/cases/${caseId}/exhibits/${exhibit.id}/answer`;

  it('when it is signed, then the very offer is accepted with one key', async () => {
    const { loader, http } = open(AnswerDialog, data);
    await type(loader, 'Where you put it', 'bench 3');
    await type(loader, 'Your password', 'drawing table 26');
    await press(loader, 'Accept and sign');
    const sent = http.expectOne(url);
    expect(sent.request.body).toMatchObject({
      sequence: 4,
      answer: 'accepted',
      location: 'bench 3',
      password: 'drawing table 26',
    });
    expect(sent.request.headers.get('Idempotency-Key')).toMatch(/^[0-9a-f-]{36}$/);
    expect(sent.request.headers.get('Time-Zone')).not.toBeNull();
  });

  it('when the password is not right, then the message stands beside it', async () => {
    const { loader, http, closed, stable } = open(AnswerDialog, data);
    await type(loader, 'Your password', 'guessed');
    await press(loader, 'Accept and sign');
    http.expectOne(url).flush(
      {
        type: 'about:blank',
        title: 'Please correct',
        status: 422,
        errors: [{ field: 'password', message: 'the password is not right' }],
      },
      { status: 422, statusText: '' },
    );
    await stable();
    expect(await (await field(loader, 'Your password')).getTextErrors()).toEqual([
      'The password is not right.',
    ]);
    expect(closed).toEqual([]);
  });

  it('when there is no password, then nothing is sent', async () => {
    const { loader, http } = open(AnswerDialog, data);
    await press(loader, 'Accept and sign');
    http.expectNone(url);
    expect(await (await field(loader, 'Your password')).hasErrors()).toBe(true);
  });
});

describe('the offer of an item', () => {
  const item = testExhibit();
  const url = `/api/cases/${caseId}/exhibits/${item.id}/hand-over`;

  it('when it goes by courier, then its tracking number is asked for and sent', async () => {
    const { loader, http, stable } = open(HandOverDialog, { caseId, exhibit: item });
    http
      .expectOne(`/api/cases/${caseId}/custody/receivers`)
      .flush({ items: [{ id: otherId, name: 'A. Colleague' }] });
    await stable();
    const choose = async (label: string, text: string): Promise<void> => {
      const select = await (await field(loader, label)).getControl(MatSelectHarness);
      await select?.open();
      await select?.clickOptions({ text });
    };
    await choose('To', 'A. Colleague');
    await type(loader, 'Purpose', 'measuring the tread');
    await choose('How it goes', 'by courier');
    await type(loader, 'Tracking number', 'T-42');
    await press(loader, 'Offer it');
    expect(http.expectOne(url).request.body).toMatchObject({
      toId: otherId,
      purpose: 'measuring the tread',
      method: 'courier',
      tracking: 'T-42',
      sealNumber: 'S-7',
      happenedAt: null,
    });
  });

  it('when receiver or purpose are missing, then nothing is sent', async () => {
    const { loader, http, stable } = open(HandOverDialog, { caseId, exhibit: item });
    http.expectOne(`/api/cases/${caseId}/custody/receivers`).flush({ items: [] });
    await stable();
    await press(loader, 'Offer it');
    http.expectNone(url);
    expect(await (await field(loader, 'Purpose')).getTextErrors()).toEqual(['This is needed.']);
  });
});
