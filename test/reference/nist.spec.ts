import { readdirSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import { covarianceOf } from '#shared/engine/least-squares/covariance';
import { minimise } from '#shared/engine/least-squares/levenberg-marquardt';
import { readExpression } from '#shared/engine/worksheets/expression';
import { caseFile, nameOf } from './case-file';

interface Inputs {
  readonly model: string;
  readonly start1: readonly number[];
  readonly start2: readonly number[];
  readonly x: readonly number[];
  readonly y: readonly number[];
}
interface Expected {
  readonly parameters: readonly number[];
  readonly std_dev: readonly number[];
  readonly residual_SS: number;
  readonly residual_SD: number;
}

/** Digits that agree: the log relative error of the NIST comparison. */
const digits = (got: number, want: number): number =>
  got === want ? 16 : -Math.log10(Math.abs(got - want) / Math.abs(want));

/** The published model in the engine's own arithmetic, its derivatives with it. */
function modelOf(text: string, parameters: readonly string[]) {
  const formula = text
    .replace(/^.*?y\s*=\s*/, '')
    .replace(/\s*\+\s*e\s*$/, '')
    .replaceAll('[', '(')
    .replaceAll(']', ')')
    .replaceAll('**', '^')
    .replaceAll('arctan', 'atan');
  return readExpression(formula, [...parameters, 'x'], 'model');
}

function fit(inputs: Inputs, start: readonly number[]) {
  const names = start.map((_, i) => `b${i + 1}`);
  const model = modelOf(inputs.model, names);
  const m = inputs.y.length;
  return minimise(
    {
      freedom: start.length,
      evaluate: (b) => {
        const duals = inputs.x.map((x) => model.differentiate([...b, x]));
        return {
          residuals: Float64Array.from(duals, (dual, i) => dual.value - inputs.y[i]),
          jacobian: () => {
            const columns = new Float64Array(m * start.length);
            duals.forEach((dual, i) => {
              for (let j = 0; j < start.length; j++) columns[j * m + i] = dual.gradient[j];
            });
            return columns;
          },
        };
      },
    },
    Float64Array.from(start),
    { maxIterations: 2000 },
  );
}

const ids = readdirSync(new URL('./cases/', import.meta.url))
  .filter((name) => name.startsWith('D20_NIST_'))
  .map((name) => name.replace('.json', ''));

describe('NIST StRD non-linear regression, certified to eleven digits', () => {
  for (const id of ids) {
    const check = caseFile<Inputs, Expected>(id);
    for (const [name, start] of [
      ['first start', check.inputs.start1],
      ['second start', check.inputs.start2],
    ] as const) {
      it(`${nameOf(check)}: ${name}`, () => {
        const result = fit(check.inputs, start);
        const { parameters, std_dev: deviations, residual_SS: sum } = check.expected;
        const worst = Math.min(...parameters.map((want, i) => digits(result.x[i], want)));
        expect(worst).toBeGreaterThanOrEqual(6);
        expect(digits(result.sumOfSquares, sum)).toBeGreaterThanOrEqual(6);
        const n = start.length;
        const covariance = covarianceOf(result.jacobian, check.inputs.y.length, n);
        // Not over `dof`: the certified file of Rat43 prints 9 for its 11 degrees of freedom.
        const scale = check.expected.residual_SD ** 2;
        deviations.forEach((want, i) =>
          expect(digits(Math.sqrt(scale * covariance[i * n + i]), want)).toBeGreaterThanOrEqual(5),
        );
      });
    }
  }
});
