import { describe, expect, it } from '@jest/globals';
import { fitPoses, pointEllipse, rankAssignments } from './index';
import { car, carProblem, offsets, round, slanted, type Pair } from './testing';

describe('blunders', () => {
  const pose = { x: 2, y: 1, heading: 0.5 };
  const blunder: Pair[] = offsets.map(([x, y], i) => (i === 2 ? [x + 0.5, y] : [x, y]));

  it('are found by the w-test', () => {
    const { suspects, pValue, residuals, warnings } = fitPoses(
      carProblem(pose, blunder, round(0.02)),
    );
    expect(suspects[0]).toBe('LR');
    expect(pValue).toBeLessThan(1e-6);
    const worst = residuals.reduce((a, b) => ((a.w ?? 0) > (b.w ?? 0) ? a : b));
    expect(worst.mark).toBe('LR');
    expect(warnings.join()).toContain('disagree');
  });

  it('pull a Huber fit less than one of squares', () => {
    const truth = fitPoses(carProblem(pose, offsets, round(0.02))).bodies['car'].pose;
    const squares = fitPoses(carProblem(pose, blunder, round(0.02)));
    const robust = fitPoses({ ...carProblem(pose, blunder, round(0.02)), loss: 'huber' });
    const off = ({ bodies }: typeof robust) =>
      Math.hypot(bodies['car'].pose.x - truth.x, bodies['car'].pose.y - truth.y);
    expect(off(robust)).toBeLessThan(0.5 * off(squares));
    expect(robust.method).toBe('Huber');
    expect(robust.pValue).toBeNull();
    expect(robust.residuals.find(({ mark }) => mark === 'LR')?.weight).toBeLessThan(0.3);
  });

  it('leave a Huber fit of clean marks as it is', () => {
    const small = offsets.map(([x, y]): Pair => [x / 4, y / 4]);
    const squares = fitPoses(carProblem(pose, small, slanted));
    const robust = fitPoses({ ...carProblem(pose, small, slanted), loss: 'huber' });
    expect(robust.bodies['car'].pose).toEqual(squares.bodies['car'].pose);
  });
});

describe('assignments of marks to points', () => {
  it('are ranked with the right one first', () => {
    const given = carProblem({ x: 2, y: 1, heading: 0.5 }, offsets, slanted);
    // not the fourth: a rectangle turned by half a turn is itself
    const names = ['LF', 'RF', 'LR'];
    const ranked = rankAssignments(
      { ...given, marks: given.marks.slice(0, 3) },
      { LF: names, RF: names, LR: names },
    );
    expect(ranked[0].points).toEqual({ LF: 'LF', RF: 'RF', LR: 'LR' });
    expect(ranked).toHaveLength(6);
    expect(ranked[1].chiSquared).toBeGreaterThan(ranked[0].chiSquared);
  });
});

describe('error ellipse of a body point', () => {
  it('is the same by name and by place, and grows away from the marks', () => {
    const solution = fitPoses(carProblem({ x: 2, y: 1, heading: 0.5 }, offsets, slanted));
    const [named, placed] = [
      pointEllipse(solution, 'car', 'LF'),
      pointEllipse(solution, 'car', car['LF']),
    ];
    named.semiAxes.forEach((axis, i) => expect(axis).toBeCloseTo(placed.semiAxes[i], 12));
    const far = pointEllipse(solution, 'car', [30, 0]);
    expect(far.semiAxes[0]).toBeGreaterThan(3 * named.semiAxes[0]);
    expect(() => pointEllipse(solution, 'car', 'XX')).toThrow(
      expect.objectContaining({ code: 'unknown-reference' }),
    );
  });
});
