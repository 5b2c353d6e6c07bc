import type { ErrorRequestHandler, RequestHandler } from 'express';
import { ConnectionError, ForeignKeyConstraintError } from 'sequelize';
import { EngineError } from '#shared/engine/errors';
import type { Services } from '../services';
import { HttpProblem, badRequest, notFound, tooLarge, unprocessable } from './problems';

/** Under /api, what no route answers. */
export const noSuchRoute: RequestHandler = () => {
  throw notFound('This address');
};

/** The one place where errors become answers; what is not ours to tell is logged and not told. */
export function answerErrors(services: Services): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    if (response.headersSent) {
      next(error);
      return;
    }
    const problem = problemOf(error);
    if (problem.status >= 500) services.log.error({ err: error, url: request.path }, 'failed');
    response
      .status(problem.status)
      .type('application/problem+json')
      .send(
        JSON.stringify({
          type: 'about:blank',
          title: problem.title,
          status: problem.status,
          detail: problem.detail,
          errors: problem.errors,
          current: problem.current,
        }),
      );
  };
}

function problemOf(error: unknown): HttpProblem {
  if (error instanceof HttpProblem) return error;
  if (error instanceof EngineError) return unprocessable(error.field, error.message);
  const { type, name } = error as { type?: unknown; name?: unknown };
  if (type === 'entity.too.large') return tooLarge('The request is larger than 2 MiB.');
  if (type === 'entity.parse.failed') return badRequest('The request is not valid JSON.');
  if (error instanceof ForeignKeyConstraintError) {
    return badRequest('The request refers to something that does not exist.');
  }
  if (error instanceof ConnectionError || name === 'SequelizeConnectionAcquireTimeoutError') {
    return new HttpProblem(
      503,
      'Not available now',
      'The database does not answer. Nothing was changed; try again shortly.',
    );
  }
  return new HttpProblem(
    500,
    'Something went wrong here',
    'It was recorded. Nothing was half done; try again, and tell the laboratory if it stays so.',
  );
}
