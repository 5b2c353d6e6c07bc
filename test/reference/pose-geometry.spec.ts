import { describe, expect, it } from '@jest/globals';
import { radiusFromChord } from '#shared/engine/geometry/chord-radius';
import { algebraicCircle, fitCircle } from '#shared/engine/geometry/circle-fit';
import type { Vector } from '#shared/engine/geometry/vector';
import { testForBlunder } from '#shared/engine/least-squares/baarda';
import { huberWeight } from '#shared/engine/least-squares/huber';
import { minimise } from '#shared/engine/least-squares/levenberg-marquardt';
import { derivativesAt, fitPolynomial } from '#shared/engine/least-squares/polynomial';
import { factorise, solve } from '#shared/engine/least-squares/qr';
import { monteCarlo } from '#shared/engine/uncertainty/monte-carlo';
import { nonCentrality } from '#shared/engine/uncertainty/distributions';
import { Random } from '#shared/engine/uncertainty/random';
import { independent } from '#shared/engine/uncertainty/sampling';
import { caseFile, expectClose, nameOf } from './case-file';

type Numbers = Record<string, number>;

const round = (sigma: number): [Vector, Vector] => [
  [sigma ** 2, 0],
  [0, sigma ** 2],
];

describe('circle through measured points', () => {
  const b06 = caseFile<
    { x: number[]; y: number[]; sigma_radial: number },
    Record<string, number[]> & { geometric_cov: number[][]; geometric_SS_weighted: number }
  >('B06_circle_gander');
  const points = b06.inputs.x.map((x, i): Vector => [x, b06.inputs.y[i]]);

  for (const method of ['kasa', 'pratt', 'taubin', 'hyper'] as const)
    it(`${nameOf(b06)}, ${method}`, () => {
      const { centre, radius } = algebraicCircle(points, method);
      expectClose([...centre, radius], b06.expected[`${method}_a_b_r`], b06.tolerance);
    });

  it(`${nameOf(b06)}, geometric`, () => {
    const fit = fitCircle(points.map((at) => ({ at, covariance: round(b06.inputs.sigma_radial) })));
    expectClose([...fit.centre, fit.radius], b06.expected['geometric_a_b_r'], b06.tolerance);
    expectClose(fit.chiSquared, b06.expected.geometric_SS_weighted, b06.tolerance);
    expectClose(fit.covariance, b06.expected.geometric_cov, b06.tolerance);
  });

  interface Arc {
    readonly R: number;
    readonly arc: number;
    readonly n: number;
    readonly sigma: number;
  }
  for (const id of ['B07m_circle_bias_mc', 'B07n_circle_bias_mc_heavy']) {
    const check = caseFile<Arc, Record<string, [number, number, number]>>(id);
    it(`${nameOf(check)} (600 seeded trials)`, () => {
      const { R, arc, n, sigma } = check.inputs;
      const random = new Random(19);
      const trials = 600;
      const radii: Record<string, number[]> = { kasa: [], pratt: [], taubin: [], geo: [] };
      for (let k = 0; k < trials; k++) {
        const noisy = Array.from({ length: n }, (_, i): Vector => {
          const angle = ((i / (n - 1) - 0.5) * arc) / R;
          return [
            R * Math.sin(angle) + sigma * random.normal(),
            R * Math.cos(angle) + sigma * random.normal(),
          ];
        });
        for (const method of ['kasa', 'pratt', 'taubin'] as const)
          radii[method].push(algebraicCircle(noisy, method).radius);
        radii['geo'].push(fitCircle(noisy.map((at) => ({ at, covariance: round(sigma) }))).radius);
      }
      for (const [method, values] of Object.entries(radii)) {
        const [mean, deviation, median] = check.expected[`${method}_mean_sd_median`];
        const error = deviation / Math.sqrt(trials);
        values.sort((a, b) => a - b);
        expectClose(values.reduce((sum, r) => sum + r, 0) / trials, mean, { abs: 4 * error });
        expectClose(values[trials / 2], median, { abs: 6 * error });
      }
    });
  }
});

describe('radius from chord and middle ordinate', () => {
  const b08 = caseFile<
    { subcases: Record<string, { C: number; M: number; u_C: number; u_M: number }> },
    Record<string, Numbers & { mc_95: number[] }>
  >('B08_chord_middle_ordinate');
  for (const [key, { C, M, u_C: uC, u_M: uM }] of Object.entries(b08.inputs.subcases))
    it(`${nameOf(b08)}, ${key}`, () => {
      const expected = b08.expected[key];
      const { radius, sigma, sensitivity, warnings } = radiusFromChord(C, M, [uC, uM]);
      expectClose(radius, expected['r'], b08.tolerance);
      expectClose(sigma, expected['u_r'], b08.tolerance);
      expectClose(sensitivity, [expected['dr_dC'], expected['dr_dM']], b08.tolerance);
      expect(warnings).toHaveLength(uM > 0.1 * M ? 1 : 0);
      const simulated = monteCarlo(
        ([c, m]) => radiusFromChord(c, m).radius,
        independent([
          { kind: 'normal', mean: C, sigma: uC },
          { kind: 'normal', mean: M, sigma: uM },
        ]),
        2,
        { draws: 40_000, seed: 4 },
      );
      expectClose(simulated.mean, expected['mc_mean'], { rel: 0.02 });
      expectClose(simulated.sigma, expected['mc_sd'], { rel: 0.02 });
      expectClose(simulated.symmetric, expected.mc_95, { rel: 0.02 });
    });

  it('refuses a middle ordinate of zero, naming it', () => {
    expect(() => radiusFromChord(15, 0)).toThrow(
      expect.objectContaining({ code: 'zero-length', field: 'middleOrdinate' }),
    );
  });
});

describe('polynomial with uncertainty', () => {
  for (const id of ['B09_poly_deg2', 'B09_poly_deg3']) {
    const check = caseFile<
      { t: number[]; x: number[]; sigma: number[]; degree: number },
      Record<string, Numbers & number[] & number[][]> & { chi2: number; dof: number }
    >(id);
    it(nameOf(check), () => {
      const { t, x, sigma, degree } = check.inputs;
      const { expected, tolerance } = check;
      const fit = fitPolynomial(t, x, sigma, degree);
      const n = degree + 1;
      expectClose(fit.coefficients, expected['coeff_c0..'], tolerance);
      expectClose(
        Array.from({ length: n }, (_, i) => fit.covariance.subarray(i * n, i * n + n)),
        expected['cov'],
        tolerance,
      );
      expectClose(fit.chiSquared, expected.chi2, { rel: 1e-8 });
      expect(fit.redundancy).toBe(expected.dof);
      for (const at of [0, 0.4, 0.8]) {
        const want = expected[`t=${at.toFixed(1)}`];
        const { values, covariance } = derivativesAt(fit, at);
        expectClose(values, [want['x'], want['v'], want['a']], tolerance);
        expectClose(
          [0, 1, 2].map((i) => Math.sqrt(covariance[i][i])),
          [want['u_x'], want['u_v'], want['u_a']],
          tolerance,
        );
        expectClose(covariance[1][2], want['cov_va'], { rel: 1e-8, abs: 1e-9 });
        expectClose(covariance[0][1], want['cov_xv'], { rel: 1e-8, abs: 1e-10 });
      }
    });
  }

  const b13 = caseFile<
    { t: number[]; obs: number[]; sigma: number; alpha0: number; power: number },
    Record<string, number[]> & { T_global: number; flagged_index: number }
  >('B13_baarda_line');
  it(nameOf(b13), () => {
    const { t, obs, sigma, alpha0, power } = b13.inputs;
    const { expected, tolerance } = b13;
    const fit = fitPolynomial(
      t,
      obs,
      t.map(() => sigma),
      1,
    );
    expectClose(fit.coefficients, expected['x_hat'], tolerance);
    expectClose(fit.chiSquared, expected['T_global=vTPv'], tolerance);
    const tests = t.map((at, i) =>
      testForBlunder(
        [(fit.coefficients[0] + fit.coefficients[1] * at - obs[i]) / sigma],
        [Float64Array.of(1 / sigma, at / sigma)],
        fit.covariance,
      ),
    );
    const redundancies = tests.map(({ remaining }) => remaining[0][0]);
    expectClose(redundancies, expected['redundancy_numbers'], tolerance);
    expectClose(
      tests.map(({ leverage }) => 1 - leverage),
      expected['redundancy_numbers'],
      tolerance,
    );
    expectClose(
      tests.map(({ w }) => w),
      expected['w'].map(Math.abs),
      tolerance,
    );
    expectClose(
      redundancies.map((r) => sigma * Math.sqrt(nonCentrality(alpha0, power) / r)),
      expected['MDB'],
      tolerance,
    );
    const largest = tests.reduce((at, { w }, i) => ((w ?? 0) > (tests[at].w ?? 0) ? i : at), 0);
    expect(largest).toBe(expected.flagged_index);
  });
});

describe('least-squares core', () => {
  const b05 = caseFile<
    { x: number[]; y: number[]; weight_x: number[]; weight_y: number[] },
    Numbers
  >('B05_line_both_errors_york');
  it(nameOf(b05), () => {
    const { x, y, weight_x: wx, weight_y: wy } = b05.inputs;
    const m = x.length;
    const result = minimise(
      {
        freedom: 2,
        evaluate: ([a, b]) => {
          const variance = x.map((_, i) => 1 / wy[i] + b * b * (1 / wx[i]));
          const off = x.map((at, i) => y[i] - a - b * at);
          return {
            residuals: Float64Array.from(off, (r, i) => r / Math.sqrt(variance[i])),
            jacobian: () =>
              Float64Array.from({ length: 2 * m }, (_, k) => {
                const i = k % m;
                const root = Math.sqrt(variance[i]);
                if (k < m) return -1 / root;
                return -x[i] / root - (off[i] * b) / wx[i] / (root * variance[i]);
              }),
          };
        },
      },
      Float64Array.of(5, -0.5),
    );
    expectClose(result.x, [b05.expected['intercept'], b05.expected['slope']], b05.tolerance);
    expectClose(result.sumOfSquares, b05.expected['S'], b05.tolerance);
  });

  const b15 = caseFile<
    { X: number[][]; y: number[] },
    { 'beta_[air,water,acid,const]': number[]; scale: number; ols_beta: number[] } & {
      weights_below_1: Numbers;
    }
  >('B15_huber_stackloss');
  it(nameOf(b15), () => {
    const { X, y } = b15.inputs;
    const m = y.length;
    const weigh = (weights: readonly number[]): Float64Array => {
      const design = new Float64Array(m * 4);
      X.forEach((row, i) =>
        row.forEach((value, j) => {
          design[j * m + i] = Math.sqrt(weights[i]) * value;
        }),
      );
      const right = Float64Array.from(y, (value, i) => Math.sqrt(weights[i]) * value);
      return solve(factorise(design, m, 4), right);
    };
    let weights = y.map(() => 1);
    let beta = weigh(weights);
    expectClose(beta, b15.expected.ols_beta, { rel: 1e-9 });
    let scale = 0;
    for (let k = 0; k < 200; k++) {
      const off = X.map((row, i) => y[i] - row.reduce((sum, v, j) => sum + v * beta[j], 0));
      const sizes = off.map(Math.abs).sort((a, b) => a - b);
      // MAD about zero over the normal's upper quartile
      scale = sizes[(m - 1) / 2] / 0.674489750196;
      weights = off.map((r) => huberWeight(Math.abs(r) / scale));
      beta = weigh(weights);
    }
    expectClose(beta, b15.expected['beta_[air,water,acid,const]'], b15.tolerance);
    expectClose(scale, b15.expected.scale, b15.tolerance);
    for (const [row, weight] of Object.entries(b15.expected.weights_below_1))
      expectClose(weights[Number(row) - 1], weight, { rel: 1e-5 });
    expect(weights.filter((weight) => weight < 1)).toHaveLength(3);
  });
});
