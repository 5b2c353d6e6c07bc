import { describe, expect, it } from '@jest/globals';
import { poseProblem, type PoseProblem } from '#shared/engine/documents/pose-problem';
import { poseSolution } from '#shared/engine/documents/pose-solution';
import { fitPoses, pointEllipse, rigidFit, similarityPose } from '#shared/engine/pose/index';
import { caseFile, expectClose, nameOf } from './case-file';

type Pair = [number, number];

interface Inputs {
  readonly body: readonly Pair[];
  readonly measured: readonly Pair[];
  readonly sigma: readonly number[];
  readonly cov: readonly [Pair, Pair][];
}
interface Expected {
  readonly theta_rad: number;
  readonly tx: number;
  readonly ty: number;
  readonly chi2: number;
  readonly cov_tx_ty_theta: readonly (readonly number[])[];
}

const problemOf = (
  body: readonly Pair[],
  measured: readonly Pair[],
  covariance: (i: number) => [Pair, Pair],
): PoseProblem =>
  poseProblem.parse({
    format: 'centrode.pose-problem/1',
    bodies: [{ id: 'car', points: Object.fromEntries(body.map((at, i) => [`P${i}`, at])) }],
    joints: [],
    marks: measured.map((at, i) => ({
      id: `m${i}`,
      at,
      covariance: covariance(i),
      body: 'car',
      point: `P${i}`,
    })),
    loss: 'squares',
  });

const round = (sigma: number): [Pair, Pair] => [
  [sigma ** 2, 0],
  [0, sigma ** 2],
];

/** A term of the covariance that no closed form applies to, too small to change the answer. */
const almostRound = (sigma: number): [Pair, Pair] => [
  [sigma ** 2, 1e-22],
  [1e-22, sigma ** 2],
];

function expectPose(problem: PoseProblem, check: { expected: Expected; tolerance: object }) {
  const solution = fitPoses(problem);
  expect(() => poseSolution.parse(solution)).not.toThrow();
  const { pose, covariance } = solution.bodies['car'];
  const { expected, tolerance } = check;
  expectClose(pose.heading, expected.theta_rad, tolerance);
  expectClose(pose.x, expected.tx, tolerance);
  expectClose(pose.y, expected.ty, tolerance);
  expectClose(solution.chiSquared, expected.chi2, tolerance);
  expectClose(covariance, expected.cov_tx_ty_theta, tolerance);
  expectClose(solution.covariance.matrix, expected.cov_tx_ty_theta, tolerance);
  return solution;
}

describe('pose of a rigid body from marks', () => {
  const b01 = caseFile<Inputs, Expected & Record<string, number>>('B01_pose_fit_scalar_weights');
  const { body, measured, sigma } = b01.inputs;

  it(nameOf(b01), () => {
    const solution = expectPose(
      problemOf(body, measured, (i) => round(sigma[i])),
      b01,
    );
    expect(solution.method).toBe('closed form');
    expect(solution.redundancy).toBe(b01.expected['dof']);
    expectClose(solution.pValue, b01.expected['p_value'], b01.tolerance);
  });

  it(`${nameOf(b01)}, by iteration`, () => {
    const solution = expectPose(
      problemOf(body, measured, (i) => almostRound(sigma[i])),
      b01,
    );
    expect(solution.method).toBe('least squares');
  });

  const b02 = caseFile<Inputs, Expected & { scale: number }>('B02_similarity_umeyama');
  it(nameOf(b02), () => {
    const fit = rigidFit(
      Float64Array.from(b02.inputs.body.flat()),
      Float64Array.from(b02.inputs.measured.flat()),
      Float64Array.from(b02.inputs.sigma, (s) => s ** -2),
    );
    const pose = similarityPose(fit);
    expectClose(fit.scale, b02.expected.scale, b02.tolerance);
    expectClose(pose.heading, b02.expected.theta_rad, b02.tolerance);
    expectClose([pose.x, pose.y], [b02.expected.tx, b02.expected.ty], b02.tolerance);
  });

  const b04 = caseFile<Inputs, Expected & { p_value_7dof: number }>('B04_pose_fit_anisotropic');
  it(nameOf(b04), () => {
    const solution = expectPose(
      problemOf(b04.inputs.body, b04.inputs.measured, (i) => b04.inputs.cov[i]),
      b04,
    );
    expectClose(solution.pValue, b04.expected.p_value_7dof, b04.tolerance);
  });

  interface TwoMarks {
    readonly front: Pair;
    readonly rear: Pair;
    readonly sigma_each_coordinate: number;
    readonly wheelbase: number;
  }
  const b17 = caseFile<TwoMarks, Record<string, number>>('B17_heading_from_two_marks');
  it(nameOf(b17), () => {
    const { front, rear, sigma_each_coordinate: u, wheelbase } = b17.inputs;
    const problem = problemOf(
      [
        [wheelbase, 0],
        [0, 0],
      ],
      [front, rear],
      () => round(u),
    );
    const solution = fitPoses(problem);
    const { pose, covariance } = solution.bodies['car'];
    expectClose(pose.heading, b17.expected['heading_rad'], b17.tolerance);
    // The case divides by the measured length, the fit by the known one: the same to first order.
    expectClose(Math.sqrt(covariance[2][2]) * wheelbase, u * Math.SQRT2, { rel: 1e-9 });
    expectClose(Math.sqrt(covariance[2][2]), b17.expected['u_heading_rad'], { rel: 1e-3 });
    const z = b17.expected['z_of_length'];
    expectClose(solution.chiSquared, z ** 2, { rel: 1e-6 });
    expect(solution.redundancy).toBe(1);
    solution.residuals.forEach(({ w }) => expectClose(w, z, { rel: 1e-6 }));
  });

  it('gives the ellipse of the centroid by the closed formula 1/√Σw of B01', () => {
    const solution = fitPoses(problemOf(body, measured, (i) => round(sigma[i])));
    const [x, y] = b01.expected['weighted_centroid_body'] as unknown as Pair;
    const { at, semiAxes } = pointEllipse(solution, 'car', [x, y]);
    const total = sigma.reduce((sum, s) => sum + s ** -2, 0);
    expectClose(at, b01.expected['weighted_centroid_measured'], { rel: 1e-9 });
    expectClose(semiAxes, [total ** -0.5, total ** -0.5], { rel: 1e-7 });
  });
});
