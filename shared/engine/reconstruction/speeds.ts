import type { MotionSolution } from '../documents/motion-solution';
import type { SpeedRow, StationProblem } from '../documents/station';
import { coverageInterval } from '../uncertainty/interval';

/** Under this many uncertainties, a speed's distribution is not near a normal one. */
const leastRatio = 3;

/** Speed of every named point, branch by branch, with its 95 % interval. */
export function speedsOf({ bodies }: StationProblem, solution: MotionSolution): SpeedRow[] {
  return solution.branches.flatMap((branch, index) =>
    bodies.flatMap((body) =>
      body.points.flatMap(({ id, name }) => {
        const key = `${body.id}.${id}`;
        if (!Object.hasOwn(branch.points, key)) return [];
        const { position, speed, direction, sigma } = branch.points[key];
        const interval =
          speed === null || sigma.speed === null
            ? null
            : coverageInterval(speed, sigma.speed, { least: 0 });
        return [
          {
            branch: index,
            body: body.id,
            point: id,
            name,
            at: position,
            speed,
            sigma: sigma.speed,
            interval:
              interval === null ? null : ([interval.low, interval.high] as [number, number]),
            direction,
            directionSigma: sigma.direction,
            rough: speed !== null && sigma.speed !== null && speed < leastRatio * sigma.speed,
          },
        ];
      }),
    ),
  );
}
