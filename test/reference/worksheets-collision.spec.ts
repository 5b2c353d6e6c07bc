import { describe, expect, it } from '@jest/globals';
import { caseFile, expectClose, nameOf } from './case-file';
import { degree, values, work, type Cases, type Given, type Numbers } from './worksheet-work';

describe('flight and throw', () => {
  const c08 = caseFile<Cases<Numbers>, Record<string, Numbers>>('C08_searle');
  for (const [key, given] of Object.entries(c08.inputs.subcases))
    it(`${nameOf(c08)}, ${key}`, () => {
      const expected = c08.expected[key];
      const { mu, s, H = 0, theta_deg: theta } = given;
      if (theta !== undefined) {
        const sheet = work('throw-at-angle', { mu, s, H, theta: theta * degree });
        expectClose(values(sheet, 'v'), [expected['V']], c08.tolerance);
        return;
      }
      const sheet = work('throw-bounds', { mu, s, H });
      const most = expected['v_max'] ?? expected['v_max_theta0'];
      expectClose(values(sheet, 'vl', 'vh'), [expected['v_min'], most], c08.tolerance);
      if ('theta_at_min_deg' in expected)
        expectClose(sheet.of('a').value / degree, expected['theta_at_min_deg'], c08.tolerance);
    });

  it('a launch lands where its flight takes it [flight without drag, integrated by hand]', () => {
    const [v, theta, h] = [18, 0.1, 4];
    const vertical = v * Math.sin(theta);
    const time = (vertical + Math.sqrt(vertical ** 2 + 2 * 9.80665 * h)) / 9.80665;
    const d = v * Math.cos(theta) * time;
    const sheet = work('airborne', { d, h, theta });
    expect(sheet.of('v').value).toBeCloseTo(v, 9);
    expect(sheet.of('vm').value).toBeLessThan(v);
  });
});

describe('collision', () => {
  interface C09 {
    readonly x_perpendicular: readonly number[];
    readonly x_near_head_on: readonly number[];
    readonly standard_uncertainties: readonly number[];
  }
  const c09 = caseFile<C09, Record<string, Numbers>>('C09_momentum_2d');
  const order = ['m1', 'm2', 'a1', 'a2', 'u1', 'u2', 'f1', 'f2'];
  const given = (x: readonly number[]): Given =>
    Object.fromEntries(order.map((id, i) => [id, [x[i], c09.inputs.standard_uncertainties[i]]]));

  it(`${nameOf(c09)}, perpendicular`, () => {
    const sheet = work('momentum-plane', given(c09.inputs.x_perpendicular));
    const want = c09.expected['perpendicular'];
    expectClose(
      values(sheet, 'v1', 'v2', 'dv1', 'dv2', 'E'),
      [want['v1'], want['v2'], want['dv1'], want['dv2'], want['energy_loss_J']],
      c09.tolerance,
    );
    expectClose(
      [sheet.of('v1').sigma, sheet.of('v2').sigma],
      [want['u_v1'], want['u_v2']],
      c09.tolerance,
    );
    expect(sheet.warnings).toEqual([]);
  });

  it(`${nameOf(c09)}, near head-on: warned of, and first order does not agree`, () => {
    const sheet = work('momentum-plane', given(c09.inputs.x_near_head_on), {
      simulation: { draws: 20_000, seed: 8 },
    });
    const want = c09.expected['near_head_on_8deg'];
    expectClose(values(sheet, 'v1', 'v2'), [want['v1'], want['v2']], c09.tolerance);
    expectClose(
      [sheet.of('v1').sigma, sheet.of('v2').sigma],
      [want['u_v1'], want['u_v2']],
      c09.tolerance,
    );
    const { simulated } = sheet.of('v1');
    const interval = want['mc_95_v1'] as unknown as number[];
    expectClose([simulated?.low, simulated?.high], interval, { rel: 0.15 });
    expect(simulated?.agrees).toBe(false);
    expect(sheet.warnings.join()).toContain('ill-conditioned');
  });

  it('momentum in a line: a perfectly inelastic push [conservation of momentum]', () => {
    const sheet = work('momentum-line', { m1: 1500, m2: 1000, v2: 0, u1: 6, u2: 6 });
    expectClose(values(sheet, 'v1', 'e'), [10, 0], { abs: 1e-12 });
  });

  const c13 = caseFile<
    { delta_v_global: Record<string, [number, number]>; heading_deg_math: number[] },
    Record<string, Numbers>
  >('C13_pdof');
  it(nameOf(c13), () => {
    Object.entries(c13.inputs.delta_v_global).forEach(([key, [dx, dy]], i) => {
      const psi = c13.inputs.heading_deg_math[i] * degree;
      const angle = work('force-direction', { dx, dy, psi }).of('p').value / degree;
      const want = c13.expected[key]['pdof_deg_cw_from_front'];
      expectClose(Math.cos((angle - want) * degree), 1, { abs: 1e-12 });
      expectClose((((angle - want) % 360) + 540) % 360, 180, { abs: 1e-8 });
    });
  });

  interface C11 {
    readonly A_N_per_m: number;
    readonly B_N_per_m2: number;
    readonly subcases: Record<string, { L: number; C: number[] } & Numbers>;
  }
  const c11 = caseFile<C11, Record<string, Numbers>>('C11_crush_energy');
  it(nameOf(c11), () => {
    const { A_N_per_m: A, B_N_per_m2: B, subcases } = c11.inputs;
    for (const key of ['six_point_uneven', 'six_point_uniform_0.3']) {
      const { L, C } = subcases[key];
      const depths = Object.fromEntries(C.map((depth, i) => [`C${i + 1}`, depth]));
      const sheet = work('crush-energy', { A, B, L, m0: 1400, ...depths });
      const want = c11.expected[key];
      expectClose(values(sheet, 'E', 'v'), [want['E_J'], want['EBS_m1400']], c11.tolerance);
    }
    const [key] = Object.keys(subcases).filter((name) => name.startsWith('A_B_from'));
    const { m, w, b0, b1 } = subcases[key];
    expectClose(
      values(work('crush-coefficients', { m, w, b0, b1 }), 'A', 'B'),
      [c11.expected[key]['A'], c11.expected[key]['B']],
      c11.tolerance,
    );
  });
});
