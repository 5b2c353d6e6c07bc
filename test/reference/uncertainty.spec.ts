import { describe, expect, it } from '@jest/globals';
import {
  chiSquaredCdf,
  chiSquaredQuantile,
  criticalDeviate,
  nonCentrality,
  normalCdf,
  normalQuantile,
  tCdf,
  tQuantile,
} from '#shared/engine/uncertainty/distributions';
import { coverageFactor } from '#shared/engine/uncertainty/interval';
import { monteCarlo, monteCarloToDigits } from '#shared/engine/uncertainty/monte-carlo';
import { propagate, withDifferences, type Input } from '#shared/engine/uncertainty/propagation';
import { Random } from '#shared/engine/uncertainty/random';
import { independent, jointlyNormal, type Distribution } from '#shared/engine/uncertainty/sampling';
import { readExpression } from '#shared/engine/worksheets/expression';
import { caseFile, expectClose, nameOf } from './case-file';

type Numbers = Record<string, number>;

/** A formula as a model with exact derivatives. */
const model = (formula: string, symbols: readonly string[]) => {
  const expression = readExpression(formula, symbols, 'formula');
  return (values: readonly number[]) => expression.differentiate(values);
};

describe('distributions', () => {
  const b14 = caseFile<unknown, Record<string, Numbers>>('B14_lambda0_table');
  it(nameOf(b14), () => {
    for (const [key, { w_crit: critical, lambda0 }] of Object.entries(b14.expected)) {
      const [alpha, power] = key.split(',').map((part) => Number(part.split('=')[1]));
      expectClose(normalQuantile(1 - alpha / 2), critical, b14.tolerance);
      expectClose(nonCentrality(alpha, power), lambda0, b14.tolerance);
    }
    expectClose(criticalDeviate, b14.expected['alpha0=0.001,power=0.8']['w_crit'], b14.tolerance);
  });

  const d09 = caseFile<unknown, Record<string, Numbers>>('D09_JCGM102_kp');
  it(nameOf(d09), () => {
    for (const [key, expected] of Object.entries(d09.expected)) {
      const m = Number(key.split('=')[1]);
      expectClose(Math.sqrt(chiSquaredQuantile(0.95, m)), expected['ellipse_k'], d09.tolerance);
      const split = expected['hyper_rect_k_(Bonferroni)'];
      expectClose(normalQuantile(1 - 0.05 / m / 2), split, d09.tolerance);
    }
  });

  it('undo themselves', () => {
    for (const p of [1e-6, 0.01, 0.3, 0.5, 0.9, 0.9995]) {
      expect(normalCdf(normalQuantile(p))).toBeCloseTo(p, 12);
      expect(tCdf(tQuantile(p, 3.7), 3.7)).toBeCloseTo(p, 10);
      expect(chiSquaredCdf(chiSquaredQuantile(p, 5), 5)).toBeCloseTo(p, 10);
    }
    expect(tQuantile(0.975, Infinity)).toBe(normalQuantile(0.975));
  });
});

describe('law of propagation of uncertainty', () => {
  interface H1 {
    readonly l_s_nm: number;
    readonly d_nm: number;
    readonly u_d_components: readonly number[];
    readonly nu_d_components: readonly number[];
  }
  const h1 = caseFile<H1 & Numbers, Numbers & { components_nm: Numbers }>('D01_GUM_H1');
  it(nameOf(h1), () => {
    const { inputs, expected, tolerance } = h1;
    const d = propagate(
      (values) => ({ value: values[0] + values[1] + values[2], gradient: [1, 1, 1] }),
      inputs.u_d_components.map((sigma, i) => ({
        id: `d${i}`,
        value: 0,
        sigma,
        degreesOfFreedom: inputs.nu_d_components[i],
      })),
    );
    expectClose(d.sigma, expected['u_d'], tolerance);
    expectClose(d.degreesOfFreedom, expected['nu_d'], tolerance);
    const sigmaTheta = Math.hypot(
      inputs['u_theta_bar'],
      inputs['Delta_arcsine_halfwidth'] / Math.SQRT2,
    );
    const quantities: Input[] = [
      { id: 'ls', value: inputs.l_s_nm, sigma: inputs['u_ls'], degreesOfFreedom: inputs['nu_ls'] },
      { id: 'd', value: inputs.d_nm, sigma: d.sigma, degreesOfFreedom: d.degreesOfFreedom ?? 0 },
      {
        id: 'dalpha',
        value: 0,
        sigma: inputs['delta_alpha_rect_halfwidth'] / Math.sqrt(3),
        degreesOfFreedom: inputs['nu_delta_alpha'],
      },
      {
        id: 'dtheta',
        value: 0,
        sigma: inputs['delta_theta_rect_halfwidth'] / Math.sqrt(3),
        degreesOfFreedom: inputs['nu_delta_theta'],
      },
      { id: 'theta', value: inputs['theta_bar'], sigma: sigmaTheta },
      {
        id: 'alpha',
        value: inputs['alpha_s'],
        sigma: inputs['alpha_s_rect_halfwidth'] / Math.sqrt(3),
      },
    ];
    const result = propagate(
      model(
        'ls + d - ls * (dalpha * theta + alpha * dtheta)',
        quantities.map(({ id }) => id),
      ),
      quantities,
      [],
      0.99,
    );
    expectClose(result.value, expected['l_nm'], { rel: 1e-12 });
    expectClose(result.sigma, expected['uc_nm'], tolerance);
    expectClose(result.degreesOfFreedom, expected['veff'], tolerance);
    for (const [id, want] of Object.entries(expected.components_nm))
      expectClose(result.budget.find((entry) => entry.id === id)?.contribution, want, tolerance);
    expect(result.budget[0].id).toBe('ls');
    expectClose(coverageFactor(0.99, 16), expected['t99(16)'], tolerance);
    expectClose(
      coverageFactor(0.99, 16) * result.sigma,
      expected['U99_with_unrounded_uc'],
      tolerance,
    );
  });

  interface H2 {
    readonly V: readonly number[];
    readonly I: readonly number[];
    readonly phi: readonly number[];
  }
  const h2 = caseFile<H2, Record<string, readonly number[]>>('D02_GUM_H2');
  it(nameOf(h2), () => {
    const { inputs, expected, tolerance } = h2;
    const series = [inputs.V, inputs.I, inputs.phi];
    const n = inputs.V.length;
    const means = series.map((values) => values.reduce((sum, v) => sum + v, 0) / n);
    const between = (i: number, j: number): number =>
      series[i].reduce((sum, v, k) => sum + (v - means[i]) * (series[j][k] - means[j]), 0) /
      (n * (n - 1));
    const quantities: Input[] = ['V', 'I', 'phi'].map((id, i) => ({
      id,
      value: means[i],
      sigma: Math.sqrt(between(i, i)),
    }));
    const pairs = [
      [0, 1],
      [0, 2],
      [1, 2],
    ] as const;
    const coefficients = pairs.map(
      ([i, j]) => between(i, j) / Math.sqrt(between(i, i) * between(j, j)),
    );
    expectClose(coefficients, expected['r(V,I),r(V,phi),r(I,phi)'], tolerance);
    const correlations = pairs.map(([i, j], k) => ({
      between: [quantities[i].id, quantities[j].id] as const,
      coefficient: coefficients[k],
    }));
    const results = ['V / I * cos(phi)', 'V / I * sin(phi)', 'V / I'].map((formula) =>
      propagate(model(formula, ['V', 'I', 'phi']), quantities, correlations),
    );
    expectClose(
      results.map(({ value }) => value),
      expected['R,X,Z'],
      tolerance,
    );
    expectClose(
      results.map(({ sigma }) => sigma),
      expected['u(R),u(X),u(Z)'],
      tolerance,
    );
    results.forEach(({ budget }) =>
      expect(budget.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12),
    );
  });

  it('does not give degrees of freedom to correlated inputs that have few', () => {
    const inputs: Input[] = [
      { id: 'a', value: 1, sigma: 0.1, degreesOfFreedom: 5 },
      { id: 'b', value: 2, sigma: 0.1 },
    ];
    const result = propagate(model('a + b', ['a', 'b']), inputs, [
      { between: ['a', 'b'], coefficient: 0.5 },
    ]);
    expect(result.degreesOfFreedom).toBeNull();
    expect(result.sigma).toBeCloseTo(0.1 * Math.sqrt(3), 12);
  });

  it('names a correlation with an unknown input', () => {
    expect(() =>
      propagate(
        model('a', ['a']),
        [{ id: 'a', value: 1, sigma: 0.1 }],
        [{ between: ['a', 'c'], coefficient: 0.1 }],
      ),
    ).toThrow(expect.objectContaining({ code: 'unknown-reference' }));
  });
});

describe('coverage intervals (seeded)', () => {
  const d30 = caseFile<unknown, Numbers>('D30_coverage');
  const trials = 10_000;
  // the case allows its own noise; four standard deviations of ours come on top
  const abs = 0.008 + 4 * Math.sqrt((0.95 * 0.05) / trials);

  it(`${nameOf(d30)}, mean of five readings: k = 1.96 holds too little, t what it says`, () => {
    const random = new Random(41);
    let normal = 0;
    let student = 0;
    for (let i = 0; i < trials; i++) {
      const readings = Array.from({ length: 5 }, () => random.normal());
      const mean = readings.reduce((sum, r) => sum + r, 0) / 5;
      const u = Math.sqrt(readings.reduce((sum, r) => sum + (r - mean) ** 2, 0) / 20);
      if (Math.abs(mean) <= coverageFactor(0.95) * u) normal++;
      if (Math.abs(mean) <= coverageFactor(0.95, 4) * u) student++;
    }
    expectClose(normal / trials, d30.expected['mean_of_5_with_k=1.96_(known_to_be_low)'], { abs });
    expectClose(normal / trials, d30.expected['exact_coverage_k1.96_n5'], { abs });
    expectClose(student / trials, d30.expected['mean_of_5_with_t'], { abs });
  });

  it(`${nameOf(d30)}, slide to stop`, () => {
    const random = new Random(42);
    const formula = model('sqrt(2 * 9.80665 * f * d)', ['f', 'd']);
    const truth = formula([0.7, 25]).value;
    let held = 0;
    for (let i = 0; i < trials; i++) {
      const { interval } = propagate(formula, [
        { id: 'f', value: 0.7 + 0.05 * random.normal(), sigma: 0.05 },
        { id: 'd', value: 25 + 0.3 * random.normal(), sigma: 0.3 },
      ]);
      if (interval.low <= truth && truth <= interval.high) held++;
    }
    expectClose(held / trials, d30.expected['slide_to_stop_coverage_95'], { abs });
  });
});

describe('Monte Carlo (seeded)', () => {
  const draws = 200_000;
  const sum = (values: Float64Array): number => values[0] + values[1] + values[2] + values[3];
  const rectangular = (sigma: number): Distribution => ({
    kind: 'rectangular',
    low: -sigma * Math.sqrt(3),
    high: sigma * Math.sqrt(3),
  });
  const d04 = caseFile<unknown, Record<string, Record<string, number & readonly number[]>>>(
    'D04_JCGM101_9_2',
  );
  for (const [clause, distributions, key] of [
    ['9.2.2', [1, 1, 1, 1].map((sigma) => ({ kind: 'normal', mean: 0, sigma })), 'interval95'],
    ['9.2.3', [1, 1, 1, 1].map(rectangular), 'interval95_exact'],
    ['9.2.4', [1, 1, 1, 10].map(rectangular), 'interval95_exact'],
  ] as const) {
    it(`${nameOf(d04)}, ${clause}`, () => {
      const sampler = independent(distributions as readonly Distribution[]);
      const result = monteCarlo(sum, sampler, 4, { draws, seed: 7 });
      const { u } = d04.expected[clause];
      // four standard deviations of the estimates
      expectClose(result.sigma, u, { abs: (4 * u) / Math.sqrt(2 * draws) });
      expectClose(result.mean, 0, { abs: (4 * u) / Math.sqrt(draws) });
      expectClose(result.symmetric, d04.expected[clause][key], { rel: 0.01 });
      expectClose(result.shortest, d04.expected[clause][key], { rel: 0.03 });
    });
  }

  interface Mass {
    readonly m_Rc_mg: readonly [number, number];
    readonly delta_m_Rc_mg: readonly [number, number];
    readonly rho_a_rect: readonly [number, number];
    readonly rho_W_rect: readonly [number, number];
    readonly rho_R_rect: readonly [number, number];
    readonly rho_a0: number;
    readonly m_nom: number;
  }
  const d05 = caseFile<Mass, Numbers & Record<string, readonly number[]>>('D05_JCGM101_9_3_mass');
  it(nameOf(d05), () => {
    const { inputs, expected } = d05;
    const mass = (x: ArrayLike<number>): number =>
      (x[0] + x[1]) * (1 + (x[2] - inputs.rho_a0) * (1 / x[3] - 1 / x[4])) - inputs.m_nom;
    const normal = ([mean, sigma]: readonly [number, number]): Distribution => ({
      kind: 'normal',
      mean,
      sigma,
    });
    const even = ([low, high]: readonly [number, number]): Distribution => ({
      kind: 'rectangular',
      low,
      high,
    });
    const distributions = [
      normal(inputs.m_Rc_mg),
      normal(inputs.delta_m_Rc_mg),
      even(inputs.rho_a_rect),
      even(inputs.rho_W_rect),
      even(inputs.rho_R_rect),
    ];
    const quantities = distributions.map((distribution, i) => ({
      id: `x${i}`,
      value:
        distribution.kind === 'normal'
          ? distribution.mean
          : distribution.kind === 'rectangular'
            ? (distribution.low + distribution.high) / 2
            : NaN,
      sigma:
        distribution.kind === 'normal'
          ? distribution.sigma
          : distribution.kind === 'rectangular'
            ? (distribution.high - distribution.low) / Math.sqrt(12)
            : NaN,
    }));
    const linear = propagate(withDifferences(mass, quantities), quantities);
    expectClose(linear.value, expected['estimate'], { abs: 1e-9 });
    expectClose(linear.sigma, expected['u_GUM_first_order'], { rel: 1e-5 });
    const simulated = monteCarlo(mass, independent(distributions), 5, { draws, seed: 3 });
    expectClose(simulated.sigma, expected['u_exact'], { rel: 0.005 });
    expectClose(simulated.symmetric, expected['interval95_exact_symmetric'], { abs: 0.001 });
    expectClose(simulated.shortest, expected['mc_shortest95'], { abs: 0.003 });
  });

  const d06 = caseFile<unknown, Record<string, Record<string, number & readonly number[]>>>(
    'D06_JCGM101_9_4',
  );
  const u = 0.005;
  for (const [key, expected] of Object.entries(d06.expected)) {
    const match = /^x1=([\d.]+),r=([\d.]+)$/.exec(key);
    if (match === null) continue;
    const [x1, r] = [Number(match[1]), Number(match[2])];
    it(`${nameOf(d06)}, ${key}`, () => {
      const quantities = [
        { id: 'a', value: x1, sigma: u },
        { id: 'b', value: 0, sigma: u },
      ];
      const linear = propagate(model('a^2 + b^2', ['a', 'b']), quantities, [
        { between: ['a', 'b'], coefficient: r },
      ]);
      expectClose(linear.value, expected['GUM_y'], { rel: 1e-12 });
      expectClose(linear.sigma, expected['GUM_u'], { rel: 1e-12 });
      const sampler = jointlyNormal(
        [x1, 0],
        [
          [u * u, r * u * u],
          [r * u * u, u * u],
        ],
      );
      const simulated = monteCarlo((x) => x[0] ** 2 + x[1] ** 2, sampler, 2, { draws, seed: 5 });
      expectClose(simulated.mean, expected['exact_mean'], { rel: 0.01 });
      expectClose(simulated.sigma, expected['exact_u'], { rel: 0.01 });
      // both sides of this comparison are simulated: the shortest interval wanders most
      expectClose(simulated.shortest, expected['mc_shortest95'], {
        abs: 0.04 * expected['exact_u'],
      });
    });
  }

  const d10 = caseFile<{ x: readonly [number, number] }, Numbers & Record<string, number[]>>(
    'D10_log_rectangular',
  );
  it(nameOf(d10), () => {
    const [low, high] = d10.inputs.x;
    const quantity = { id: 'x', value: (low + high) / 2, sigma: (high - low) / Math.sqrt(12) };
    const linear = propagate(model('log(x)', ['x']), [quantity]);
    expectClose(linear.value, d10.expected['GUM_y'], d10.tolerance);
    expectClose(linear.sigma, d10.expected['GUM_u'], d10.tolerance);
    const simulated = monteCarlo(
      (x) => Math.log(x[0]),
      independent([{ kind: 'rectangular', low, high }]),
      1,
      { draws, seed: 11 },
    );
    expectClose(simulated.mean, d10.expected['exact_mean'], { abs: 0.004 });
    expectClose(simulated.sigma, d10.expected['exact_sd'], { rel: 0.01 });
    expectClose(simulated.shortest, d10.expected['shortest95'], { abs: 0.02 });
  });

  it('settles to the asked digits (JCGM 101:2008, 7.9)', () => {
    const sampler = independent([1, 1, 1, 1].map(rectangular));
    const result = monteCarloToDigits(sum, sampler, 4, { digits: 2, seed: 2 });
    expect(result.settled).toBe(true);
    expect(result.tolerance).toBeCloseTo(0.05, 12);
    expectClose(result.symmetric[1], 3.88, { abs: 0.05 });
  });

  it('gives the same draws for the same seed, others for another', () => {
    const sampler = independent([{ kind: 'normal', mean: 0, sigma: 1 }]);
    const run = (seed: number) => monteCarlo((x) => x[0], sampler, 1, { draws: 5000, seed });
    expect(run(1)).toEqual(run(1));
    expect(run(1).mean).not.toBe(run(2).mean);
  });
});
