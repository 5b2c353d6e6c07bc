import { describe, expect, it } from '@jest/globals';
import { solveInstant } from '#shared/engine/instant/index';
import { caseFile, expectClose, nameOf } from './case-file';
import {
  at,
  bar,
  bodyAt,
  degrees,
  expectCase,
  grounded,
  moving,
  pinned,
  problemOf,
  quantitiesOf,
  radians,
  turning,
} from './instant-cases';

const unknown = [
  [NaN, NaN],
  [NaN, NaN],
];

const named = (id: string): string => nameOf(caseFile(id));

describe('what is known of the motion', () => {
  it(named('A01_point_on_body'), () => {
    const problem = problemOf(
      [bodyAt('block', [0, 0], 0, { P: [0, 0], Q: [2, 0] })],
      [],
      [...moving('p', 'block', 'P', [-3, 0], [0, 0]), ...turning('turn', 'block', -2, -3)],
    );
    expect(expectCase('A01_point_on_body', problem).status).toBe('determined');
  });

  const rod = bodyAt('rod', [0, 0], 0, { A: [0, 0], B: [1.6, 0.7] });
  const atA = {
    id: 'a',
    quantity: 'velocity' as const,
    at: at('rod', 'A'),
    components: [4, -1] as [number, number],
  };

  it(named('A21_speed_known_direction_unknown'), () => {
    const check = caseFile<unknown, Record<string, number>>('A21_speed_known_direction_unknown');
    const solution = solveInstant(
      problemOf(
        [rod],
        [],
        [atA, { id: 'b', quantity: 'velocity', at: at('rod', 'B'), magnitude: 6 }],
      ),
    );
    expect(solution.branches).toHaveLength(2);
    const found = solution.branches
      .map((b) => [b.bodies['rod'].omega ?? NaN, degrees(b.points['rod.B'].direction ?? NaN)])
      .sort((a, b) => b[0] - a[0]);
    expectClose(
      found,
      [
        [check.expected['w.root1'], check.expected['vB_dir_deg.root1']],
        [check.expected['w.root2'], check.expected['vB_dir_deg.root2']],
      ],
      check.tolerance,
    );
  });

  it(`${named('A21_speed_known_direction_unknown')}: none where the speed cannot be had`, () => {
    const along = (4 * 1.6 - 0.7) / Math.hypot(1.6, 0.7);
    const withSpeed = (magnitude: number) =>
      solveInstant(
        problemOf(
          [rod],
          [],
          [atA, { id: 'b', quantity: 'velocity', at: at('rod', 'B'), magnitude }],
        ),
      );
    expect(withSpeed(0.99 * along)).toMatchObject({
      status: 'contradictory',
      branches: [],
      clash: ['a', 'b'],
    });
    expect(withSpeed(1.01 * along).branches).toHaveLength(2);
  });

  it(named('A22_direction_known_magnitude_unknown'), () => {
    const problem = problemOf(
      [rod],
      [],
      [atA, { id: 'b', quantity: 'velocity', at: at('rod', 'B'), direction: radians(60) }],
    );
    const solution = expectCase('A22_direction_known_magnitude_unknown', problem, (found) => {
      const q = quantitiesOf(found);
      return {
        'm.B': found.branches[0].points['rod.B'].speed ?? NaN,
        w: q['w.rod'],
        'x.IC': q['x.IC_rod'],
        'y.IC': q['y.IC_rod'],
      };
    });
    expect(solution.status).toBe('determined');
  });

  it(`${named('A22_direction_known_magnitude_unknown')}: the opposite sense contradicts, the line alone does not`, () => {
    const towards = (line: boolean) =>
      solveInstant(
        problemOf(
          [rod],
          [],
          [
            atA,
            { id: 'b', quantity: 'velocity', at: at('rod', 'B'), direction: radians(240), line },
          ],
        ),
      );
    expect(towards(false)).toMatchObject({ status: 'contradictory', clash: ['a', 'b'] });
    expectClose(towards(true).branches[0].bodies['rod'].omega, 2.81898128729, { rel: 1e-9 });
  });

  it(named('A23_overdetermined_velocity_fit'), () => {
    const check = caseFile<
      { points: string[][]; velocities: string[][]; sigma_each_component: string[] },
      Record<string, number>
    >('A23_overdetermined_velocity_fit');
    const { points, velocities, sigma_each_component: sigmas } = check.inputs;
    const pair = (v: string[]): [number, number] => [Number(v[0]), Number(v[1])];
    const problem = problemOf(
      [bodyAt('body', [0, 0], 0, Object.fromEntries(points.map((p, i) => [`P${i}`, pair(p)])))],
      [],
      velocities.map((v, i) => ({
        id: `k${i}`,
        quantity: 'velocity' as const,
        at: at('body', `P${i}`),
        components: pair(v),
        sigma: Number(sigmas[i]),
      })),
    );
    const solution = solveInstant(problem);
    const { body } = solution.branches[0].bodies;
    const p0 = solution.branches[0].points['body.P0'];
    const c = p0.covariance.velocity ?? unknown;
    const pole = body.covariance.pole ?? unknown;
    const e = check.expected;
    const close = (got: unknown, want: unknown) => expectClose(got, want, check.tolerance);
    close(p0.velocity, [e['vx0'], e['vy0']]);
    close(body.omega, e['omega']);
    close(solution.chiSquared, e['chi2']);
    close([Math.sqrt(c[0][0]), Math.sqrt(c[1][1])], [e['u_vx0'], e['u_vy0']]);
    close(body.sigma.omega, e['u_omega']);
    close(body.pole, [e['x.IC'], e['y.IC']]);
    close([Math.sqrt(pole[0][0]), Math.sqrt(pole[1][1])], [e['u_xIC'], e['u_yIC']]);
    close(pole[0][1] / Math.sqrt(pole[0][0] * pole[1][1]), e['corr_IC']);
    close(solution.pValue, e['chi2_p_value']);
    expect(solution).toMatchObject({ status: 'over-determined', redundancy: e['dof'] });
    expect(solution.levels.acceleration?.status).toBe('under-determined');
    expect(body.alpha).toBeNull();
    // Covariance of v₀ and ω, through the velocity of a point 1 m to the left and 1 m ahead.
    const shifted = solveInstant({
      ...problem,
      bodies: [
        { ...problem.bodies[0], points: { ...problem.bodies[0].points, X: [1, 0], Y: [0, 1] } },
      ],
    }).branches[0].points;
    const varianceOf = (point: string, k: 0 | 1): number =>
      shifted[`body.${point}`].covariance.velocity?.[k][k] ?? NaN;
    const turn = (body.sigma.omega ?? NaN) ** 2;
    close((varianceOf('X', 1) - c[1][1] - turn) / 2, e['cov_vy0_omega']);
    close((c[0][0] + turn - varianceOf('Y', 0)) / 2, e['cov_vx0_omega']);
  });

  it(named('A28_IC_from_three_directions'), () => {
    const check = caseFile<
      { points: string[][]; direction_deg: string[]; u_deg: number },
      Record<string, number[]> & Record<'u_xIC' | 'u_yIC' | 'corr' | 'chi2_1dof', number>
    >('A28_IC_from_three_directions');
    const { points, direction_deg: directions, u_deg: sigma } = check.inputs;
    const solution = solveInstant(
      problemOf(
        [
          bodyAt(
            'car',
            [0, 0],
            0,
            Object.fromEntries(
              points.map((p, i) => [`P${i}`, [Number(p[0]), Number(p[1])] as [number, number]]),
            ),
          ),
        ],
        [],
        directions.map((d, i) => ({
          id: `k${i}`,
          quantity: 'velocity' as const,
          at: at('car', `P${i}`),
          direction: radians(Number(d)),
          sigma: radians(sigma),
        })),
      ),
    );
    const { car } = solution.branches[0].bodies;
    const pole = car.covariance.pole ?? unknown;
    const close = (got: unknown, want: unknown) => expectClose(got, want, check.tolerance);
    close(car.pole, check.expected['IC_max_likelihood_angles']);
    close(solution.chiSquared, check.expected['chi2_1dof']);
    close(
      [Math.sqrt(pole[0][0]), Math.sqrt(pole[1][1])],
      [check.expected['u_xIC'], check.expected['u_yIC']],
    );
    close(pole[0][1] / Math.sqrt(pole[0][0] * pole[1][1]), check.expected['corr']);
    const residuals = solution.residuals.map((r) => degrees(r.residual));
    const sign = Math.sign(residuals[0] * check.expected['residual_deg'][0]);
    close(
      residuals.map((r) => sign * r),
      check.expected['residual_deg'],
    );
    // The scale of the motion is not known, so no rate is given.
    expect(solution).toMatchObject({ status: 'under-determined', redundancy: 1 });
    expect(car.omega).toBeNull();
    expect(solution.branches[0].points['car.P0'].velocity).toBeNull();
  });
});

it(named('A30_slider_crank_uncertainty'), () => {
  const check = caseFile<
    Record<'r' | 'l' | 'theta_deg' | 'omega', [number, number]>,
    Record<string, number> & Record<string, number[]>
  >('A30_slider_crank_uncertainty');
  const { r, l, theta_deg: angle, omega } = check.inputs;
  const theta = radians(angle[0]);
  const pin: [number, number] = [r[0] * Math.cos(theta), r[0] * Math.sin(theta)];
  const slider: [number, number] = [pin[0] + Math.sqrt(l[0] ** 2 - pin[1] ** 2), 0];
  const build = (sigma: { r: number; l: number; theta: number; omega: number }) => {
    const crank = bar('crank', ['O', [0, 0]], ['A', pin]);
    const rod = bar('rod', ['A', pin], ['B', slider]);
    return problemOf(
      [
        {
          ...crank,
          points: { O: [0, 0], A: { at: [r[0], 0], sigma: [sigma.r, 0] } },
          poseCovariance: [
            [0, 0, 0],
            [0, 0, 0],
            [0, 0, radians(sigma.theta) ** 2],
          ],
        },
        {
          ...rod,
          poseFollows: true,
          points: { A: [0, 0], B: { at: [l[0], 0], sigma: [sigma.l, 0] } },
        },
      ],
      [
        grounded('o', 'crank', 'O'),
        pinned('a', 'crank', 'rod', 'A'),
        { id: 'b', kind: 'guide', a: at('rod', 'B'), direction: 0 },
      ],
      [
        {
          id: 'drive',
          quantity: 'angular-velocity',
          body: 'crank',
          value: omega[0],
          sigma: sigma.omega,
        },
      ],
    );
  };
  const spread = (sigma: Parameters<typeof build>[0]): [number, number] => {
    const [branch] = solveInstant(build(sigma)).branches;
    const vx = branch.points['rod.B'].covariance.velocity?.[0][0] ?? NaN;
    return [branch.bodies['rod'].sigma.omega ?? NaN, Math.sqrt(vx)];
  };
  const all = { r: r[1], l: l[1], theta: angle[1], omega: omega[1] };
  const close = (got: unknown, want: unknown) => expectClose(got, want, check.tolerance);
  const [branch] = solveInstant(build(all)).branches;
  close(branch.bodies['rod'].omega, check.expected['w.rod']);
  close(branch.points['rod.B'].velocity?.[0], check.expected['vx.B']);
  close(spread(all), [check.expected['u_w.rod'], check.expected['u_vx.B']]);

  // One cause at a time gives the sensitivities, without their signs.
  const none = { r: 0, l: 0, theta: 0, omega: 0 };
  const single = (['r', 'l', 'theta', 'omega'] as const).map((name) =>
    spread({ ...none, [name]: name === 'theta' ? degrees(1) : 1 }),
  );
  const size = (name: string) => check.expected[name].map(Math.abs);
  close(
    single.map((s) => s[0]),
    size('sensitivities_w.rod_[r,l,theta_rad,omega]'),
  );
  close(
    single.map((s) => s[1]),
    size('sensitivities_vB'),
  );

  // Correlation of ω and v_x through the body's covariance at the slider as its origin.
  const moved = build(all);
  const [crank, rod] = moved.bodies;
  const atSlider = {
    ...rod,
    pose: { ...rod.pose, x: slider[0], y: slider[1] },
    points: {
      A: { at: [-l[0], 0] as [number, number], sigma: [l[1], 0] as [number, number] },
      B: [0, 0] as [number, number],
    },
  };
  const withRates = {
    ...moved,
    bodies: [crank, atSlider],
    knowns: [
      ...moved.knowns,
      ...turning('w', 'crank', omega[0], 0).filter((k) => k.id === 'w-rate'),
    ],
  };
  const motion = solveInstant(withRates).branches[0].bodies['rod'].covariance.motion ?? unknown;
  close(motion[0][2] / Math.sqrt(motion[0][0] * motion[2][2]), check.expected['corr']);
});
