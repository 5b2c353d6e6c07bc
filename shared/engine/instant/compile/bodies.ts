import type { BodyPoint, MotionBody, MotionProblem } from '../../documents/motion-problem';
import { EngineError } from '../../errors';
import type { Vector } from '../../geometry/vector';
import { add, norm, rotate, scale, subtract } from '../../geometry/vector';
import { fromRows } from '../../linear/dense';
import type { ModelBody, Noise, Place } from '../model';
import { noisesOf, pairNoises } from '../noise';
import type { Layout } from './layout';
import { smallStep } from './layout';

const isVector = (p: BodyPoint): p is [number, number] => Array.isArray(p);

const coordinates = (p: BodyPoint): Vector => (isVector(p) ? p : p.at);

const mean = (points: readonly Vector[]): Vector =>
  points.length === 0 ? [0, 0] : scale(1 / points.length, points.reduce(add));

/** Lengths of the bodies; one without extent takes the mean of the others, or 1 m. */
const lengthsOf = (bodies: readonly MotionBody[], centroids: readonly Vector[]): number[] => {
  const own = bodies.map((b, i) =>
    Object.values(b.points).reduce(
      (most, p) => Math.max(most, norm(subtract(coordinates(p), centroids[i]))),
      0,
    ),
  );
  const known = own.filter((l) => l > 0);
  const typical = known.length > 0 ? known.reduce((a, b) => a + b) / known.length : 1;
  return own.map((l) => (l > 0 ? l : typical));
};

/** Lays out poses (at centroids, ground last) and points. */
export const compileBodies = (
  problem: MotionProblem,
  layout: Layout,
): { bodies: ModelBody[]; centre: Vector } => {
  const documents = problem.bodies;
  const centre = mean(documents.map((b): Vector => [b.pose.x, b.pose.y]));
  const centroids = documents.map((b) => mean(Object.values(b.points).map(coordinates)));
  const lengths = lengthsOf(documents, centroids);
  documents.forEach((b, i) => {
    const at = add(subtract([b.pose.x, b.pose.y], centre), rotate(b.pose.heading, centroids[i]));
    layout.push(at[0], smallStep * lengths[i]);
    layout.push(at[1], smallStep * lengths[i]);
    layout.angle(b.pose.heading);
  });
  for (let k = 0; k < 3; k++) layout.linear(0);
  const bodies = documents.map((b, i): ModelBody => {
    const step = smallStep * lengths[i];
    const place = (p: Vector): Place =>
      layout.place(i, p[0] - centroids[i][0], p[1] - centroids[i][1], step);
    const points = new Map<string, Place>();
    for (const [name, point] of Object.entries(b.points)) {
      const at = place(coordinates(point));
      points.set(name, at);
      if (!isVector(point))
        layout.noises.push(
          ...pairNoises(
            { kind: 'point', id: `${b.id}.${name}` },
            [at.at, at.at + 1],
            point,
            `bodies.${b.id}.points.${name}`,
          ),
        );
    }
    return {
      id: b.id,
      name: b.label ?? b.id,
      length: lengths[i],
      follows: b.poseFollows === true,
      origin: place([0, 0]),
      points,
    };
  });
  poseNoises(problem, bodies, centroids, layout);
  return { bodies, centre };
};

/** How x, y and heading of body i, as documented at its origin, move the pose at the centroid. */
const poseDirections = (body: MotionBody, i: number, centroid: Vector): Noise['entries'][] => {
  const arm = rotate(body.pose.heading, centroid);
  return [
    [{ at: 3 * i, amount: 1 }],
    [{ at: 3 * i + 1, amount: 1 }],
    [
      { at: 3 * i + 2, amount: 1 },
      { at: 3 * i, amount: -arm[1] },
      { at: 3 * i + 1, amount: arm[0] },
    ],
  ];
};

const poseNoises = (
  problem: MotionProblem,
  bodies: readonly ModelBody[],
  centroids: readonly Vector[],
  layout: Layout,
): void => {
  const together = problem.poseCovariance;
  const joined = new Set(together?.bodies ?? []);
  if (together !== undefined) {
    const points = together.points ?? [];
    const size = 3 * together.bodies.length + 2 * points.length;
    const { matrix } = together;
    if (matrix.length !== size || matrix.some((row) => row.length !== size))
      throw new EngineError(
        'not-a-covariance',
        'poseCovariance.matrix',
        `poseCovariance.matrix must have ${size} rows and columns, three for each body and two for each point.`,
      );
    const poses = together.bodies.flatMap((id) => {
      const i = problem.bodies.findIndex((b) => b.id === id);
      if (i < 0)
        throw new EngineError(
          'unknown-reference',
          'poseCovariance.bodies',
          `There is no body ${id}.`,
        );
      return poseDirections(problem.bodies[i], i, centroids[i]);
    });
    const dimensions = points.flatMap(({ body, point }) => {
      const place = bodies.find((b) => b.id === body)?.points.get(point);
      if (place === undefined)
        throw new EngineError(
          'unknown-reference',
          'poseCovariance.points',
          `There is no point ${body}.${point}.`,
        );
      return [[{ at: place.at, amount: 1 }], [{ at: place.at + 1, amount: 1 }]];
    });
    const source = { kind: 'pose', id: together.bodies.join(', ') } as const;
    layout.noises.push(
      ...noisesOf(source, [...poses, ...dimensions], fromRows(matrix), 'poseCovariance.matrix'),
    );
  }
  problem.bodies.forEach((b, i) => {
    if (b.poseCovariance === undefined || joined.has(b.id)) return;
    layout.noises.push(
      ...noisesOf(
        { kind: 'pose', id: b.id },
        poseDirections(b, i, centroids[i]),
        fromRows(b.poseCovariance),
        `bodies.${b.id}.poseCovariance`,
      ),
    );
  });
};
