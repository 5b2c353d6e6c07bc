import * as z from 'zod';

/**
 * Who may call an endpoint. The rule is part of the contract, so that the server enforces it before
 * the handler runs, the OpenAPI page prints it, and a test can walk every route as every role.
 *
 * - `public`: no session.
 * - `signed-in`: any account.
 * - `lead`: laboratory lead.
 * - `staff`: laboratory lead or investigator.
 * - `case-read`: the laboratory lead, or someone assigned to the case (not an attorney).
 * - `case-work`: the case's lead investigator or an investigator of it: exhibits, survey, motion, findings.
 * - `case-custody`: as `case-work`, and the case's evidence custodian.
 * - `case-direct`: the laboratory lead or the case's lead investigator: brief, release.
 * - `party`: an attorney, for the releases disclosed to their party.
 */
export const accessRules = [
  'public',
  'signed-in',
  'lead',
  'staff',
  'case-read',
  'case-work',
  'case-custody',
  'case-direct',
  'party',
] as const;
export type AccessRule = (typeof accessRules)[number];

/** What an endpoint sends back other than JSON. */
export type Binary = 'binary';

/**
 * One endpoint of the API, as data: the Angular client calls it, Express serves it, OpenAPI is
 * generated from it. Paths use Express's `:name` parameters; a path of a case has `:caseId`.
 */
export interface Endpoint<
  P extends z.ZodObject = z.ZodObject,
  Q extends z.ZodObject = z.ZodObject,
  B extends z.ZodType = z.ZodType,
  R extends z.ZodType | Binary | null = z.ZodType | Binary | null,
  A extends AccessRule = AccessRule,
> {
  readonly method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  readonly path: `/api/${string}`;
  readonly summary: string;
  readonly access: A;
  readonly params: P;
  readonly query: Q;
  readonly body: B;
  /** `multipart` bodies carry files beside the fields of `body`. */
  readonly encoding: 'json' | 'multipart';
  /** null: 204, nothing to read. */
  readonly response: R;
  readonly status: 200 | 201 | 202 | 204;
  /** The request must say which version it edits (`If-Match`), else 428. */
  readonly ifMatch: boolean;
  /** The request must carry an `Idempotency-Key`; a repeated key answers as the first time. */
  readonly idempotent: boolean;
}

const nothing = z.strictObject({});

interface EndpointInput<
  P extends z.ZodObject,
  Q extends z.ZodObject,
  B extends z.ZodType,
  R extends z.ZodType | Binary | null,
  A extends AccessRule,
> {
  method: Endpoint['method'];
  path: Endpoint['path'];
  summary: string;
  access: A;
  params?: P;
  query?: Q;
  body?: B;
  encoding?: Endpoint['encoding'];
  response: R;
  status?: Endpoint['status'];
  ifMatch?: boolean;
  idempotent?: boolean;
}

export function endpoint<
  R extends z.ZodType | Binary | null,
  A extends AccessRule,
  P extends z.ZodObject = z.ZodObject<Record<never, never>>,
  Q extends z.ZodObject = z.ZodObject<Record<never, never>>,
  B extends z.ZodType = z.ZodUndefined,
>(input: EndpointInput<P, Q, B, R, A>): Endpoint<P, Q, B, R, A> {
  return {
    params: nothing as unknown as P,
    query: nothing as unknown as Q,
    body: z.undefined() as unknown as B,
    encoding: 'json',
    status: input.response === null ? 204 : 200,
    ifMatch: false,
    idempotent: false,
    ...input,
  };
}

/** Values of an endpoint as the caller writes them (defaults may be left out). */
export type ParamsOf<E> = E extends { params: infer P extends z.ZodType } ? z.input<P> : never;
export type QueryOf<E> = E extends { query: infer Q extends z.ZodType } ? z.input<Q> : never;
export type BodyOf<E> = E extends { body: infer B extends z.ZodType } ? z.input<B> : never;
/** `never` for a binary answer: it is fetched by its address, not through the typed client. */
export type ResponseOf<E> = E extends { response: infer R }
  ? R extends z.ZodType
    ? z.output<R>
    : R extends null
      ? undefined
      : never
  : never;
