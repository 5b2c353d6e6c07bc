import * as z from 'zod';

/**
 * The answer to a pose problem, `centrode.pose-solution/1`. Lengths in m, angles in rad, scene
 * frame. Covariances hold the marks, joints with play, stated poses and uncertain dimensions
 * together, with the uncertainties that were given (not scaled by the fit).
 */
const number = z.number();
const vector = z.tuple([number, number]);
const covariance2 = z.tuple([vector, vector]);
const row3 = z.tuple([number, number, number]);

export const fittedPose = z.object({ x: number, y: number, heading: number });

export const fittedBody = z.object({
  pose: fittedPose,
  /** Over x, y, heading. */
  covariance: z.tuple([row3, row3, row3]),
});

/** Scene position of a body point, with its covariance (uncertain dimensions included). */
export const fittedPoint = z.object({ at: vector, covariance: covariance2 });

export const markResidual = z.object({
  mark: z.string(),
  /** Mark less fitted point, m; of a mark on a line, the part across the line. */
  residual: vector,
  /** Mark's tangent less the fitted direction, rad. */
  tangent: number.optional(),
  /**
   * Baarda's test of this mark: the statistic of the whole mark (both components and the tangent)
   * as an equivalent normal deviate, so that one critical value serves all marks and the choice of
   * axes does not matter. Null where nothing else checks the mark.
   */
  w: number.nullable(),
  /** Share of the mark's information that the fit itself uses, 0 to 1: the mean leverage. */
  leverage: number,
  /** Smallest error of the position, in its least favourable direction, that the test finds in
   * four cases of five; null where the mark cannot be checked. m */
  detectable: number.nullable(),
  /** Weight that the Huber loss left the mark; 1 with squares. */
  weight: number,
});

/** Of a joint with play, a stated pose or an uncertain dimension: given less fitted. */
export const priorResidual = z.object({
  /** Path into the problem, such as `joints.j1` or `bodies.car.points.LF.x`. */
  of: z.string(),
  residual: number,
  w: number.nullable(),
  leverage: number,
});

export const poseSolution = z.object({
  format: z.literal('centrode.pose-solution/1'),
  bodies: z.record(z.string(), fittedBody),
  /**
   * Joint covariance of all poses, in the order x, y, heading of each body in turn; then, if there
   * are any, of the points with uncertain dimensions, x and y of each in the frame of its body.
   */
  covariance: z.object({
    bodies: z.array(z.string()),
    points: z.array(z.object({ body: z.string(), point: z.string() })).optional(),
    matrix: z.array(z.array(number)),
  }),
  /** Every named point of every body, by `body.point`. */
  points: z.record(z.string(), fittedPoint),
  /** Uncertain dimensions after the fit, by `body.point`, in the frame of the body. */
  dimensions: z.record(z.string(), z.object({ at: vector, covariance: covariance2 })),
  residuals: z.array(markResidual),
  priors: z.array(priorResidual),
  redundancy: z.int(),
  chiSquared: number,
  /** Null without redundancy, and with the Huber loss, where χ² has no known distribution. */
  pValue: number.nullable(),
  /** Marks whose |w| exceeds 3.29 (0.1 %), worst first. */
  suspects: z.array(z.string()),
  /** Other poses that fit about as well (χ² within 10.83 of the best), best first. */
  alternatives: z.array(z.object({ bodies: z.record(z.string(), fittedPose), chiSquared: number })),
  method: z.enum(['closed form', 'least squares', 'Huber']),
  iterations: z.int(),
  warnings: z.array(z.string()),
});

export type PoseSolution = z.infer<typeof poseSolution>;
export type FittedBody = z.infer<typeof fittedBody>;
export type FittedPoint = z.infer<typeof fittedPoint>;
export type MarkResidual = z.infer<typeof markResidual>;
export type PriorResidual = z.infer<typeof priorResidual>;
