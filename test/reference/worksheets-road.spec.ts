import { describe, expect, it } from '@jest/globals';
import { caseFile, expectClose, nameOf } from './case-file';
import { values, work, type Cases, type Numbers } from './worksheet-work';

describe('slides', () => {
  const c01 = caseFile<Cases<{ mu: number; d: number }>, Record<string, Numbers>>(
    'C01_slide_to_stop',
  );
  for (const [key, { mu, d }] of Object.entries(c01.inputs.subcases))
    it(`${nameOf(c01)}, ${key}`, () => {
      const sheet = work('slide-to-stop', { f: [mu, 0.05], d: [d, 0.3] });
      const expected = c01.expected[key];
      expectClose(values(sheet, 'v', 't'), [expected['v'], expected['t_stop']], c01.tolerance);
      expectClose(sheet.of('v').sigma, expected['u_v(u_mu=0.05,u_d=0.3)'], c01.tolerance);
      expect(sheet.warnings).toEqual([]);
    });

  interface C02 {
    readonly three_surfaces_then_impact_at_8: {
      readonly segments_mu_d: readonly (readonly [number, number])[];
      readonly v_end: number;
    };
    readonly 'combine_15.2_and_11.7': { readonly v1: number; readonly v2: number };
  }
  const c02 = caseFile<
    { subcases: C02 },
    { three_surfaces_then_impact_at_8: Numbers; 'combine_15.2_and_11.7': number }
  >('C02_combined_speed');
  it(nameOf(c02), () => {
    const { three_surfaces_then_impact_at_8: slide, 'combine_15.2_and_11.7': two } =
      c02.inputs.subcases;
    const rows = slide.segments_mu_d.map(([f, d]) => ({ f, d }));
    const expected = c02.expected.three_surfaces_then_impact_at_8;
    const starts = expected['speed_at_start_of_segments_(last..first)'] as unknown as number[];
    expectClose(
      values(work('surfaces', { ve: slide.v_end }, { rows }), 'v'),
      [expected['v0']],
      c02.tolerance,
    );
    const fromLast = rows.map((_, i) => rows.slice(rows.length - 1 - i));
    expectClose(
      fromLast.map((part) => work('surfaces', { ve: slide.v_end }, { rows: part }).of('v').value),
      starts,
      c02.tolerance,
    );
    expectClose(
      values(work('combined-speed', { ...two }), 'v'),
      [c02.expected['combine_15.2_and_11.7']],
      c02.tolerance,
    );
  });

  const c03 = caseFile<
    Cases<{ mu: number; G: number; n: number; d: number }>,
    Record<string, Numbers>
  >('C03_grade_and_efficiency');
  for (const [key, given] of Object.entries(c03.inputs.subcases))
    it(`${nameOf(c03)}, ${key}`, () => {
      const expected = c03.expected[key];
      expectClose(
        values(work('grade', given), 'f', 'fa', 'v'),
        [expected['f_exact'], expected['f_approx'], expected['v_exact']],
        c03.tolerance,
      );
    });
});

describe('curves', () => {
  const c05 = caseFile<Cases<{ mu: number; R: number; e: number }>, Record<string, Numbers>>(
    'C05_critical_speed',
  );
  for (const [key, { mu, R, e }] of Object.entries(c05.inputs.subcases))
    it(`${nameOf(c05)}, ${key}`, () => {
      const expected = c05.expected[key];
      const sheet = work('critical-speed', { mu: [mu, 0.05], R: [R, 3], e });
      expectClose(
        values(sheet, 'v', 'va'),
        [expected['v'], expected['v_approx_sqrt(gR(mu+e))']],
        c05.tolerance,
      );
      // the case takes half of what ±u moves for µ, and the derivative for R
      const { sigma, budget } = sheet.of('v');
      const want = expected['u_v(u_mu=0.05,u_R=3)'];
      const parts = budget.map(({ id, span: [down, up], contribution }) =>
        id === 'mu' ? (up - down) / 2 : contribution,
      );
      expectClose(Math.hypot(...parts), want, c05.tolerance);
      expectClose(sigma, want, { rel: 1e-3 });
    });

  const c06 = caseFile<Numbers, Numbers & { mc_95: number[] }>('C06_yaw_mark_chain');
  it(nameOf(c06), () => {
    const { C, M, track, mu, u_C: uC, u_M: uM, u_mu: uMu } = c06.inputs;
    const sheet = work(
      'yaw-mark',
      { C: [C, uC], M: [M, uM], w: track, mu: [mu, uMu], e: 0 },
      { simulation: { draws: 50_000, seed: 6 } },
    );
    const { expected } = c06;
    expectClose(
      values(sheet, 'r', 'R', 'v'),
      [expected['r_mark'], expected['r_cg'], expected['v']],
      c06.tolerance,
    );
    expectClose(sheet.of('R').sigma, expected['u_R'], c06.tolerance);
    const { sigma, simulated, budget } = sheet.of('v');
    expectClose(sigma, expected['u_v_GUM'], c06.tolerance);
    expect(budget[0].id).toBe('mu');
    // four standard deviations of so many draws, and the case's own noise
    expectClose(simulated?.mean, expected['mc_mean'], { abs: 0.02 });
    expectClose(simulated?.sigma, expected['mc_sd'], { rel: 0.015 });
    expectClose([simulated?.low, simulated?.high], expected.mc_95, { abs: 0.05 });
  });

  const b08 = caseFile<
    Cases<{ C: number; M: number; u_C: number; u_M: number }>,
    Record<string, Numbers>
  >('B08_chord_middle_ordinate');
  for (const [key, { C, M, u_C: uC, u_M: uM }] of Object.entries(b08.inputs.subcases))
    it(`${nameOf(b08)}, ${key}`, () => {
      const { value, sigma } = work('chord-radius', { C: [C, uC], M: [M, uM] }).of('r');
      expectClose(
        [value, sigma],
        [b08.expected[key]['r'], b08.expected[key]['u_r']],
        b08.tolerance,
      );
    });

  it('radius from three points of a circle [points placed on a circle of radius 40 m]', () => {
    const on = (angle: number) => [7 + 40 * Math.cos(angle), -3 + 40 * Math.sin(angle)];
    const [[x1, y1], [x2, y2], [x3, y3]] = [on(0.1), on(0.4), on(1)];
    const { value } = work('three-points', { x1, y1, x2, y2, x3, y3 }).of('r');
    expect(value).toBeCloseTo(40, 9);
  });
});

describe('time and distance', () => {
  const c17 = caseFile<Cases<Numbers>, Record<string, Numbers>>('C17_time_distance');
  for (const [key, given] of Object.entries(c17.inputs.subcases))
    it(`${nameOf(c17)}, ${key}`, () => {
      const want = c17.expected[key];
      const { v, tr, a, tb = 0, D } = given;
      // the case carries speeds to twelve digits, some of its results to fewer
      const tolerance = { rel: 1e-9, abs: 1e-9 };
      if (key.startsWith('speed_at_conflict'))
        expectClose(
          values(work('speed-at-conflict', { v, tr, a, D }), 'vc', 't'),
          [want['v_impact'], want['t_to_conflict']],
          tolerance,
        );
      else if (key.startsWith('max_speed'))
        expectClose(values(work('speed-to-stop', { D, tr, a }), 'v'), [want['v']], tolerance);
      else if (key.startsWith('from_rest'))
        expectClose(
          values(work('from-rest', { D, a }), 't', 'v'),
          [want['t'], want['v']],
          tolerance,
        );
      else {
        const sheet = work('stopping', { v, tr, tb, a });
        expectClose(values(sheet, 'd', 't'), [want['d_total'], want['t_total']], tolerance);
        if ('d_brake' in want)
          expectClose(values(sheet, 'dr', 'db'), [want['d_reaction'], want['d_brake']], tolerance);
      }
    });
});
