import { EngineError } from '../errors';
import { zeros } from '../linear/dense';
import { pivotedQr, solveLeastSquares } from '../linear/pivoted-qr';
import type { MotionProblem } from '../documents/motion-problem';
import type { Model, ModelJoint, Noise, State } from './model';
import { positionX, positionY, stateOf, turn } from './model';

/** Widest gap that is taken for rounding where the problem does not say: 1 mm, 1 % of a body. */
const widest = 1e-3;
const share = 1e-2;

/** How far the joint is from closing, m (and rad for a weld's last); empty where any pose will do. */
export const closureOf = (j: ModelJoint, s: State): number[] => {
  if (j.kind === 'wheel') return [];
  const dx = positionX(s, j.a) - positionX(s, j.b);
  const dy = positionY(s, j.a) - positionY(s, j.b);
  switch (j.kind) {
    case 'pin':
      return [dx, dy];
    case 'weld':
      return [dx, dy, s.g[3 * j.a.body + 2] - s.g[3 * j.b.body + 2]];
    case 'link':
      return [Math.hypot(dx, dy)];
    case 'gear':
      return [Math.hypot(dx, dy) - Math.abs(s.g[j.radiusAt] + s.g[j.otherRadiusAt])];
    case 'path': {
      const angle = s.g[j.directionAt] + s.g[3 * j.b.body + 2];
      const nx = -Math.sin(angle);
      const ny = Math.cos(angle);
      const rolling = j.rollingAt < 0 ? 0 : s.g[j.rollingAt];
      if (j.radiusAt < 0) return [nx * dx + ny * dy - rolling];
      const radius = s.g[j.radiusAt];
      const toCentre = Math.hypot(nx * radius - dx, ny * radius - dy);
      return [toCentre - Math.abs(radius - rolling)];
    }
  }
};

/** Refuses poses at which a joint's parts do not meet. Returns the widest gap over its body's length. */
export const checkClosure = (problem: MotionProblem, model: Model): number => {
  const s = stateOf(model);
  let worst = 0;
  for (const j of model.joints) {
    if (j.kind === 'wheel' || j.kind === 'link') continue;
    const gap = Math.hypot(...closureOf(j, s).slice(0, 2));
    const length = Math.min(
      ...[j.a.body, j.b.body].filter((b) => b < model.ground).map((b) => model.bodies[b].length),
    );
    const limit = problem.closureTolerance ?? Math.min(widest, share * length);
    if (gap > limit)
      throw new EngineError(
        'joint-does-not-close',
        `joints.${j.id}`,
        `The joint ${j.id} does not close: its parts are ${(1000 * gap).toPrecision(3)} mm apart.`,
      );
    worst = Math.max(worst, gap / length);
  }
  return worst;
};

/** Derivatives of closures by given directions in the values, a column for each direction. */
const closureColumns = (
  model: Model,
  joints: readonly ModelJoint[],
  directions: readonly Noise['entries'][],
): number[][] => {
  const s = stateOf(model, Float64Array.from(model.g));
  return directions.map((entries) => {
    const step = Math.min(...entries.map((e) => model.steps[e.at] / Math.abs(e.amount)));
    const at = (t: number): number[] => {
      for (const e of entries) {
        s.g[e.at] = model.g[e.at] + t * e.amount;
        if (e.at < 3 * model.ground && e.at % 3 === 2) turn(s, (e.at - 2) / 3);
      }
      return joints.flatMap((j) => closureOf(j, s));
    };
    const [a, b, c, d] = [at(step), at(-step), at(2 * step), at(-2 * step)];
    at(0);
    return a.map((v, i) => (8 * (v - b[i]) - (c[i] - d[i])) / (12 * step));
  });
};

const poseEntries = (body: number): Noise['entries'][] =>
  [0, 1, 2].map((k) => [{ at: 3 * body + k, amount: 1 }]);

/** Derivatives of all closures by all poses: the mechanism's Jacobian at its position. */
export const closureJacobian = (model: Model): { columns: number[][]; values: number[] } => ({
  columns: closureColumns(
    model,
    model.joints,
    model.bodies.flatMap((_, b) => poseEntries(b)),
  ),
  values: model.joints.flatMap((j) => closureOf(j, stateOf(model))),
});

/**
 * Lets poses that were not measured follow every noise so that their joints stay closed, to first
 * order.
 */
export const letPosesFollow = (model: Model): Model => {
  const followers = model.bodies.flatMap((b, i) => (b.follows ? [i] : []));
  if (followers.length === 0 || model.noises.length === 0) return model;
  for (const { source, entries } of model.noises)
    if (source.kind === 'pose')
      for (const { at } of entries)
        if (at < 3 * model.ground && followers.includes(Math.floor(at / 3)))
          throw new EngineError(
            'unsupported',
            `bodies.${model.bodies[Math.floor(at / 3)].id}.poseCovariance`,
            'A pose that follows from the joints has no covariance of its own.',
          );
  const joints = model.joints.filter(
    (j) => followers.includes(j.a.body) || ('b' in j && followers.includes(j.b.body)),
  );
  const unknowns = followers.flatMap((body) => [3 * body, 3 * body + 1, 3 * body + 2]);
  const scale = unknowns.map((at) => (at % 3 === 2 ? model.bodies[(at - 2) / 3].length : 1));
  const own = closureColumns(model, joints, followers.flatMap(poseEntries));
  const matrix = zeros(own[0].length, unknowns.length);
  own.forEach((column, c) =>
    column.forEach((v, r) => {
      matrix.values[r * unknowns.length + c] = v / scale[c];
    }),
  );
  const qr = pivotedQr(matrix);
  const given = closureColumns(
    model,
    joints,
    model.noises.map((n) => n.entries),
  );
  return {
    ...model,
    noises: model.noises.map((noise, j) => {
      if (given[j].every((v) => v === 0)) return noise;
      const moved = solveLeastSquares(
        qr,
        given[j].map((v) => -v),
      );
      const entries = unknowns.flatMap((at, i) =>
        moved[i] === 0 ? [] : [{ at, amount: moved[i] / scale[i] }],
      );
      return { source: noise.source, entries: [...noise.entries, ...entries] };
    }),
  };
};
