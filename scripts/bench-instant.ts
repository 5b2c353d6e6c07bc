import { factorDirect, planBand, solveDirect, spaceFor } from '#shared/engine/instant/direct';
import { compile } from '#shared/engine/instant/compile/index';
import { equationsOf, writeEquations } from '#shared/engine/instant/equations';
import { unknownScales } from '#shared/engine/instant/assemble';
import { stateOf } from '#shared/engine/instant/model';
import { rowsFor } from '#shared/engine/instant/rows';
import { solveInstant } from '#shared/engine/instant/index';
import type { MotionProblem } from '#shared/engine/documents/motion-problem';

/** Speed of the instant solver on chains of pinned links, each driven at a known rate. */
const chain = (count: number, uncertain: boolean): MotionProblem => {
  const bodies: MotionProblem['bodies'] = [];
  const joints: MotionProblem['joints'] = [];
  const knowns: MotionProblem['knowns'] = [];
  let [x, y] = [0, 0];
  for (let k = 0; k < count; k++) {
    const id = `b${k}`;
    const heading = 0.7 * Math.sin(1.3 * k);
    bodies.push({ id, pose: { x, y, heading }, points: { A: [0, 0], B: [1, 0] } });
    const a = { body: id, point: 'A' };
    joints.push(
      k === 0
        ? { id: `j${k}`, kind: 'pin', a, ground: true }
        : { id: `j${k}`, kind: 'pin', a: { body: `b${k - 1}`, point: 'B' }, b: a },
    );
    const sigma = uncertain ? 0.05 : 0;
    const value = Math.cos(k);
    knowns.push({ id: `w${k}`, quantity: 'angular-velocity', body: id, value, sigma });
    knowns.push({ id: `a${k}`, quantity: 'angular-acceleration', body: id, value: Math.sin(k) });
    x += Math.cos(heading);
    y += Math.sin(heading);
  }
  return { format: 'centrode.motion-problem/1', bodies, joints, knowns };
};

/** Processor time of one call in µs, the median of several batches, after warming up. */
const timed = (run: () => void, calls: number): number => {
  for (let i = 0; i < calls; i++) run();
  const batches = Array.from({ length: 7 }, () => {
    const before = process.cpuUsage();
    for (let i = 0; i < calls; i++) run();
    const { user, system } = process.cpuUsage(before);
    return (user + system) / calls;
  });
  return batches.sort((a, b) => a - b)[3];
};

const row = (cells: readonly (string | number)[]): void => {
  console.log(
    cells
      .map((c, i) => (typeof c === 'number' ? c.toFixed(1) : c).padStart(i === 0 ? 8 : 22))
      .join(''),
  );
};

row(['bodies', 'factor and solve both', 'with rows written', 'whole answer', 'with uncertainty']);
for (const [count, calls] of [
  [3, 20_000],
  [10, 5000],
  [100, 500],
  [1000, 40],
]) {
  const model = compile(chain(count, false));
  const s = stateOf(model);
  const [first, second] = (['velocity', 'acceleration'] as const).map((l) => equationsOf(model, l));
  const [v, a] = [rowsFor(first.count), rowsFor(second.count)];
  const scales = unknownScales(model);
  writeEquations(first, model.ground, s, v);
  const plan = planBand(model, v, scales);
  const space = spaceFor(plan);
  const work = new Float64Array(plan.size);
  const kernel = (write: boolean) => (): void => {
    if (write) writeEquations(first, model.ground, s, v);
    const direct = factorDirect(plan, v, space);
    solveDirect(direct, v.right, s.velocity, work);
    if (write) writeEquations(second, model.ground, s, a);
    solveDirect(direct, a.right, s.acceleration, work);
  };
  kernel(true)();
  if (process.argv.includes('--kernel')) {
    row([String(count), timed(kernel(false), calls), timed(kernel(true), calls)]);
    continue;
  }
  const problem = chain(count, false);
  const uncertain = chain(Math.min(count, 100), true);
  row([
    String(count),
    timed(kernel(false), calls),
    timed(kernel(true), calls),
    timed(() => solveInstant(problem), Math.max(3, calls / 20)),
    count > 100 ? '' : timed(() => solveInstant(uncertain), Math.max(3, calls / 20)),
  ]);
}
