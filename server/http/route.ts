import type { Request, RequestHandler, Response } from 'express';
import type { Transaction } from 'sequelize';
import type * as z from 'zod';
import type { AccessRule, Binary, Endpoint } from '#shared/contracts/endpoint';
import type { AccountRecord } from '../database/models/account';
import type { CaseScope, PartyScope } from '../cases/scope';
import type { Services } from '../services';

/** What the access rule of an endpoint lets its handler work with. */
type Admitted<A extends AccessRule> = A extends 'public'
  ? { account: AccountRecord | null }
  : A extends 'party'
    ? { account: AccountRecord; party: PartyScope }
    : A extends `case-${string}`
      ? { account: AccountRecord; scope: CaseScope }
      : { account: AccountRecord };

/** A request that passed the access rule and whose every part was validated. */
export type Call<E extends Endpoint> = Admitted<E['access']> & {
  params: z.output<E['params']>;
  query: z.output<E['query']>;
  body: z.output<E['body']>;
  services: Services;
  request: Request;
  response: Response;
  /** The version in `If-Match`; 0 where the endpoint does not ask for one. */
  version: number;
  /**
   * In the transaction of an idempotent change: notes the answer under the request's
   * `Idempotency-Key`, so that the change and the memory of it stand or fall together.
   */
  remember: (transaction: Transaction, answer: unknown) => Promise<void>;
};

type Answer<E extends Endpoint> = E['response'] extends z.ZodType
  ? z.input<E['response']>
  : E['response'] extends Binary
    ? void
    : void | undefined;

export type Handler<E extends Endpoint> = (call: Call<E>) => Promise<Answer<E>> | Answer<E>;

export interface Route {
  readonly endpoint: Endpoint;
  /** After the access rule and before the body is validated: file uploads. */
  readonly before: (services: Services) => RequestHandler[];
  readonly handle: (call: never) => unknown;
}

/** Binds a contract's endpoint to what the server does for it. */
export function implement<E extends Endpoint>(
  endpoint: E,
  handle: Handler<E>,
  before: Route['before'] = () => [],
): Route {
  return { endpoint, handle: handle, before };
}
