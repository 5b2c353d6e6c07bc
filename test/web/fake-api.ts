import { signal } from '@angular/core';
import { Subject } from 'rxjs';
import type { Endpoint, ResponseOf } from '#shared/contracts/endpoint';
import { Api, type RequestOf } from '../../src/app/core/api/api';

interface Sent {
  readonly endpoint: Endpoint;
  readonly request: Record<string, unknown>;
}

/** Stands in for the server in component specs: says what each endpoint answers, keeps what was sent. */
export class FakeApi {
  readonly csrfToken = signal('');
  readonly offline = signal(false);
  readonly signedOut = new Subject<void>();
  readonly sent: Sent[] = [];
  private readonly answers = new Map<Endpoint, (request: never) => unknown>();

  /** An answer that is thrown when it is an error. */
  on<E extends Endpoint>(
    endpoint: E,
    answer: (request: RequestOf<E>) => ResponseOf<E> | Error,
  ): this {
    this.answers.set(endpoint, answer);
    return this;
  }

  async call(endpoint: Endpoint, request: Record<string, unknown>): Promise<unknown> {
    this.sent.push({ endpoint, request });
    const answer = this.answers.get(endpoint);
    if (answer === undefined) throw new Error(`No answer is set for: ${endpoint.summary}`);
    const value = await Promise.resolve(answer(request as never));
    if (value instanceof Error) throw value;
    return value;
  }

  /** Requests to one endpoint, in order. */
  to<E extends Endpoint>(endpoint: E): RequestOf<E>[] {
    return this.sent
      .filter((one) => one.endpoint === endpoint)
      .map((one) => one.request as RequestOf<E>);
  }

  provider() {
    return { provide: Api, useValue: this };
  }
}
