import { openAsBlob } from 'node:fs';
import { basename } from 'node:path';
import { v7 as newId } from 'uuid';
import { readSession, signIn } from '#shared/contracts/accounts';
import type { BodyOf, Endpoint, ParamsOf, QueryOf, ResponseOf } from '#shared/contracts/endpoint';
import { uploadFile, type ExhibitFile } from '#shared/contracts/exhibits';

/** What a call needs, as the contract says. */
interface Given<E extends Endpoint> {
  params?: ParamsOf<E>;
  query?: QueryOf<E>;
  body?: BodyOf<E>;
  ifMatch?: number;
}

/**
 * Somebody of the demo laboratory at work: the demo is loaded through the API like real work, so that
 * every rule, ledger event and hash in it came about the ordinary way.
 */
export class Person {
  private cookie = '';
  private csrfToken = '';

  private constructor(private readonly address: string) {}

  static async signedIn(address: string, email: string, password: string): Promise<Person> {
    const person = new Person(address);
    person.csrfToken = (await person.call(readSession)).csrfToken;
    person.csrfToken = (await person.call(signIn, { body: { email, password } })).csrfToken;
    return person;
  }

  async call<E extends Endpoint>(endpoint: E, given: Given<E> = {}): Promise<ResponseOf<E>> {
    const answer = await this.send(endpoint, given.params, {
      query: given.query,
      headers: {
        'Content-Type': 'application/json',
        ...(given.ifMatch === undefined ? {} : { 'If-Match': `"${given.ifMatch}"` }),
      },
      body: given.body === undefined ? undefined : JSON.stringify(given.body),
    });
    return (answer.status === 204 ? undefined : await answer.json()) as ResponseOf<E>;
  }

  /** Takes in one file of the samples. */
  async upload(caseId: string, exhibitId: string, file: string): Promise<ExhibitFile> {
    const form = new FormData();
    form.append('file', await openAsBlob(file), basename(file));
    const answer = await this.send(uploadFile, { caseId, exhibitId }, { body: form });
    return (await answer.json()) as ExhibitFile;
  }

  private async send(
    endpoint: Endpoint,
    params: object | undefined,
    options: { query?: object; headers?: Record<string, string>; body?: string | FormData },
  ): Promise<Response> {
    const path = Object.entries(params ?? {}).reduce<string>(
      (text, [name, value]) => text.replace(`:${name}`, encodeURIComponent(String(value))),
      endpoint.path,
    );
    const query = new URLSearchParams(options.query as Record<string, string> | undefined);
    const answer = await fetch(
      `${this.address}${path}${query.size > 0 ? `?${query.toString()}` : ''}`,
      {
        method: endpoint.method,
        headers: {
          ...options.headers,
          Cookie: this.cookie,
          'X-CSRF-Token': this.csrfToken,
          ...(endpoint.idempotent ? { 'Idempotency-Key': newId() } : {}),
        },
        body: options.body,
      },
    );
    const cookie = answer.headers.get('Set-Cookie')?.split(';')[0];
    if (cookie !== undefined) this.cookie = cookie;
    if (!answer.ok) {
      throw new Error(`${endpoint.method} ${path}: ${answer.status} ${await answer.text()}`);
    }
    return answer;
  }
}
