import type { PoseProblem } from '../documents/pose-problem';
import { EngineError } from '../errors';
import type { Vector } from '../geometry/vector';
import { dimension } from './layout';

/** Absolute, m: no scene is larger, and coordinates beyond it lose the micrometre in a double. */
const largestCoordinate = 1e8;
/** Relative: standard uncertainties further apart than this cannot be weighed in one fit. */
const largestSpread = 1e7;
/** Relative: a covariance whose correlation is closer to ±1 than this is singular. */
const singular = 1e-12;

/**
 * Refuses what cannot be fitted, naming the field: duplicate or unknown ids, numbers that are not
 * finite or out of scale, marks without uncertainty, covariances that are none.
 */
export function checkPoseProblem(problem: PoseProblem): void {
  if (problem.bodies.length === 0) throw new EngineError('empty', 'bodies', 'There is no body.');
  unique(problem.bodies, 'bodies');
  unique(problem.joints, 'joints');
  unique(problem.marks, 'marks');
  for (const body of problem.bodies) checkBody(body);
  const points = new Map(problem.bodies.map((body) => [body.id, body.points]));
  for (const joint of problem.joints) checkJoint(joint, points);
  for (const mark of problem.marks) checkMark(mark, points);
  checkSpread(problem);
}

type Points = ReadonlyMap<string, PoseProblem['bodies'][number]['points']>;

function unique(items: readonly { id: string }[], field: string): void {
  const seen = new Set<string>();
  for (const { id } of items) {
    if (seen.has(id))
      throw new EngineError('duplicate-id', `${field}.${id}`, `The id "${id}" occurs twice.`);
    seen.add(id);
  }
}

function finite(value: number, field: string): void {
  if (!Number.isFinite(value))
    throw new EngineError('not-finite', field, 'This must be a finite number.');
  if (Math.abs(value) > largestCoordinate)
    throw new EngineError(
      'scale',
      field,
      'This is over 100 000 km: check the unit and the origin.',
    );
}

function vector(value: Vector | undefined, field: string): void {
  if (value === undefined) return;
  finite(value[0], `${field}.x`);
  finite(value[1], `${field}.y`);
}

function notNegative(value: number | undefined, field: string): void {
  if (value === undefined) return;
  finite(value, field);
  if (value < 0)
    throw new EngineError('not-positive', field, 'A standard uncertainty cannot be negative.');
}

function checkBody(body: PoseProblem['bodies'][number]): void {
  const field = `bodies.${body.id}`;
  for (const [name, point] of Object.entries(body.points)) {
    const at = `${field}.points.${name}`;
    const given = dimension(point);
    vector(given.at, at);
    given.sigma.forEach((sigma, i) => notNegative(sigma, `${at}.sigma.${i === 0 ? 'x' : 'y'}`));
  }
  for (const [part, given] of Object.entries(body.stated ?? {})) {
    if (given === undefined) continue;
    finite(given.value, `${field}.stated.${part}`);
    notNegative(given.sigma, `${field}.stated.${part}.sigma`);
  }
}

function reference(ref: { body: string; point: string }, points: Points, field: string): void {
  const body = points.get(ref.body);
  if (body === undefined)
    throw new EngineError('unknown-reference', field, `There is no body "${ref.body}".`);
  if (!Object.hasOwn(body, ref.point))
    throw new EngineError(
      'unknown-reference',
      field,
      `The body "${ref.body}" has no point "${ref.point}".`,
    );
}

function checkJoint(joint: PoseProblem['joints'][number], points: Points): void {
  const field = `joints.${joint.id}`;
  reference(joint.a, points, `${field}.a`);
  notNegative(joint.sigma, `${field}.sigma`);
  if ('b' in joint && joint.b !== undefined) {
    reference(joint.b, points, `${field}.b`);
    if (joint.b.body === joint.a.body)
      throw new EngineError('unsupported', `${field}.b`, 'A joint needs two different bodies.');
  }
  if (joint.kind === 'pin') {
    vector(joint.at, `${field}.at`);
    if (joint.b === undefined && joint.at === undefined)
      throw new EngineError(
        'unknown-reference',
        field,
        'A pin needs a point of another body, or a place on the ground.',
      );
  }
  if (joint.kind === 'guide') vector(joint.at, `${field}.at`);
  if (joint.kind === 'guide' || joint.kind === 'slot') {
    finite(joint.direction, `${field}.direction`);
    if (joint.radius !== undefined && joint.radius !== null) {
      finite(joint.radius, `${field}.radius`);
      if (joint.radius === 0)
        throw new EngineError('zero-length', `${field}.radius`, 'The radius cannot be zero.');
    }
  }
  if (joint.kind === 'weld' && joint.angle !== undefined) {
    finite(joint.angle, `${field}.angle`);
    notNegative(joint.angleSigma, `${field}.angleSigma`);
  }
  if (joint.kind === 'link') {
    finite(joint.length, `${field}.length`);
    if (joint.length <= 0)
      throw new EngineError('zero-length', `${field}.length`, 'The length must be over zero.');
  }
}

function checkMark(mark: PoseProblem['marks'][number], points: Points): void {
  const field = `marks.${mark.id}`;
  reference(mark, points, field);
  vector(mark.at, `${field}.at`);
  const covariance = mark.covariance as PoseProblem['marks'][number]['covariance'] | undefined;
  if (covariance === undefined)
    throw new EngineError('no-uncertainty', `${field}.covariance`, 'A mark needs an uncertainty.');
  const [[a, b], [c, d]] = covariance;
  for (const value of [a, b, c, d]) finite(value, `${field}.covariance`);
  if (a === 0 || d === 0)
    throw new EngineError('no-uncertainty', `${field}.covariance`, 'A mark is never exact.');
  if (
    a < 0 ||
    d < 0 ||
    Math.abs(b - c) > 1e-9 * Math.sqrt(a * d) ||
    a * d - b * c < singular * a * d
  )
    throw new EngineError(
      'not-a-covariance',
      `${field}.covariance`,
      'A covariance is symmetric, with variances over zero and a correlation within ±1.',
    );
  if (mark.line !== undefined) finite(mark.line.direction, `${field}.line.direction`);
  if (mark.tangent !== undefined) {
    finite(mark.tangent.direction, `${field}.tangent.direction`);
    finite(mark.tangent.along ?? 0, `${field}.tangent.along`);
    notNegative(mark.tangent.sigma, `${field}.tangent.sigma`);
    if (mark.tangent.sigma === 0)
      throw new EngineError(
        'no-uncertainty',
        `${field}.tangent.sigma`,
        'A tangent is never exact.',
      );
  }
}

function checkSpread(problem: PoseProblem): void {
  let least = Infinity;
  let most = 0;
  let widest = '';
  for (const { id, covariance } of problem.marks) {
    least = Math.min(least, covariance[0][0], covariance[1][1]);
    const large = Math.max(covariance[0][0], covariance[1][1]);
    if (large > most) [most, widest] = [large, id];
  }
  if (problem.marks.length > 0 && Math.sqrt(most / least) > largestSpread)
    throw new EngineError(
      'scale',
      `marks.${widest}.covariance`,
      'The uncertainties of the marks differ by more than a factor of ten million.',
    );
}
