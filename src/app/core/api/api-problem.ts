import { HttpErrorResponse } from '@angular/common/http';
import { problem } from '#shared/contracts/common';

export interface FieldError {
  readonly field: string;
  readonly message: string;
}

/**
 * What the server, or the way to it, said instead of an answer (RFC 9457 problem details).
 * Status 0: the server was not reached.
 */
export class ApiProblem extends Error {
  override readonly name = 'ApiProblem';

  constructor(
    readonly status: number,
    readonly title: string,
    readonly detail = '',
    readonly errors: readonly FieldError[] = [],
    /** On 412: the record as it is now, unread. */
    readonly current?: unknown,
  ) {
    super(detail || title);
  }

  /** The message beside a field, if the server named it. */
  messageFor(field: string): string | undefined {
    return this.errors.find((error) => error.field === field)?.message;
  }

  static from(error: unknown): ApiProblem {
    if (error instanceof ApiProblem) return error;
    if (!(error instanceof HttpErrorResponse)) {
      return new ApiProblem(-1, 'Something went wrong on this page', messageOf(error));
    }
    if (error.status === 0) {
      return new ApiProblem(
        0,
        'The server cannot be reached',
        'Check the connection. What you typed is still here; try again.',
      );
    }
    const told = problem.safeParse(error.error);
    if (told.success) {
      const { title, detail, errors, current } = told.data;
      return new ApiProblem(error.status, title, detail, errors, current);
    }
    return new ApiProblem(error.status, `The server answered with ${error.status}`);
  }
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
