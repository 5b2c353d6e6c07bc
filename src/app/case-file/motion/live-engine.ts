import { DestroyRef, Injectable, inject } from '@angular/core';
import type { LiveReply, LiveRequest } from './live-messages';
import { startEngineWorker } from './engine-worker';

type Waiting = { readonly request: LiveRequest; readonly done: (reply: LiveReply | null) => void };

/**
 * The engine in a worker of the browser. One request is computed at a time and the latest wins: a
 * request that still waits when a newer one comes is answered with null and never computed.
 */
@Injectable()
export class LiveEngine {
  private worker: Worker | null = null;
  private running: Waiting | null = null;
  private next: Waiting | null = null;

  constructor() {
    inject(DestroyRef).onDestroy(() => this.stop());
  }

  /** The answer, or null when a newer request took its place. */
  ask(request: LiveRequest): Promise<LiveReply | null> {
    return new Promise((done) => {
      this.next?.done(null);
      this.next = { request, done };
      this.start();
    });
  }

  private start(): void {
    if (this.running !== null || this.next === null) return;
    const worker = (this.worker ??= this.open());
    this.running = this.next;
    this.next = null;
    worker.postMessage(this.running.request);
  }

  private open(): Worker {
    const worker = startEngineWorker();
    worker.onmessage = ({ data }: MessageEvent<LiveReply>) => this.finish(data);
    // The worker itself failed (not the engine: that answers with a fault). A new one starts fresh.
    worker.onerror = (event) => {
      event.preventDefault();
      this.worker?.terminate();
      this.worker = null;
      this.finish({
        ok: false,
        fault: {
          code: 'failed',
          field: '',
          message: 'The live computation stopped. Change something to start it again.',
        },
      });
    };
    return worker;
  }

  private finish(reply: LiveReply): void {
    const finished = this.running;
    this.running = null;
    // While a newer request waits, this answer is out of date already; it is still shown, so that a
    // drag shows its way and not only its end.
    finished?.done(reply);
    this.start();
  }

  private stop(): void {
    this.worker?.terminate();
    this.worker = null;
    this.running?.done(null);
    this.next?.done(null);
    this.running = this.next = null;
  }
}
