import type { StationAnswer, StationProblem } from '../documents/station';
import type {
  Contribution,
  QuantityUncertainty,
  StationUncertaintyProblem,
  StationUncertaintySolution,
} from '../documents/station-uncertainty';
import { EngineError } from '../errors';
import { chunkSize, intervalsAgree, summarise } from '../uncertainty/monte-carlo';
import { coverageInterval } from '../uncertainty/interval';
import { Random } from '../uncertainty/random';
import { causesOf, type Cause } from './causes';
import type { Windows } from './mark-directions';
import { solveStation } from './solve-station';

/** Step of the differences, in standard uncertainties: wide enough for rounding, not for curvature. */
const step = 0.25;
/** Share of draws without an answer above which the simulation says little. */
const manyRefused = 0.01;

/**
 * Where the uncertainty of the speeds and angular velocities of a station comes from, and whether
 * Monte Carlo confirms it.
 *
 * The budget moves every input by itself through the whole computation, from mark to speed; it so
 * holds what a mark gives to pose and tangent together. The simulation draws all inputs at once
 * (normal, as their uncertainties say) and solves the station anew each time. How much of a trace a
 * tangent takes stays as it was: noise on top of the noise that the marks have would shorten it. Of
 * several branches the one nearest to the first is followed. Throws EngineError as the station's failure says.
 * Sources: JCGM 100:2008, 5.1 (budget); JCGM 101:2008, clauses 7 and 8.
 */
export function stationUncertainty({
  problem,
  draws,
  seed,
}: StationUncertaintyProblem): StationUncertaintySolution {
  const answer = solveStation(problem);
  const base: Base = {
    quantities: quantitiesOf(problem, answer),
    windows: new Map(answer.directions.map(({ mark, used }) => [mark, used])),
  };
  const causes = causesOf(problem);
  const slopes = causes.map((cause) => slopesOf(problem, cause, base));
  const simulation = simulate(problem, causes, base, draws, seed);
  const warnings: string[] = [];
  if (simulation.refused > manyRefused * draws)
    warnings.push(
      `${simulation.refused} of ${draws} draws have no answer: the station is close to one that cannot be solved.`,
    );
  return {
    format: 'centrode.station-uncertainty-solution/1',
    draws,
    refused: simulation.refused,
    quantities: base.quantities.map((quantity, q) => {
      const budget = budgetOf(
        causes,
        slopes.map((slope) => slope[q]),
      );
      const { low, high } = coverageInterval(quantity.value, quantity.sigma, {
        least: quantity.quantity === 'speed' ? 0 : -Infinity,
      });
      return {
        ...quantity,
        combined: Math.hypot(...budget.map((entry) => entry.contribution)),
        low,
        high,
        simulated: simulatedOf(simulation.values[q], { low, high, sigma: quantity.sigma }),
        budget,
      };
    }),
    warnings,
  };
}

type Quantity = Pick<
  QuantityUncertainty,
  'quantity' | 'body' | 'point' | 'name' | 'value' | 'sigma'
>;

/** What the station gives as it is, and how much of each trace it took for that. */
interface Base {
  readonly quantities: readonly Quantity[];
  readonly windows: Windows;
}

/** Speeds of the named points and angular velocities that the first branch fixes. */
function quantitiesOf(problem: StationProblem, answer: StationAnswer): Quantity[] {
  if (answer.failure !== null)
    throw new EngineError('unsupported', answer.failure.field, answer.failure.message);
  const [branch] = answer.solution?.branches ?? [];
  if (branch === undefined)
    throw new EngineError('unsupported', 'station', 'The station has no motion to be uncertain.');
  const speeds = answer.speeds.flatMap(({ branch: index, body, point, name, speed, sigma }) =>
    index === 0 && speed !== null && sigma !== null
      ? [{ quantity: 'speed' as const, body, point, name, value: speed, sigma }]
      : [],
  );
  const turns = problem.bodies.flatMap(({ id, name }) => {
    if (!Object.hasOwn(branch.bodies, id)) return [];
    const { omega, sigma } = branch.bodies[id];
    return omega === null || sigma.omega === null
      ? []
      : [
          {
            quantity: 'angular-velocity' as const,
            body: id,
            point: null,
            name,
            value: omega,
            sigma: sigma.omega,
          },
        ];
  });
  return [...speeds, ...turns];
}

/** The quantities of another solution, of its branch nearest to the base; null without all of them. */
function valuesNear(problem: StationProblem, base: Base): Float64Array | null {
  const { quantities, windows } = base;
  const { solution } = solveStation(problem, windows);
  let best: Float64Array | null = null;
  let least = Infinity;
  for (const branch of solution?.branches ?? []) {
    const values = Float64Array.from(quantities, ({ body, point }) =>
      point === null
        ? (branch.bodies[body].omega ?? NaN)
        : (branch.points[`${body}.${point}`].speed ?? NaN),
    );
    const off = values.reduce((sum, value, q) => sum + (value - quantities[q].value) ** 2, 0);
    if (off < least) [least, best] = [off, values];
  }
  return best;
}

function slopesOf(problem: StationProblem, cause: Cause, base: Base): readonly number[] {
  const down = valuesNear(cause.move(problem, -step), base);
  const up = valuesNear(cause.move(problem, step), base);
  // at the edge of what can be solved, one side has to do
  return base.quantities.map(({ value }, q) => {
    if (up !== null && down !== null) return (up[q] - down[q]) / (2 * step);
    if (up !== null) return (up[q] - value) / step;
    return down === null ? 0 : (value - down[q]) / step;
  });
}

/** Causes of one input together, largest share first. */
function budgetOf(causes: readonly Cause[], slopes: readonly number[]): Contribution[] {
  const inputs = new Map<string, { cause: Cause; square: number }>();
  let total = 0;
  causes.forEach((cause, i) => {
    const square = slopes[i] ** 2;
    const key = `${cause.kind} ${cause.id}`;
    inputs.set(key, { cause, square: (inputs.get(key)?.square ?? 0) + square });
    total += square;
  });
  return [...inputs.values()]
    .filter(({ square }) => square > 0)
    .map(({ cause: { kind, id, label }, square }) => ({
      kind,
      id,
      label,
      contribution: Math.sqrt(square),
      share: square / total,
    }))
    .sort((a, b) => b.share - a.share);
}

function simulate(
  problem: StationProblem,
  causes: readonly Cause[],
  base: Base,
  draws: number,
  seed: number,
): { values: readonly Float64Array[]; refused: number } {
  const values = base.quantities.map(() => new Float64Array(draws));
  let random = new Random(seed);
  let count = 0;
  for (let i = 0; i < draws; i++) {
    if (i % chunkSize === 0) random = new Random(seed, i / chunkSize);
    const drawn = causes.reduce((moved, cause) => cause.move(moved, random.normal()), problem);
    const found = valuesNear(drawn, base);
    if (found === null || found.some((value) => !Number.isFinite(value))) continue;
    found.forEach((value, q) => {
      values[q][count] = value;
    });
    count++;
  }
  return { values: values.map((all) => all.subarray(0, count)), refused: draws - count };
}

function simulatedOf(
  values: Float64Array,
  firstOrder: { low: number; high: number; sigma: number },
): QuantityUncertainty['simulated'] {
  if (values.length < 100) return null;
  const { mean, sigma, symmetric } = summarise(values, 0, 0.95);
  const digit = firstOrder.sigma > 0 ? 10 ** Math.floor(Math.log10(firstOrder.sigma)) : 0;
  return {
    mean,
    sigma,
    low: symmetric[0],
    high: symmetric[1],
    agrees: intervalsAgree(firstOrder, symmetric, digit / 2),
  };
}
