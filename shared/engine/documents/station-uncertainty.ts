import * as z from 'zod';
import { stationProblem } from './station';

/**
 * What the speeds of a station owe to each input, and the same by Monte Carlo:
 * `centrode.station-uncertainty-problem/1` and `centrode.station-uncertainty-solution/1`.
 */
const number = z.number();

export const stationUncertaintyProblem = z.strictObject({
  format: z.literal('centrode.station-uncertainty-problem/1'),
  problem: stationProblem,
  /** 0 leaves the simulation out. */
  draws: z.int().min(0).max(100_000),
  seed: z.int().min(0).max(0xffffffff),
});

export const contribution = z.object({
  kind: z.enum(['mark', 'dimension', 'joint', 'stated pose', 'known']),
  /** Id of the mark, joint or known; `body.point` of a dimension; body of a stated pose. */
  id: z.string(),
  label: z.string(),
  /** Standard uncertainty that this input alone gives the quantity, in its unit. */
  contribution: number,
  /** Of the variance of the quantity; the shares sum to 1. */
  share: number,
});

export const quantityUncertainty = z.object({
  quantity: z.enum(['speed', 'angular-velocity']),
  body: z.string(),
  /** Null for a quantity of the whole body. */
  point: z.string().nullable(),
  name: z.string(),
  /** Of the first branch, m/s or rad/s. */
  value: number,
  /** First order, as in the station's answer. */
  sigma: number,
  /** First order, from the inputs one by one; also holds what a trace gives both pose and tangent. */
  combined: number,
  low: number,
  high: number,
  simulated: z
    .object({
      mean: number,
      sigma: number,
      low: number,
      high: number,
      /** With the first-order interval, to one digit of the uncertainty (JCGM 101, clause 8). */
      agrees: z.boolean(),
    })
    .nullable(),
  /** Largest share first. */
  budget: z.array(contribution),
});

export const stationUncertaintySolution = z.object({
  format: z.literal('centrode.station-uncertainty-solution/1'),
  draws: z.int(),
  /** Draws without an answer, left out. */
  refused: z.int(),
  quantities: z.array(quantityUncertainty),
  warnings: z.array(z.string()),
});

export type StationUncertaintyProblem = z.infer<typeof stationUncertaintyProblem>;
export type StationUncertaintySolution = z.infer<typeof stationUncertaintySolution>;
export type QuantityUncertainty = z.infer<typeof quantityUncertainty>;
export type Contribution = z.infer<typeof contribution>;
