/**
 * Huber's bound for residuals of one, two and three components with unit covariance: each is
 * passed by the same share (17.9 %) of good observations as k = 1.345 in one dimension, which keeps
 * 95 % efficiency. k² is the 0.8214 quantile of χ² with that many degrees of freedom.
 * Source: P. J. Huber, Robust Statistics, Wiley 1981 (k = 1.345 from memory).
 */
const bounds = [1.345, 1.8559, 2.2167];

/** min(1, k/|u|): the weight that Huber's loss leaves an observation with residual size |u|. */
export function huberWeight(size: number, components = 1): number {
  const bound = bounds[components - 1];
  return size > bound ? bound / size : 1;
}
