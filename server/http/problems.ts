/** Errors that the API answers with (RFC 9457); anything else is a fault of ours and says nothing. */
export class HttpProblem extends Error {
  override readonly name = 'HttpProblem';

  constructor(
    readonly status: number,
    readonly title: string,
    readonly detail?: string,
    readonly errors?: { field: string; message: string }[],
    readonly current?: unknown,
  ) {
    super(detail ?? title);
  }
}

type FieldErrors = { field: string; message: string }[];

export const badRequest = (detail: string, errors?: FieldErrors): HttpProblem =>
  new HttpProblem(400, 'The request cannot be read', detail, errors);

export const signInFirst = (): HttpProblem =>
  new HttpProblem(401, 'Sign in first', 'This needs a signed-in account.');

export const forbidden = (detail: string): HttpProblem =>
  new HttpProblem(403, 'Not allowed', detail);

/** Also for what exists but may not be seen: the two cannot be told apart. */
export const notFound = (what = 'This'): HttpProblem =>
  new HttpProblem(404, 'Not found', `${what} does not exist or is not open to you.`);

export const conflict = (detail: string): HttpProblem =>
  new HttpProblem(409, 'Not possible as things stand', detail);

/** Somebody saved a newer version: `current` lets the screen show both. */
export const stale = (current: unknown): HttpProblem =>
  new HttpProblem(
    412,
    'Changed by somebody else',
    'This was changed since you opened it. Nothing of yours is lost: compare and save again.',
    undefined,
    current,
  );

export const tooLarge = (detail: string): HttpProblem => new HttpProblem(413, 'Too large', detail);

export const unprocessable = (field: string, message: string): HttpProblem =>
  new HttpProblem(422, 'Please correct', message, [{ field, message }]);

export const invalid = (errors: FieldErrors): HttpProblem =>
  new HttpProblem(
    422,
    'Please correct',
    errors.map((error) => `${error.field}: ${error.message}`).join('; '),
    errors,
  );

export const versionNeeded = (): HttpProblem =>
  new HttpProblem(428, 'Version needed', 'Say in If-Match which version you edit.');
