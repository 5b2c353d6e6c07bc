import { describe, expect, it } from '@jest/globals';
import { compute, recompute } from '../computation/index';
import { stationUncertaintySolution } from '../documents/station-uncertainty';
import { Random } from '../uncertainty/random';
import { answerStation, stationProblemOf, stationUncertainty } from './index';
import { carDocument, survey, uuid } from './testing';

const marks = survey(new Random(4));
const problem = {
  format: 'centrode.station-uncertainty-problem/1' as const,
  problem: stationProblemOf(carDocument(), 's1', marks),
  draws: 200,
  seed: 3,
};

describe('where the uncertainty of a station comes from', () => {
  const { quantities, refused, warnings } = stationUncertainty(problem);
  const quantity = (point: string | null) =>
    quantities.find((one) => one.point === point) ?? quantities[0];

  it('is a budget whose shares sum to 1 and whose parts combine to the first-order figure', () => {
    for (const { budget, combined, sigma } of quantities) {
      expect(budget.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12);
      // the station's own figure leaves out what a trace gives pose and tangent together
      expect(Math.abs(combined / sigma - 1)).toBeLessThan(0.08);
    }
  });

  it('is the recorder for the speed that it gave, the marks for the turning', () => {
    const [most] = quantity('G').budget;
    expect(most).toMatchObject({ kind: 'known', id: 'recorder' });
    expect(most.share).toBeGreaterThan(0.99);
    expect(most.contribution).toBeCloseTo(0.3, 2);
    const turning = quantities.find((one) => one.quantity === 'angular-velocity');
    const share = turning?.budget
      .filter(({ kind }) => kind === 'mark')
      .reduce((sum, entry) => sum + entry.share, 0);
    expect(share).toBeGreaterThan(0.2);
    expect(turning?.budget.map(({ id }) => id)).toContain(uuid(4));
  });

  it('is confirmed by Monte Carlo', () => {
    expect(refused).toBe(0);
    expect(warnings).toEqual([]);
    for (const { simulated, sigma, value } of quantities) {
      // four standard deviations of so many draws
      expect(Math.abs((simulated?.sigma ?? 0) / sigma - 1)).toBeLessThan(
        4 / Math.sqrt(2 * problem.draws),
      );
      expect(Math.abs((simulated?.mean ?? 0) - value)).toBeLessThan(
        (4 * sigma) / Math.sqrt(problem.draws),
      );
    }
  });

  it('is the same for the same seed, and recorded and computed again to the same bytes', () => {
    const few = { ...problem, draws: 110 };
    const kept = compute('station-uncertainty', few, {}, few.seed);
    expect(() => stationUncertaintySolution.parse(kept.document.result)).not.toThrow();
    expect(recompute(JSON.parse(kept.text)).identical).toBe(true);
  });

  it('is refused as the station is', () => {
    const alone = carDocument({ marks: [] });
    expect(answerStation(alone, 's1', marks).failure).not.toBeNull();
    expect(() =>
      stationUncertainty({ ...problem, problem: stationProblemOf(alone, 's1', marks) }),
    ).toThrow(expect.objectContaining({ field: 'station.marks' }));
  });
});
