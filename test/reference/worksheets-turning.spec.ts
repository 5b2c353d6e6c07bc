import { describe, expect, it } from '@jest/globals';
import { caseFile, expectClose, nameOf } from './case-file';
import { degree, values, work, type Cases, type Numbers } from './worksheet-work';

describe('turning', () => {
  const c15 = caseFile<Cases<Numbers>, Record<string, Numbers>>('C15_offtracking');
  for (const [key, given] of Object.entries(c15.inputs.subcases))
    it(`${nameOf(c15)}, ${key}`, () => {
      const want = c15.expected[key];
      const { L } = given;
      if (key.startsWith('steer_axle')) {
        const sheet = work('off-tracking', {
          R: given['R_front'],
          wb: given['wheelbase'],
          k: given['fifth_wheel_ahead_of_rear_axle'],
          L: given['L_trailer'],
        });
        expectClose(
          values(sheet, 'Rr', 'Rk', 'Rt', 'o', 'ot'),
          [
            want['R_tractor_rear'],
            want['R_kingpin'],
            want['R_trailer_axle'],
            want['offtracking_trailer_vs_front'],
            want['offtracking_tractor'],
          ],
          c15.tolerance,
        );
        expectClose(
          values(sheet, 'delta', 'gamma').map((angle) => angle / degree),
          [want['tractor_steer_deg'], want['articulation_deg']],
          c15.tolerance,
        );
      } else if (key.startsWith('max_offtracking')) {
        const { tr, wb, ht, ko: k, ka } = given;
        const sheet = work('widest-off-tracking', { tr, wb, ht, k, L: ka });
        expectClose(values(sheet, 'o'), [want['value']], c15.tolerance);
      } else if (key.startsWith('circle')) {
        // the steady state is where a long way on the circle leads
        const turn = (given['turn_deg'] ?? 3000) * degree;
        const sheet = work('circle-entry', {
          psi0: (given['articulation0_deg'] ?? 0) * degree,
          R: given['R_kingpin'],
          turn,
          L,
        });
        expectClose(sheet.of('psi').value / degree, want['articulation_deg'], c15.tolerance);
      } else {
        const sense = key.startsWith('reversing') ? -1 : 1;
        const sheet = work('straight-pull', {
          psi0: given['psi0_deg'] * degree,
          s: sense * given['s'],
          L,
        });
        expectClose(sheet.of('psi').value / degree, want['articulation_deg'], c15.tolerance);
        expect(sheet.warnings).toHaveLength(sense < 0 ? 1 : 0);
      }
    });

  const c16 = caseFile<Cases<Numbers>, Record<string, Numbers>>('C16_ackermann');
  for (const [key, { L: wb, kingpin_track: w, R_rear_axle_centre: R }] of Object.entries(
    c16.inputs.subcases,
  ))
    it(`${nameOf(c16)}, ${key}`, () => {
      const want = c16.expected[key];
      expectClose(
        values(work('steering', { wb, w, R }), 'di', 'do', 'delta').map((angle) => angle / degree),
        [want['delta_inner_deg'], want['delta_outer_deg'], want['single_track_delta_deg']],
        c16.tolerance,
      );
    });
});

describe('machinery', () => {
  const c19 = caseFile<
    Numbers & { sep_cases: Record<string, { T: number | string; d_mm: number }> },
    Numbers & Record<string, { S_mm: number }>
  >('C19_press_stopping');
  const { crank_r: r, rod_l: l, rpm, delay: td, brake_decel_rad_s2: alpha } = c19.inputs;
  const w = (rpm * 2 * Math.PI) / 60;

  it(nameOf(c19), () => {
    const { expected, tolerance } = c19;
    const at = (degrees: number) =>
      work('slide-speed', { r, l, w, theta: degrees * degree }).of('v').value;
    expectClose(w, expected['omega'], tolerance);
    expectClose(
      [at(-90), at(-60), at(expected['theta_max_speed_deg'])],
      [
        expected['slide_speed_at_90deg'],
        expected['slide_speed_60deg_before_BDC'],
        expected['max_slide_speed'],
      ],
      { rel: 1e-9 },
    );
    const stop = work('machine-stopping', { r, l, w, td, alpha, theta: -90 * degree });
    expectClose(
      [stop.of('t').value, stop.of('phi').value / degree, stop.of('s').value],
      [
        expected['stop_time'],
        expected['stop_angle_deg'],
        expected['slide_travel_from_90deg_before_BDC_during_stop'],
      ],
      tolerance,
    );
  });

  it(`${nameOf(c19)}, separation`, () => {
    const { expected } = c19;
    let compared = 0;
    for (const [key, { T, d_mm: d, ...more }] of Object.entries(c19.inputs.sep_cases)) {
      const time = typeof T === 'number' ? T : expected['stop_time'];
      const sheet = work('separation', { T: time, d: d / 1000 });
      // a case that names the slower speed asks for that formula, not for the rule
      const slower = 'K' in more && more.K === 1600;
      const C = sheet.of('C').value;
      const got = slower ? 1.6 * time + C : sheet.of('S').value;
      expectClose(1000 * got, expected[key].S_mm, { rel: 1e-3 });
      if (!key.startsWith('separation_K'))
        expectClose(1000 * got, expected[key].S_mm, c19.tolerance);
      compared++;
    }
    expect(compared).toBe(6);
  });
});
