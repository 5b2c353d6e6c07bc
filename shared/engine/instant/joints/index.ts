import type { Level, ModelJoint, State } from '../model';
import type { Rows } from '../rows';
import { writeGear, writeGearSlide } from './gear';
import { writeLink, writeLinkLength } from './link';
import { writePath, writeSlide } from './sliding';
import { writePin, writeWeld } from './pin';
import { writeWheel, writeWheelSpeed } from './wheel';

/** Scalar equations that the joint gives at a level. */
export const jointEquations = (j: ModelJoint, level: Level): number => {
  switch (j.kind) {
    case 'pin':
    case 'gear':
      return 2;
    case 'weld':
      return 3;
    case 'path':
      return j.rollingAt < 0 ? 1 : 2;
    case 'link':
      return (level === 'velocity' ? j.rateAt : j.rateChangeAt) < 0 ? 0 : 1;
    case 'wheel':
      return 1;
  }
};

/** Writes the joint's rows from row `at` on, for the motion in `s`. */
export const writeJoint = (
  j: ModelJoint,
  ground: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  switch (j.kind) {
    case 'pin': {
      writePin(j, level, s, rows, at);
      return;
    }
    case 'weld': {
      writeWeld(j, level, s, rows, at);
      return;
    }
    case 'path': {
      writePath(j, level, s, rows, at);
      return;
    }
    case 'link':
      if (jointEquations(j, level) === 1) writeLink(j, level, s, rows, at);
      return;
    case 'wheel': {
      writeWheel(j, ground, level, s, rows, at);
      return;
    }
    case 'gear': {
      writeGear(j, level, s, rows, at);
      return;
    }
  }
};

/** Whether something slides or rolls along the joint, or changes its length. */
export const slides = (j: ModelJoint): boolean => j.kind !== 'pin' && j.kind !== 'weld';

/**
 * One row: the rate of sliding, of rolling or of the length as a function of the motion, with the
 * right side that a rate of zero would have.
 */
export const writeSlideRow = (
  j: ModelJoint,
  ground: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  if (j.kind === 'path') writeSlide(j, level, s, rows, at);
  else if (j.kind === 'link') writeLinkLength(j, level, s, rows, at);
  else if (j.kind === 'gear') writeGearSlide(j, level, s, rows, at);
  else if (j.kind === 'wheel') writeWheelSpeed(j, ground, level, s, rows, at);
};
