import type { PoseProblem } from '../documents/pose-problem';
import type { PoseSolution } from '../documents/pose-solution';
import { EngineError } from '../errors';
import { norm, subtract, wrap, type Pose } from '../geometry/vector';
import { chiSquaredPValue, criticalDeviate } from '../uncertainty/distributions';
import { checkPoseProblem } from './check-problem';
import { closedForm } from './closed-form';
import { fit, type Fit } from './fit';
import { dimension, place, poseFrom, type BodySlot, type Place } from './layout';
import { judge } from './quality';

/** rad: a heading less certain than this is beyond what first-order propagation can carry. */
const looseHeading = 0.15;
/** rad: a heading less certain than this is not known at all. */
const noHeading = 1;
/** Probability below which marks are said to disagree. */
const disagreement = 0.01;

/**
 * Where bodies stood, from marks that their points made.
 *
 * Minimises the sum of squares of all residuals over their uncertainties: marks, joints with play,
 * stated poses and uncertain dimensions; joints without play hold exactly. One body with marks that
 * are equally uncertain in all directions is solved in closed form. With loss `huber`, marks far
 * off keep a bounded influence (iteratively reweighted).
 *
 * The covariance is that of the given uncertainties, to first order, (JᵀJ)⁻¹ on the constraint
 * surface; with `huber`, (JᵀWJ)⁻¹, a little larger than the asymptotic one.
 *
 * Throws EngineError: `not-enough-marks` (`bodies.ID`) when a pose is not fixed,
 * `coincident-points` when the marked points of a body are one, `joint-does-not-close`, and for bad
 * input what `checkPoseProblem` says.
 *
 * Sources: closed form Kabsch 1976 and Umeyama 1991 (see rigid-fit); adjustment with constraints
 * and data snooping, Baarda 1967 and 1968.
 */
export function fitPoses(given: PoseProblem): PoseSolution {
  const problem: PoseProblem = {
    ...given,
    joints: given.joints ?? [],
    loss: given.loss ?? 'squares',
  };
  checkPoseProblem(problem);
  refuseCoincident(problem);
  const direct = closedForm(problem);
  const found = direct ?? fit(problem);
  const { marks, priors } = judge(problem, found);
  const rows = found.equations.observations.reduce((sum, o) => sum + o.whitening.length, 0);
  const redundancy = rows - found.freedom;
  const robust = problem.loss === 'huber';
  const pValue = robust || redundancy <= 0 ? null : chiSquaredPValue(found.chiSquared, redundancy);
  const solution: PoseSolution = {
    format: 'centrode.pose-solution/1',
    bodies: {},
    covariance: poseCovariances(found),
    points: {},
    dimensions: {},
    residuals: marks,
    priors,
    redundancy,
    chiSquared: found.chiSquared,
    pValue,
    suspects: marks
      .filter(({ w }) => w !== null && w > criticalDeviate)
      .sort((a, b) => (b.w ?? 0) - (a.w ?? 0))
      .map(({ mark }) => mark),
    alternatives: found.alternatives.map(({ x, chiSquared }) => ({
      bodies: Object.fromEntries(
        [...found.layout.bodies.values()].map((slot) => [slot.id, scenePose(found, slot, x)]),
      ),
      chiSquared,
    })),
    method: direct !== null ? 'closed form' : robust ? 'Huber' : 'least squares',
    iterations: found.iterations,
    warnings: [],
  };
  for (const slot of found.layout.bodies.values()) describeBody(found, slot, solution);
  refuseLooseHeadings(solution);
  solution.warnings.push(...warningsOf(solution));
  return solution;
}

const scenePose = (found: Fit, slot: BodySlot, x: Float64Array): Pose => {
  const pose = poseFrom(found.layout, slot, x);
  return { x: pose.x, y: pose.y, heading: wrap(pose.heading) };
};

/** Covariance of x, y, heading of every body in turn, then of the uncertain points. */
function poseCovariances(found: Fit): PoseSolution['covariance'] {
  const slots = [...found.layout.bodies.values()];
  const points: { body: string; point: string }[] = [];
  const unknowns: { at: number | null; unit: number }[] = slots.flatMap(({ index, arm }) => [
    { at: index, unit: 1 },
    { at: index + 1, unit: 1 },
    { at: index + 2, unit: arm },
  ]);
  for (const slot of slots)
    for (const [name, { index }] of slot.points) {
      if (index.every((at) => at === null)) continue;
      points.push({ body: slot.id, point: name });
      unknowns.push(...index.map((at) => ({ at, unit: 1 })));
    }
  const { size } = found.layout;
  return {
    bodies: slots.map(({ id }) => id),
    ...(points.length > 0 && { points }),
    matrix: unknowns.map((a) =>
      unknowns.map((b) =>
        a.at === null || b.at === null
          ? 0
          : found.covariance[a.at * size + b.at] / (a.unit * b.unit),
      ),
    ),
  };
}

function describeBody(found: Fit, slot: BodySlot, solution: PoseSolution): void {
  const { layout, x } = found;
  const k = 3 * solution.covariance.bodies.indexOf(slot.id);
  const { matrix } = solution.covariance;
  const row = (i: number): [number, number, number] => [
    matrix[k + i][k],
    matrix[k + i][k + 1],
    matrix[k + i][k + 2],
  ];
  solution.bodies[slot.id] = {
    pose: scenePose(found, slot, x),
    covariance: [row(0), row(1), row(2)],
  };
  for (const [name, point] of slot.points) {
    const where = place(layout, x, { body: slot.id, point: name });
    const key = `${slot.id}.${name}`;
    solution.points[key] = {
      at: [where.at[0] + layout.centre[0], where.at[1] + layout.centre[1]],
      covariance: placeCovariance(found, where),
    };
    const [ix, iy] = point.index;
    if (ix === null && iy === null) continue;
    const between = (i: number | null, j: number | null): number =>
      i === null || j === null ? 0 : found.covariance[i * layout.size + j];
    solution.dimensions[key] = {
      at: [ix === null ? point.at[0] : x[ix], iy === null ? point.at[1] : x[iy]],
      covariance: [
        [between(ix, ix), between(ix, iy)],
        [between(iy, ix), between(iy, iy)],
      ],
    };
  }
}

function placeCovariance(found: Fit, where: Place): [[number, number], [number, number]] {
  const { size } = found.layout;
  const gradients = [new Float64Array(size), new Float64Array(size)];
  where.spread(gradients[0], [1, 0]);
  where.spread(gradients[1], [0, 1]);
  const between = (a: Float64Array, b: Float64Array): number => {
    let sum = 0;
    for (let i = 0; i < size; i++)
      if (a[i] !== 0)
        for (let j = 0; j < size; j++) sum += a[i] * found.covariance[i * size + j] * b[j];
    return sum;
  };
  const cross = between(gradients[0], gradients[1]);
  return [
    [between(gradients[0], gradients[0]), cross],
    [cross, between(gradients[1], gradients[1])],
  ];
}

/** Marked points of one body that are the same place cannot turn it. */
function refuseCoincident(problem: PoseProblem): void {
  for (const body of problem.bodies) {
    const names = [
      ...new Set(problem.marks.filter((mark) => mark.body === body.id).map((mark) => mark.point)),
    ];
    if (names.length < 2) continue;
    const [first, ...others] = names.map((name) => dimension(body.points[name]).at);
    if (others.some((at) => norm(subtract(at, first)) > 1e-6)) continue;
    throw new EngineError(
      'coincident-points',
      `bodies.${body.id}.points.${names[1]}`,
      `The marked points of "${body.id}" are all at the same place of the body.`,
    );
  }
}

function refuseLooseHeadings(solution: PoseSolution): void {
  for (const [id, body] of Object.entries(solution.bodies))
    if (Math.sqrt(body.covariance[2][2]) > noHeading)
      throw new EngineError(
        'not-enough-marks',
        `bodies.${id}`,
        `The heading of "${id}" is not known: its standard uncertainty is over a radian. Its marks are too close together for their uncertainty.`,
      );
}

function warningsOf(solution: PoseSolution): string[] {
  const warnings: string[] = [];
  for (const [id, body] of Object.entries(solution.bodies)) {
    const u = Math.sqrt(body.covariance[2][2]);
    if (u > looseHeading)
      warnings.push(
        `The heading of "${id}" has a standard uncertainty of ${degrees(u)}°: first-order uncertainties are rough here.`,
      );
  }
  if (solution.redundancy === 0 && solution.residuals.length > 0)
    warnings.push('Nothing is redundant: a wrong mark would not show.');
  if (solution.pValue !== null && solution.pValue < disagreement)
    warnings.push(
      `The marks disagree by more than their uncertainties allow (p = ${solution.pValue.toPrecision(2)}).`,
    );
  if (solution.alternatives.length > 0)
    warnings.push('Another pose fits the marks about as well; see the alternatives.');
  return warnings;
}

const degrees = (angle: number): string => ((angle * 180) / Math.PI).toFixed(1);
