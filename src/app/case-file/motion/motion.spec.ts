import { afterEach, beforeEach, describe, expect, it, jest } from '@jest/globals';
import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { signal } from '@angular/core';
import { type ComponentFixture, DeferBlockBehavior, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { provideRouter } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import type { Reconstruction } from '#shared/contracts/motion';
import type { Mark } from '#shared/contracts/survey';
import { CurrentCase } from '../current-case';
import { emptyDocument, newStation } from './document-edits';
import { answerLive } from './live-computation';
import type { LiveReply, LiveRequest } from './live-messages';

/** The engine without a worker: it answers in the next task. */
class PlainWorker {
  onmessage: ((event: { data: LiveReply }) => void) | null = null;
  onerror = null;
  postMessage(request: LiveRequest): void {
    queueMicrotask(() => this.onmessage?.({ data: answerLive(request) }));
  }
  terminate(): void {
    this.onmessage = null;
  }
}
jest.unstable_mockModule('./engine-worker', () => ({ startEngineWorker: () => new PlainWorker() }));
const { Motion } = await import('./motion');

const caseId = '0199d1a0-0000-7000-8000-0000000000c1';
const id = (n: number) => `0199d1a0-0000-7000-8000-00000000000${n}`;
const mark = (n: number, x: number): Mark => ({
  id: id(n),
  label: `M${n}`,
  kind: 'tyre mark',
  at: [x, 0],
  covariance: [
    [1e-4, 0],
    [0, 1e-4],
  ],
  height: null,
  trace: null,
  order: null,
  note: '',
  source: { kind: 'entry', by: 'E. Varo', raw: '' },
  version: 1,
});
const exact: [number, number] = [0, 0];

/** A bar of 2 m along x. Its end A moves at 4 m/s along +y, ω is 3 rad/s: its end B at 4 + 3·2 = 10 m/s. */
const made: Reconstruction = {
  id: id(9),
  name: 'A',
  assumption: 'End A made M1.',
  version: 3,
  changedAt: '2026-11-20T08:00:00.000Z',
  changedBy: 'E. Varo',
  document: {
    ...emptyDocument,
    bodies: [
      {
        id: 'bar',
        name: 'bar',
        points: [
          { id: 'A', name: 'end A', at: exact, sigma: exact },
          { id: 'B', name: 'end B', at: [2, 0], sigma: exact },
        ],
        outline: [],
      },
    ],
    stations: [
      {
        ...newStation('S1', 'first mark'),
        marks: [
          { markId: id(1), body: 'bar', point: 'A', position: true, direction: false },
          { markId: id(2), body: 'bar', point: 'B', position: true, direction: false },
        ],
        knowns: [
          {
            quantity: 'velocity',
            id: 'K1',
            at: { body: 'bar', point: 'A' },
            magnitude: { value: 4, sigma: 0.1 },
            direction: { value: Math.PI / 2, sigma: 0.01 },
            line: false,
            basis: 'Recorder.',
          },
          {
            quantity: 'angular-velocity',
            id: 'K2',
            body: 'bar',
            value: { value: 3, sigma: 0.1 },
            basis: 'Encoder.',
          },
        ],
      },
    ],
  },
};

describe('the motion section', () => {
  let http: HttpTestingController;
  let fixture: ComponentFixture<unknown>;
  let loader: HarnessLoader;

  beforeEach(() => {
    const file = { speedUnit: 'm/s', xAxisBearing: null };
    TestBed.configureTestingModule({
      deferBlockBehavior: DeferBlockBehavior.Manual,
      providers: [
        provideHttpClient(),
        provideHttpClientTesting(),
        provideRouter([{ path: 'motion', component: Motion }]),
        {
          provide: CurrentCase,
          useValue: {
            id: signal(caseId),
            file: signal(file),
            may: signal({ work: true }),
            reload: () => undefined,
          },
        },
      ],
    });
    http = TestBed.inject(HttpTestingController);
  });
  afterEach(() => http.verify());

  async function open(reconstructions: Reconstruction[], query = ''): Promise<void> {
    const harness = await RouterTestingHarness.create(`/motion${query}`);
    fixture = harness.fixture;
    loader = TestbedHarnessEnvironment.loader(fixture);
    const base = `/api/cases/${caseId}`;
    http.expectOne(`${base}/reconstructions`).flush({ items: reconstructions });
    http.expectOne(`${base}/marks`).flush({ items: [mark(1, 0), mark(2, 2)], imports: [] });
    http.expectOne(`${base}/computations`).flush({ items: [] });
    await settle();
  }

  /** Some turns of the event loop, also while a request is open. */
  async function turns(): Promise<void> {
    for (let i = 0; i < 10; i++) await new Promise((done) => setTimeout(done));
  }

  /** Until the answer is there and shown. */
  async function settle(): Promise<void> {
    for (let i = 0; i < 5; i++) {
      await new Promise((done) => setTimeout(done));
      await fixture.whenStable();
    }
  }

  const text = () => String((fixture.nativeElement as HTMLElement).textContent);
  const speeds = () =>
    [...(fixture.nativeElement as HTMLElement).querySelectorAll('app-speed-table tbody tr')].map(
      (row) => row.querySelector('.value')?.textContent?.trim(),
    );
  const press = async (label: string) => {
    const button = await loader.getHarness(MatButtonHarness.with({ text: new RegExp(label) }));
    await button.click();
    await settle();
  };

  it('when nothing is there yet, then it leads to the first reconstruction', async () => {
    await open([]);
    expect(text()).toContain('No reconstruction yet.');
    await press('Begin a reconstruction');
    const begun = http.expectOne({ method: 'POST', url: `/api/cases/${caseId}/reconstructions` });
    expect(begun.request.body).toMatchObject({ name: 'Alternative A', document: emptyDocument });
    begun.flush({ ...made, document: emptyDocument }, { status: 201, statusText: 'Created' });
    await settle();
    expect(text()).toContain('add the first body');
    expect(text()).toContain('Bodies and their points');
  });

  it('when a station is on the table, then the sheet gives every point, the fastest first', async () => {
    await open([made], '?point=bar.B');
    expect(text()).toContain('Determined.');
    // 1.96 times the uncertainty of the sum is about 0.4: one decimal.
    expect(speeds()).toEqual(['10.0', '4.00']);
    expect(text()).toContain('known, both');
  });

  it('when a known is edited, then the sheet follows and the draft waits to be saved', async () => {
    await open([made], '?point=bar.B&panel=knowns&item=K2');
    const field = await loader.getHarness(
      MatInputHarness.with({ selector: 'app-known-form input' }),
    );
    await field.setValue('5 rad/s');
    await settle();
    expect(speeds()[0]).toBe('14.0');
    expect(text()).toContain('Not saved yet');

    await press('Save');
    const put = http.expectOne(`/api/cases/${caseId}/reconstructions/${made.id}`);
    expect(put.request.headers.get('If-Match')).toBe('"3"');
    const { body } = put.request as { body: Pick<Reconstruction, 'document' | 'name'> };
    expect(body.document.stations[0].knowns[1]).toMatchObject({ value: { value: 5, sigma: 0.1 } });
    put.flush({ ...made, ...body, version: 4 });
    await settle();
    expect(text()).toContain('Saved');
  });

  it('when somebody else saved meanwhile, then both versions are shown', async () => {
    await open([made], '?panel=alternatives');
    const field = await loader.getHarness(
      MatInputHarness.with({ selector: 'app-alternatives-editor input' }),
    );
    await field.setValue('My name');
    await press('Save');
    http.expectOne(`/api/cases/${caseId}/reconstructions/${made.id}`).flush(
      {
        type: 'about:blank',
        title: 'Changed by somebody else',
        status: 412,
        current: { ...made, name: 'Their name', version: 4 },
      },
      { status: 412, statusText: 'Precondition Failed' },
    );
    await settle();
    expect(text()).toContain('My name');
    expect(text()).toContain('Their name');
  });

  it('when a mark is moved for trial, then it says so and nothing can be recorded', async () => {
    await open([made], `?panel=marks&mark=${id(2)}`);
    const [x] = await loader.getAllHarnesses(
      MatInputHarness.with({ selector: 'app-marks-editor app-quantity-field input' }),
    );
    await x.setValue('2.01 m');
    await settle();
    expect(text()).toContain('M2 moved from where it was measured');
    const record = await loader.getHarness(MatButtonHarness.with({ text: /Record computation/ }));
    expect(await record.isDisabled()).toBe(true);
    await press('Put back');
    expect(text()).not.toContain('moved from where it was measured');
    expect(await record.isDisabled()).toBe(false);
  });

  it('when a station is recorded, then the saved version is named to the server', async () => {
    await open([made]);
    await press('Record computation');
    const post = http.expectOne(`/api/cases/${caseId}/reconstructions/${made.id}/computations`);
    expect(post.request.body).toEqual({ stationId: 'S1', version: 3 });
    const hash = 'a'.repeat(64);
    post.flush(
      {
        hash,
        kind: 'station',
        reconstructionId: made.id,
        reconstructionName: 'A',
        stationId: 'S1',
        stationName: 'first mark',
        status: 'determined',
        recordedAt: '2026-12-01T08:00:00.000Z',
        recordedBy: 'E. Varo',
      },
      { status: 201, statusText: 'Created' },
    );
    await turns();
    http.expectOne(`/api/cases/${caseId}/computations/${hash}`).flush({});
    await settle();
    expect(text()).toContain(hash);
  });

  it('when the marks do not fix the pose, then the sheet says what is missing', async () => {
    const [station] = made.document.stations;
    const lone = { ...station, marks: station.marks.slice(0, 1) };
    await open([{ ...made, document: { ...made.document, stations: [lone] } }]);
    expect(text()).toContain('The answer ends here.');
  });
});
