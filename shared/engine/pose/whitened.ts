import { huberWeight } from '../least-squares/huber';
import type { Observation, Row } from './equations';

/**
 * Observations divided by their uncertainty: residuals with unit covariance, so that their sum of
 * squares is χ².
 */
export function whitened(
  observations: readonly Observation[],
  x: Float64Array,
  weights: readonly number[],
): { residuals: Float64Array; jacobian: () => Float64Array } {
  const evaluated = observations.map((observation) => observation.evaluate(x));
  const total = evaluated.reduce((sum, rows) => sum + rows.length, 0);
  const residuals = new Float64Array(total);
  let at = 0;
  observations.forEach((observation, k) => {
    const root = Math.sqrt(weights[k]);
    for (const value of whiten(observation, evaluated[k])) residuals[at++] = root * value;
  });
  return {
    residuals,
    jacobian: () => {
      const jacobian = new Float64Array(total * x.length);
      let row = 0;
      observations.forEach((observation, k) => {
        const root = Math.sqrt(weights[k]);
        for (const coefficients of observation.whitening) {
          coefficients.forEach((coefficient, j) => {
            const { gradient } = evaluated[k][j];
            for (let c = 0; c < x.length; c++)
              jacobian[c * total + row] += root * coefficient * gradient[c];
          });
          row++;
        }
      });
      return jacobian;
    },
  };
}

export const whitenedJacobian = (
  observations: readonly Observation[],
  x: Float64Array,
  weights: readonly number[],
): Float64Array => whitened(observations, x, weights).jacobian();

/** Residuals of one observation, with unit covariance. */
export const whiten = (observation: Observation, rows: readonly Row[]): readonly number[] =>
  observation.whitening.map((coefficients) =>
    coefficients.reduce((sum, coefficient, j) => sum + coefficient * rows[j].value, 0),
  );

/** Huber's weight of each mark; priors keep weight 1, since a joint is not a blunder. */
export const observationWeights = (
  observations: readonly Observation[],
  x: Float64Array,
): readonly number[] =>
  observations.map((observation) => {
    if (observation.kind !== 'mark') return 1;
    const size = Math.hypot(...whiten(observation, observation.evaluate(x)));
    return huberWeight(size, observation.whitening.length);
  });
