import { HttpClient, HttpErrorResponse, HttpHeaders } from '@angular/common/http';
import { Injectable, inject, signal } from '@angular/core';
import { Subject, firstValueFrom, fromEvent, takeUntil } from 'rxjs';
import * as z from 'zod';
import type { BodyOf, Endpoint, ParamsOf, QueryOf, ResponseOf } from '#shared/contracts/endpoint';
import { address } from './address';
import { ApiProblem } from './api-problem';

/** A part of a request: it may be left out where nothing in it is needed. */
type Part<Name extends string, Value> =
  Record<never, never> extends Value
    ? { readonly [N in Name]?: Value }
    : { readonly [N in Name]: Value };

/** What a call sends; `params` and `body` must be there where the endpoint has them. */
export type RequestOf<E extends Endpoint> = Part<'params', ParamsOf<E>> &
  Part<'query', QueryOf<E>> &
  (undefined extends BodyOf<E> ? { readonly body?: never } : { readonly body: BodyOf<E> }) & {
    /** Version that is edited, for endpoints with `ifMatch`. */
    readonly ifMatch?: number;
    /** One key per act of a person: a retry of the same act sends the same key. */
    readonly idempotencyKey?: string;
    /** Ends the request early. */
    readonly abort?: AbortSignal;
  };

/** The one way to the server: endpoints are data from the contracts, answers are checked. */
@Injectable({ providedIn: 'root' })
export class Api {
  private readonly http = inject(HttpClient);

  /** Sent with every change; the session sets it. */
  readonly csrfToken = signal('');
  /** The last request did not reach the server. */
  readonly offline = signal(false);
  private readonly refusals = new Subject<void>();
  /** The server no longer knows the session. */
  readonly signedOut = this.refusals.asObservable();

  /** @throws ApiProblem for whatever is not the answer that the contract promises */
  async call<E extends Endpoint>(endpoint: E, request: RequestOf<E>): Promise<ResponseOf<E>> {
    const { params, query, body } = request as { params?: object; query?: object; body?: unknown };
    const answer = this.http.request<unknown>(endpoint.method, address(endpoint, params, query), {
      body,
      headers: this.headers(endpoint, request),
      responseType: 'json',
    });
    const { abort } = request;
    try {
      abort?.throwIfAborted();
      const value = await firstValueFrom(
        abort ? answer.pipe(takeUntil(fromEvent(abort, 'abort'))) : answer,
      );
      this.offline.set(false);
      return read(endpoint, value) as ResponseOf<E>;
    } catch (error) {
      abort?.throwIfAborted();
      const told = ApiProblem.from(error);
      if (error instanceof HttpErrorResponse) this.offline.set(told.status === 0);
      if (told.status === 401) this.refusals.next();
      throw told;
    }
  }

  private headers(endpoint: Endpoint, request: { ifMatch?: number; idempotencyKey?: string }) {
    let headers = new HttpHeaders();
    if (endpoint.method !== 'GET') {
      // The zone in which something was entered is recorded beside the UTC time.
      const { timeZone } = Intl.DateTimeFormat().resolvedOptions();
      headers = headers.set('X-CSRF-Token', this.csrfToken()).set('Time-Zone', timeZone);
    }
    if (request.ifMatch !== undefined) headers = headers.set('If-Match', `"${request.ifMatch}"`);
    if (endpoint.idempotent) {
      headers = headers.set('Idempotency-Key', request.idempotencyKey ?? crypto.randomUUID());
    }
    return headers;
  }
}

function read(endpoint: Endpoint, value: unknown): unknown {
  if (!(endpoint.response instanceof z.ZodType)) return undefined;
  const parsed = endpoint.response.safeParse(value);
  if (parsed.success) return parsed.data;
  throw new ApiProblem(
    -1,
    'The answer of the server cannot be read',
    `${endpoint.summary}: ${parsed.error.issues.map((issue) => issue.path.join('.')).join(', ')}. Reload the page; the application may have been renewed.`,
  );
}
