import { createHash } from 'node:crypto';
import type { Request, RequestHandler, Response, Router } from 'express';
import type { Transaction } from 'sequelize';
import * as z from 'zod';
import type { Endpoint } from '#shared/contracts/endpoint';
import { admit } from '../cases/scope';
import { IdempotencyKey } from '../database/models/idempotency-key';
import type { Services } from '../services';
import { HttpProblem, badRequest, invalid, versionNeeded } from './problems';
import type { Route } from './route';

/** Registers one route: access first, then uploads, then validation, then the handler. */
export function serveRoute(router: Router, route: Route, services: Services): void {
  const { endpoint } = route;
  const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete';
  const access: RequestHandler = async (request, response, next) => {
    // Parameters are checked before the rule so that the rule never meets a malformed id.
    response.locals['params'] = parse(endpoint.params, request.params, 'path');
    response.locals['admitted'] = await admit(
      services,
      endpoint,
      request.user ?? null,
      response.locals['params'],
    );
    next();
  };
  router[method](
    endpoint.path.replace(/^\/api/, ''),
    access,
    ...route.before(services),
    (request, response) => answer(route, services, request, response),
  );
}

async function answer(
  route: Route,
  services: Services,
  request: Request,
  response: Response,
): Promise<void> {
  const { endpoint } = route;
  const body: unknown = request.body;
  const key = endpoint.idempotent ? keyOf(request) : null;
  const account = request.user?.id ?? '';
  const digest = fingerprint(endpoint, response.locals['params'], body);
  if (key !== null && (await replay(account, key, digest, response))) return;

  const call = {
    ...(response.locals['admitted'] as object),
    params: response.locals['params'] as unknown,
    query: parse(endpoint.query, request.query, 'query'),
    body: parse(endpoint.body, withoutBody(request) ? undefined : (body ?? {}), 'body'),
    services,
    request,
    response,
    version: endpoint.ifMatch ? versionOf(request) : 0,
    remember: async (transaction: Transaction, value: unknown) => {
      if (key === null) return;
      const text = JSON.stringify(shape(endpoint, value));
      await IdempotencyKey.create(
        { accountId: account, key, digest, status: endpoint.status, answer: text },
        { transaction },
      );
    },
  };
  try {
    const value = await route.handle(call as never);
    if (response.headersSent || endpoint.response === 'binary') return;
    send(endpoint, response, shape(endpoint, value));
  } catch (error) {
    // The same act, sent twice at once, was done by the other request: give its answer, whatever
    // stopped this one (its row under the same key, or that the act is done already).
    if (key !== null && (await replay(account, key, digest, response))) return;
    throw error;
  }
}

/** Answers go through the contract, so that no column slips out by accident. */
function shape(endpoint: Endpoint, value: unknown): unknown {
  return endpoint.response instanceof z.ZodType ? endpoint.response.parse(value) : null;
}

function send(endpoint: Endpoint, response: Response, value: unknown): void {
  if (endpoint.response === null) {
    response.status(204).end();
    return;
  }
  const version = (value as { version?: unknown } | null)?.version;
  if (typeof version === 'number') response.setHeader('ETag', `"${version}"`);
  response.status(endpoint.status).json(value);
}

function withoutBody(request: Request): boolean {
  return request.method === 'GET' || request.method === 'DELETE';
}

function parse<T extends z.ZodType>(schema: T, value: unknown, where: string): z.output<T> {
  if (schema instanceof z.ZodUndefined) return undefined as z.output<T>;
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const errors = parsed.error.issues.map((issue) => ({
    field: issue.path.length > 0 ? issue.path.join('.') : where,
    message: issue.message,
  }));
  throw where === 'body' ? invalid(errors) : badRequest(`The ${where} is not valid.`, errors);
}

function versionOf(request: Request): number {
  const header = request.get('If-Match');
  if (header === undefined) throw versionNeeded();
  const match = /^(?:W\/)?"(\d{1,9})"$/.exec(header.trim());
  if (!match) throw badRequest('If-Match must be one quoted version, such as "3".');
  return Number(match[1]);
}

function keyOf(request: Request): string {
  const key = request.get('Idempotency-Key') ?? '';
  if (!/^[\x21-\x7e]{8,80}$/.test(key)) {
    throw badRequest(
      'Idempotency-Key must be given: 8 to 80 printable characters, new for each act.',
    );
  }
  return key;
}

/** What was asked, so that a key used again for something else is refused. Passwords are left out. */
function fingerprint(endpoint: Endpoint, params: unknown, body: unknown): string {
  const text = JSON.stringify([endpoint.method, endpoint.path, params, body], (name, value) =>
    name === 'password' ? undefined : (value as unknown),
  );
  return createHash('sha256').update(text).digest('hex');
}

async function replay(
  accountId: string,
  key: string,
  digest: string,
  response: Response,
): Promise<boolean> {
  const seen = await IdempotencyKey.findOne({ where: { accountId, key } });
  if (!seen) return false;
  if (seen.digest !== digest) {
    throw new HttpProblem(
      422,
      'Key used before',
      'This Idempotency-Key was used for another request.',
    );
  }
  response.status(seen.status).json(JSON.parse(seen.answer));
  return true;
}
