import type { MotionSolution, MotionStatus } from '../documents/motion-solution';
import { chiSquaredPValue } from '../uncertainty/distributions';
import { nullSpace, pivotedQr } from '../linear/pivoted-qr';
import { denseRows, rowNorms, unknownScales } from './assemble';
import type { Equations } from './equations';
import { writeEquations } from './equations';
import type { LevelOutcome } from './level';
import type { Model } from './model';
import { stateOf } from './model';
import { isSingularPosition } from './singular';

export type LevelVerdict = NonNullable<MotionSolution['levels']['acceleration']>;

export interface Judged {
  readonly verdict: LevelVerdict;
  readonly free: readonly Float64Array[];
}

/** What can be said of the equations of one level. */
export const judge = (
  model: Model,
  equations: Equations,
  outcome: LevelOutcome,
  tolerance: number,
): Judged => {
  const unknowns = 3 * model.ground;
  const [best] = outcome.found;
  const common = { unknowns, equations: equations.count };
  if (best === undefined) {
    const { rank, free } = linearRank(model, equations, tolerance);
    const still = new Float64Array(unknowns + 3);
    const singular = isSingularPosition(model, equations, still, tolerance);
    const verdict: LevelVerdict = {
      ...common,
      status: singular ? 'singular' : 'contradictory',
      rank,
      redundancy: 0,
      chiSquared: 0,
      pValue: null,
      condition: null,
    };
    return { verdict, free: singular ? free : [] };
  }
  const { rank, redundancy, chiSquared, condition, free, motion } = best;
  let status: MotionStatus = redundancy > 0 ? 'over-determined' : 'determined';
  if (free.length > 0)
    status = isSingularPosition(model, equations, motion, tolerance)
      ? 'singular'
      : 'under-determined';
  const pValue = redundancy > 0 ? chiSquaredPValue(chiSquared, redundancy) : null;
  return {
    verdict: { ...common, status, rank, redundancy, chiSquared, pValue, condition },
    free,
  };
};

/** Rank and free motions of the linear equations, whatever stands on their right side. */
const linearRank = (
  model: Model,
  equations: Equations,
  tolerance: number,
): { rank: number; free: Float64Array[] } => {
  const s = stateOf(model);
  const rows = writeEquations(equations, model.ground, s);
  const scales = unknownScales(model);
  const chosen = Array.from({ length: equations.count }, (_, k) => k).filter(
    (k) => !equations.quadratic.includes(k),
  );
  const norms = rowNorms(rows, scales, model.ground);
  const qr = pivotedQr(denseRows(model, rows, chosen, scales, norms), tolerance);
  const free = nullSpace(qr).map((z) => {
    const motion = new Float64Array(3 * (model.ground + 1));
    z.forEach((v, i) => {
      motion[i] = v / scales[i];
    });
    return motion;
  });
  return { rank: qr.rank, free };
};
