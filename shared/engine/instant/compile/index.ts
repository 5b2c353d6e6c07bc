import type { MotionProblem } from '../../documents/motion-problem';
import type { Model } from '../model';
import { compileBodies } from './bodies';
import { checkProblem } from './check';
import { References, compileJoints } from './joints';
import { compileKnowns } from './knowns';
import { Layout } from './layout';

/** Makes a motion problem ready for computing; throws an EngineError that names the field at fault. */
export const compile = (problem: MotionProblem): Model => {
  checkProblem(problem);
  const layout = new Layout();
  const { bodies, centre } = compileBodies(problem, layout);
  const references = new References(bodies, layout, centre);
  const joints = compileJoints(problem, layout, references);
  const knowns = compileKnowns(problem, joints, layout, references);
  return {
    bodies,
    ground: bodies.length,
    g: Float64Array.from(layout.values),
    steps: Float64Array.from(layout.steps),
    joints,
    knowns,
    noises: layout.noises,
    centre,
  };
};
