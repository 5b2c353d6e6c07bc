import type { MarkResidual, PriorResidual } from '../documents/pose-solution';
import type { PoseProblem } from '../documents/pose-problem';
import { symmetricEigen } from '../geometry/symmetric-eigen';
import { scale, turnLeft, unit, type Vector } from '../geometry/vector';
import { equivalentDeviate, nonCentrality } from '../uncertainty/distributions';
import type { Observation, Row } from './equations';
import type { Fit } from './fit';
import { whiten } from './whitened';

/** Relative to the whole: less redundancy than this is none, the rest being rounding. */
const noRedundancy = 1e-9;

interface Test {
  readonly w: number | null;
  readonly leverage: number;
  /** Cofactors of the whitened residuals, I − H for this observation. */
  readonly remaining: readonly (readonly number[])[];
}

/**
 * Baarda's test of one observation of a fit.
 *
 * With e the whitened residual and Q = I − H its cofactors, T = eᵀ·Q⁺·e is χ² with rank(Q)
 * degrees of freedom when the observation holds no blunder.
 * Source: W. Baarda, Publications on Geodesy 2(5), Netherlands Geodetic Commission, 1968.
 */
function test(fit: Fit, observation: Observation, rows: readonly Row[], weight: number): Test {
  const size = fit.layout.size;
  const e = whiten(observation, rows);
  const gradients = observation.whitening.map((coefficients) => {
    const sum = new Float64Array(size);
    coefficients.forEach((coefficient, j) =>
      rows[j].gradient.forEach((value, c) => {
        sum[c] += coefficient * value;
      }),
    );
    return sum;
  });
  const hat = gradients.map((a) => {
    const through = new Float64Array(size);
    for (let i = 0; i < size; i++)
      for (let j = 0; j < size; j++) through[i] += fit.covariance[i * size + j] * a[j];
    return gradients.map((b) => weight * b.reduce((sum, value, i) => sum + value * through[i], 0));
  });
  const remaining = hat.map((row, i) => row.map((h, j) => (i === j ? 1 - h : -h)));
  const { values, vectors } = symmetricEigen(remaining);
  let statistic = 0;
  let rank = 0;
  values.forEach((value, k) => {
    if (value <= noRedundancy) return;
    rank++;
    statistic += vectors[k].reduce((sum, v, i) => sum + v * e[i], 0) ** 2 / value;
  });
  const trace = hat.reduce((sum, row, i) => sum + row[i], 0);
  return {
    w: rank === 0 ? null : equivalentDeviate(statistic, rank),
    leverage: Math.min(1, trace / hat.length),
    remaining,
  };
}

export function judge(
  problem: PoseProblem,
  fit: Fit,
): { marks: MarkResidual[]; priors: PriorResidual[] } {
  const marks: MarkResidual[] = [];
  const priors: PriorResidual[] = [];
  const marksById = new Map(problem.marks.map((mark) => [mark.id, mark]));
  fit.equations.observations.forEach((observation, k) => {
    const rows = observation.evaluate(fit.x);
    const { w, leverage, remaining } = test(fit, observation, rows, fit.weights[k]);
    if (observation.kind === 'prior') {
      priors.push({ of: observation.id, residual: rows[0].value, w, leverage });
      return;
    }
    const line = marksById.get(observation.id)?.line;
    const places = line === undefined ? 2 : 1;
    const residual: Vector =
      line === undefined
        ? [rows[0].value, rows[1].value]
        : scale(rows[0].value, turnLeft(unit(line.direction)));
    marks.push({
      mark: observation.id,
      residual: [residual[0], residual[1]],
      ...(rows.length > places && { tangent: rows[places].value }),
      w,
      leverage,
      detectable: detectable(observation, remaining, places),
      weight: fit.weights[k],
    });
  });
  return { marks, priors };
}

/**
 * √(λ₀/μ) with μ the least eigenvalue of Wᵀ·Q·W over the position: the error of the mark that the
 * test finds with 80 % power, where it is hardest to find (Baarda's minimal detectable bias).
 */
function detectable(
  observation: Observation,
  remaining: readonly (readonly number[])[],
  places: number,
): number | null {
  const w = observation.whitening;
  const at = (k: number, i: number): number => w[k][i] ?? 0;
  const inner = Array.from({ length: places }, (_, i) =>
    Array.from({ length: places }, (__, j) => {
      let sum = 0;
      for (let k = 0; k < places; k++)
        for (let l = 0; l < places; l++) sum += at(k, i) * remaining[k][l] * at(l, j);
      return sum;
    }),
  );
  const [least] = symmetricEigen(inner).values;
  const most = Math.max(...inner.map((row, i) => row[i]));
  const bare = Math.max(...w.slice(0, places).map((row) => Math.hypot(...row)));
  return most > 0 && least > noRedundancy * bare ** 2 ? Math.sqrt(nonCentrality() / least) : null;
}
