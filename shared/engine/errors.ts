/**
 * What the engine says when it cannot answer: a typed value that names the field at fault.
 *
 * `field` is a path into the document that was given (`joints.j3.direction`), so that a form can
 * show the message beside its input and the API can repeat it in a problem answer.
 */
export class EngineError extends Error {
  override readonly name = 'EngineError';

  constructor(
    readonly code: EngineErrorCode,
    readonly field: string,
    message: string,
  ) {
    super(message);
  }
}

export type EngineErrorCode =
  | 'not-finite'
  | 'unknown-reference'
  | 'duplicate-id'
  | 'coincident-points'
  | 'zero-length'
  | 'no-uncertainty'
  | 'not-positive'
  | 'not-a-covariance'
  | 'not-enough-marks'
  | 'joint-does-not-close'
  | 'not-converged'
  | 'unsupported'
  | 'empty'
  | 'scale';
