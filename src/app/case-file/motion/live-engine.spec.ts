import { beforeEach, describe, expect, it, jest } from '@jest/globals';
import { TestBed } from '@angular/core/testing';
import type { LiveReply, LiveRequest } from './live-messages';

/** A worker that answers when the test says so. */
class HeldWorker {
  onmessage: ((event: { data: LiveReply }) => void) | null = null;
  onerror: ((event: { preventDefault: () => void }) => void) | null = null;
  readonly asked: LiveRequest[] = [];
  ended = false;
  postMessage(request: LiveRequest): void {
    this.asked.push(request);
  }
  answer(code: string): void {
    this.onmessage?.({ data: { ok: false, fault: { code, field: '', message: '' } } });
  }
  terminate(): void {
    this.ended = true;
  }
}

let workers: HeldWorker[];
jest.unstable_mockModule('./engine-worker', () => ({
  startEngineWorker: () => {
    const worker = new HeldWorker();
    workers.push(worker);
    return worker;
  },
}));
const { LiveEngine } = await import('./live-engine');

const request = (stationId: string): LiveRequest => ({
  kind: 'station',
  document: { format: 'centrode.reconstruction/1', bodies: [], joints: [], stations: [] },
  marks: [],
  stationId,
  point: null,
  against: null,
  normal: null,
});
const codeOf = (reply: LiveReply | null) => (reply === null || reply.ok ? null : reply.fault.code);

describe('the live engine', () => {
  beforeEach(() => {
    workers = [];
    TestBed.configureTestingModule({ providers: [LiveEngine] });
  });

  it('opens its worker with the first request and keeps it', async () => {
    const engine = TestBed.inject(LiveEngine);
    expect(workers).toHaveLength(0);
    const first = engine.ask(request('S1'));
    workers[0].answer('one');
    expect(codeOf(await first)).toBe('one');
    const second = engine.ask(request('S2'));
    workers[0].answer('two');
    expect(codeOf(await second)).toBe('two');
    expect(workers).toHaveLength(1);
  });

  it('computes the latest of the requests that came meanwhile, and never the others', async () => {
    const engine = TestBed.inject(LiveEngine);
    const first = engine.ask(request('S1'));
    const passed = engine.ask(request('S2'));
    const latest = engine.ask(request('S3'));
    expect(await passed).toBeNull();
    workers[0].answer('one');
    expect(codeOf(await first)).toBe('one');
    workers[0].answer('three');
    expect(codeOf(await latest)).toBe('three');
    expect(workers[0].asked.map((one) => 'stationId' in one && one.stationId)).toEqual([
      'S1',
      'S3',
    ]);
  });

  it('tells of a worker that failed, and starts a fresh one with the next request', async () => {
    const engine = TestBed.inject(LiveEngine);
    const first = engine.ask(request('S1'));
    workers[0].onerror?.({ preventDefault: () => undefined });
    expect(codeOf(await first)).toBe('failed');
    const second = engine.ask(request('S1'));
    workers[1].answer('one');
    expect(codeOf(await second)).toBe('one');
    expect(workers[0].ended).toBe(true);
  });

  it('ends the worker with its section', () => {
    const engine = TestBed.inject(LiveEngine);
    void engine.ask(request('S1'));
    TestBed.resetTestingModule();
    expect(workers[0].ended).toBe(true);
  });
});
