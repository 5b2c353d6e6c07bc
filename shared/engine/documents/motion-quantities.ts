import type { MotionBranch, MotionSolution } from './motion-solution';

export type QuantityName =
  | 'speed'
  | 'velocity-x'
  | 'velocity-y'
  | 'velocity-direction'
  | 'acceleration'
  | 'acceleration-x'
  | 'acceleration-y'
  | 'angular-velocity'
  | 'angular-acceleration';

/** One number of a solution with its 95 % interval, SI. */
export interface Quantity {
  readonly body: string;
  /** null for a quantity of the whole body. */
  readonly point: string | null;
  readonly name: QuantityName;
  readonly unit: 'm/s' | 'm/s²' | 'rad' | 'rad/s' | 'rad/s²';
  readonly value: number;
  /** Standard uncertainty; null where it cannot be stated (a magnitude at rest). */
  readonly sigma: number | null;
  readonly low: number | null;
  readonly high: number | null;
}

/** Coverage factor of 95 % for a normal distribution (JCGM 100:2008, G.3.1, table G.1: 1.960). */
export const coverage95 = 1.959963984540054;

const units: Readonly<Record<QuantityName, Quantity['unit']>> = {
  speed: 'm/s',
  'velocity-x': 'm/s',
  'velocity-y': 'm/s',
  'velocity-direction': 'rad',
  acceleration: 'm/s²',
  'acceleration-x': 'm/s²',
  'acceleration-y': 'm/s²',
  'angular-velocity': 'rad/s',
  'angular-acceleration': 'rad/s²',
};

type Covariance = readonly [readonly [number, number], readonly [number, number]];

/** The interval of a magnitude never reaches below zero. */
const atLeastZero = new Set<QuantityName>(['speed', 'acceleration']);

function quantity(
  body: string,
  point: string | null,
  name: QuantityName,
  value: number | null,
  sigma: number | null,
): Quantity[] {
  if (value === null) return [];
  const low = sigma === null ? null : value - coverage95 * sigma;
  return [
    {
      body,
      point,
      name,
      unit: units[name],
      value,
      sigma,
      low: low !== null && atLeastZero.has(name) ? Math.max(0, low) : low,
      high: sigma === null ? null : value + coverage95 * sigma,
    },
  ];
}

const root = (covariance: Covariance | null, i: 0 | 1): number | null =>
  covariance === null ? null : Math.sqrt(Math.max(0, covariance[i][i]));

/** Standard uncertainty of |a| to first order: the covariance along a (JCGM 100:2008, 5.1.2). */
function magnitudeSigma(a: readonly [number, number], c: Covariance | null): number | null {
  const square = a[0] * a[0] + a[1] * a[1];
  if (c === null || square === 0) return null;
  const variance = a[0] * a[0] * c[0][0] + 2 * a[0] * a[1] * c[0][1] + a[1] * a[1] * c[1][1];
  return Math.sqrt(Math.max(0, variance) / square);
}

/**
 * Every velocity and acceleration of every named point and every rate of turning that a branch of a
 * solution fixes, in the order of the document. What is not fixed (null) is left out.
 */
export function quantitiesOf(branch: MotionBranch): Quantity[] {
  const ofBodies = Object.entries(branch.bodies).flatMap(([body, motion]) => [
    ...quantity(body, null, 'angular-velocity', motion.omega, motion.sigma.omega),
    ...quantity(body, null, 'angular-acceleration', motion.alpha, motion.sigma.alpha),
  ]);
  const ofPoints = Object.entries(branch.points).flatMap(([key, motion]) => {
    const dot = key.indexOf('.');
    const [body, point] = [key.slice(0, dot), key.slice(dot + 1)];
    const { velocity: v, acceleration: a, covariance } = motion;
    const of = (name: QuantityName, value: number | null, sigma: number | null) =>
      quantity(body, point, name, value, sigma);
    return [
      ...of('speed', motion.speed, motion.sigma.speed),
      ...of('velocity-x', v && v[0], root(covariance.velocity, 0)),
      ...of('velocity-y', v && v[1], root(covariance.velocity, 1)),
      ...of('velocity-direction', motion.direction, motion.sigma.direction),
      ...of('acceleration', a && Math.hypot(...a), a && magnitudeSigma(a, covariance.acceleration)),
      ...of('acceleration-x', a && a[0], root(covariance.acceleration, 0)),
      ...of('acceleration-y', a && a[1], root(covariance.acceleration, 1)),
    ];
  });
  return [...ofPoints, ...ofBodies];
}

/** One quantity of one branch; undefined where the solution does not have or does not fix it. */
export function findQuantity(
  solution: MotionSolution,
  branch: number,
  body: string,
  point: string | null,
  name: QuantityName,
): Quantity | undefined {
  const chosen = solution.branches.at(branch);
  if (branch < 0 || chosen === undefined) return undefined;
  return quantitiesOf(chosen).find(
    (each) => each.body === body && each.point === point && each.name === name,
  );
}
