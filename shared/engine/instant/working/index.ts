import type { MotionProblem } from '../../documents/motion-problem';
import type { MotionSolution } from '../../documents/motion-solution';
import { EngineError } from '../../errors';
import { answerTo } from '../answers';
import type { Equations } from '../equations';
import { equationsOf } from '../equations';
import type { Level, Place } from '../model';
import type { Answer, AnswerBranch } from '../solve';
import { writeGroup } from './group';
import { Notation } from './notation';
import { planGroups } from './plan';
import { Sheet } from './sheet';
import type { Working, WorkingStep } from './working';

/**
 * The derivation of a point's velocity and acceleration as a person writes it: along the shortest
 * chain of bodies from what is known, each vector equation with its x and y equations. The
 * arithmetic of its steps is done anew from the numbers written in them, and agrees with the
 * solver's. Where knowns are more than needed it works with the adjusted values and says so.
 */
export const workInstant = (
  problem: MotionProblem,
  solution: MotionSolution,
  asked: { readonly body: string; readonly point: string },
  branch = 0,
): Working => {
  const answer = answerTo(problem, solution);
  const { model } = answer;
  const index = model.bodies.findIndex((b) => b.id === asked.body);
  const place = model.bodies[index]?.points.get(asked.point);
  if (place === undefined)
    throw new EngineError(
      'unknown-reference',
      'asked.point',
      `There is no point ${asked.point} on a body ${asked.body}.`,
    );
  const found = answer.branches[branch];
  if (found === undefined) {
    const text = ['There is no motion to derive.', ...solution.warnings].join(' ');
    const step = openStep('velocity', text);
    return { asked, branch, chain: [], steps: [step] };
  }
  const velocity = writeLevel(
    answer,
    found,
    'velocity',
    answer.velocity.equations,
    place,
    solution,
  );
  const steps = [...velocity.steps];
  if (velocity.complete && answer.acceleration !== null) {
    const waiting = answer.acceleration.waiting;
    const equations = equationsOf(model, 'acceleration', (id) => waiting.includes(id));
    steps.push(...writeLevel(answer, found, 'acceleration', equations, place, solution).steps);
  }
  return { asked, branch, chain: velocity.chain.map((b) => model.bodies[b].id), steps };
};

interface Written {
  readonly steps: readonly WorkingStep[];
  readonly chain: readonly number[];
  readonly complete: boolean;
}

const openStep = (level: Level, text: string): WorkingStep => ({
  kind: 'open',
  level,
  text,
  equations: [],
  scalarEquations: 0,
  unknowns: [],
  results: [],
  uses: [],
  arrows: [],
});

const writeLevel = (
  answer: Answer,
  found: AnswerBranch,
  level: Level,
  equations: Equations,
  asked: Place,
  solution: MotionSolution,
): Written => {
  const { model } = answer;
  const { state } = found;
  const index = answer.branches.indexOf(found);
  const { id } = model.bodies[asked.body];
  const sheet = new Sheet(model, state, level, new Notation(model, state));
  const reported = solution.branches[index].points[`${id}.${sheet.notation.nameAt(asked) ?? ''}`];
  const groups =
    reported[level] === null
      ? null
      : planGroups(model, equations, state, asked.body, answer.tolerance);
  if (groups === null && reported[level] !== null) {
    sheet.add({
      kind: 'held',
      text: `The ${level} of ${sheet.notation.pointName(asked)} is fixed by itself, although the motion of the ${sheet.notation.bodyName(asked.body)} is not.`,
      uses: [sheet.notation.pointReference(asked)],
    });
    writeResult(sheet, asked, reported[level], solution, found, answer);
    return { steps: sheet.steps, chain: [asked.body], complete: false };
  }
  if (groups === null) {
    const reasons = solution.free.filter((f) => f.level === level).map((f) => f.motion);
    const [help] = solution.helps.filter((h) => h.includes(level));
    const text = [
      `The problem does not fix the ${level} of ${asked.body < model.ground ? model.bodies[asked.body].name : ''}.`,
      ...(reasons.length > 0 ? [`Still free: ${reasons.join('; ')}.`] : []),
      ...(help !== undefined ? [`A further known would settle it: ${help}.`] : []),
    ].join(' ');
    return { steps: [openStep(level, text)], chain: [], complete: false };
  }
  for (const group of groups) writeGroup(sheet, group, model.g);
  const known = sheet.carry(asked);
  writeResult(sheet, asked, sheet.evaluate([known]), solution, found, answer);
  return { steps: sheet.steps, chain: groups.flatMap((g) => g.bodies), complete: true };
};

const writeResult = (
  sheet: Sheet,
  place: Place,
  v: readonly [number, number],
  solution: MotionSolution,
  found: AnswerBranch,
  answer: Answer,
): void => {
  const { notation, level, model } = sheet;
  const { id } = model.bodies[place.body];
  const reported = solution.branches[answer.branches.indexOf(found)];
  const point = reported.points[`${id}.${notation.nameAt(place) ?? ''}`];
  const body = reported.bodies[id];
  const velocity = level === 'velocity';
  const covariance = point.covariance[level];
  const turn = notation.turn(level, place.body);
  const x = notation.component(level, place, 'x');
  const y = notation.component(level, place, 'y');
  const size = Math.hypot(v[0], v[1]);
  const spread = (k: 0 | 1): number | null =>
    covariance === null ? null : Math.sqrt(covariance[k][k]);
  const results = [
    sheet.result(x, v[0], spread(0)),
    sheet.result(y, v[1], spread(1)),
    sheet.result(
      notation.magnitude(level, place),
      size,
      velocity ? point.sigma.speed : alongSpread(v, covariance),
    ),
  ];
  if (size > 0) {
    const angle = Math.atan2(v[1], v[0]);
    results.push(
      sheet.result(
        notation.direction(level, place),
        angle,
        velocity ? point.sigma.direction : null,
      ),
    );
  }
  const turning = velocity ? body.omega : body.alpha;
  if (turning !== null)
    results.push(sheet.result(turn, turning, velocity ? body.sigma.omega : body.sigma.alpha));
  sheet.add({
    kind: 'result',
    text: `The ${level} of ${notation.pointName(place)}.`,
    results,
    uses: [notation.pointReference(place)],
    arrows: [
      { tex: notation.vectorTex(level, place), role: 'result', from: [0, 0], to: [v[0], v[1]] },
    ],
  });
};

/** Standard uncertainty of a vector's magnitude. */
const alongSpread = (
  v: readonly [number, number],
  covariance: readonly (readonly [number, number])[] | null,
): number | null => {
  const size = Math.hypot(v[0], v[1]);
  if (covariance === null || size === 0) return null;
  const [x, y] = [v[0] / size, v[1] / size];
  return Math.sqrt(
    Math.max(0, x * x * covariance[0][0] + 2 * x * y * covariance[0][1] + y * y * covariance[1][1]),
  );
};
