import * as z from 'zod';
import { motionProblem } from './motion-problem';
import { motionSolution } from './motion-solution';
import { poseProblem } from './pose-problem';
import { poseSolution } from './pose-solution';
import { reconstructionBody, reconstructionJoint, station } from './reconstruction';

/**
 * One station of a reconstruction with the survey marks that it uses, complete in itself:
 * `centrode.station-problem/1`. Its answer, `centrode.station-answer/1`, holds the engine problems
 * that were made of it and their solutions.
 */
const number = z.number();
const vector = z.tuple([number, number]);
const covariance2 = z.tuple([vector, vector]);

/** What the engine takes of a survey mark. m, m², scene frame. */
export const stationMark = z.object({
  id: z.string().min(1),
  label: z.string(),
  at: vector,
  covariance: covariance2,
  /** Name of the trace that it is a point of, and its place along it. */
  trace: z.string().nullable(),
  order: z.int().nullable(),
});

export const stationProblem = z.strictObject({
  format: z.literal('centrode.station-problem/1'),
  bodies: z.array(reconstructionBody),
  joints: z.array(reconstructionJoint),
  station,
  marks: z.array(stationMark),
});

/** Direction of a trace at a mark, taken as the direction in which the point moved. */
export const markDirection = z.object({
  mark: z.string(),
  body: z.string(),
  point: z.string(),
  trace: z.string(),
  foot: vector,
  direction: number,
  sigma: number,
  curvature: number.nullable(),
  curvatureSigma: number.nullable(),
  /** Points of the trace that the local fit took, and its p-value. */
  used: z.int(),
  pValue: number.nullable(),
});

export const speedRow = z.object({
  /** Place of the solution branch, from 0. */
  branch: z.int(),
  body: z.string(),
  point: z.string(),
  name: z.string(),
  at: vector,
  /** m/s; null where the station does not fix it. */
  speed: number.nullable(),
  sigma: number.nullable(),
  /** 95 % coverage interval, not below 0. */
  interval: vector.nullable(),
  /** rad */
  direction: number.nullable(),
  directionSigma: number.nullable(),
  /** The speed is under three times its uncertainty: its interval is rough. */
  rough: z.boolean(),
});

export const stationAnswer = z.object({
  format: z.literal('centrode.station-answer/1'),
  poseProblem: poseProblem.nullable(),
  pose: poseSolution.nullable(),
  directions: z.array(markDirection),
  problem: motionProblem.nullable(),
  solution: motionSolution.nullable(),
  speeds: z.array(speedRow),
  /** Bodies whose pose nothing at this station fixes; they take no part. */
  unplaced: z.array(z.string()),
  /** Why the answer ends early; null when it does not. */
  failure: z
    .object({
      stage: z.enum(['pose', 'motion']),
      code: z.string(),
      field: z.string(),
      message: z.string(),
    })
    .nullable(),
  warnings: z.array(z.string()),
});

export type StationMark = z.infer<typeof stationMark>;
export type StationProblem = z.infer<typeof stationProblem>;
export type MarkDirection = z.infer<typeof markDirection>;
export type SpeedRow = z.infer<typeof speedRow>;
export type StationAnswer = z.infer<typeof stationAnswer>;
