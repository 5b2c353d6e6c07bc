import type { MarkResidual, PriorResidual } from '../documents/pose-solution';
import type { PoseProblem } from '../documents/pose-problem';
import { symmetricEigen } from '../least-squares/symmetric-eigen';
import { scale, turnLeft, unit, type Vector } from '../geometry/vector';
import { noRedundancy, testForBlunder } from '../least-squares/baarda';
import { nonCentrality } from '../uncertainty/distributions';
import type { Observation, Row } from './equations';
import type { Fit } from './fit';
import { whiten } from './whitened';

/** Derivatives of the whitened residuals. */
function whitenedGradients(observation: Observation, rows: readonly Row[]): Float64Array[] {
  return observation.whitening.map((coefficients) => {
    const sum = new Float64Array(rows[0].gradient.length);
    coefficients.forEach((coefficient, j) =>
      rows[j].gradient.forEach((value, c) => {
        sum[c] += coefficient * value;
      }),
    );
    return sum;
  });
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
    const { w, leverage, remaining } = testForBlunder(
      whiten(observation, rows),
      whitenedGradients(observation, rows),
      fit.covariance,
      fit.weights[k],
    );
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
