import { describe, expect, it } from '@jest/globals';
import { reconstructionDocument } from '#shared/engine/documents/reconstruction';
import { answerStation } from '#shared/engine/reconstruction/index';
import { caseFile, expectClose, nameOf } from './case-file';

interface Inputs {
  readonly r: readonly [number, number];
  readonly l: readonly [number, number];
  readonly theta_deg: readonly [number, number];
  readonly omega: readonly [number, number];
}

describe('a mechanism as a station', () => {
  const a30 = caseFile<Inputs, Record<string, number>>('A30_slider_crank_uncertainty');

  it(`${nameOf(a30)}: poses by the joints, dimensions uncertain`, () => {
    const { r, l, theta_deg: theta, omega } = a30.inputs;
    const degree = Math.PI / 180;
    const exact = (value: number) => ({ value, sigma: 0 });
    const document = reconstructionDocument.parse({
      format: 'centrode.reconstruction/1',
      bodies: [
        {
          id: 'crank',
          name: 'crank',
          points: [
            { id: 'O', name: 'shaft', at: [0, 0], sigma: [0, 0] },
            { id: 'A', name: 'crank pin', at: [r[0], 0], sigma: [r[1], 0] },
          ],
          outline: [],
        },
        {
          id: 'rod',
          name: 'rod',
          points: [
            { id: 'A', name: 'crank pin', at: [0, 0], sigma: [0, 0] },
            { id: 'B', name: 'slider', at: [l[0], 0], sigma: [l[1], 0] },
          ],
          outline: [],
        },
      ],
      joints: [
        { kind: 'ground-pin', id: 'o', a: { body: 'crank', point: 'O' }, at: [0, 0], sigma: 0 },
        { kind: 'pin', id: 'a', a: { body: 'crank', point: 'A' }, b: { body: 'rod', point: 'A' } },
        {
          kind: 'guide',
          id: 'g',
          a: { body: 'rod', point: 'B' },
          direction: 0,
          radius: null,
          at: [0, 0],
          sigma: 0,
        },
      ],
      stations: [
        {
          id: 's',
          name: 's',
          marks: [],
          poses: [
            {
              body: 'crank',
              x: exact(0),
              y: exact(0),
              heading: { value: theta[0] * degree, sigma: theta[1] * degree },
              basis: '',
            },
          ],
          joints: { off: [] },
          knowns: [
            {
              quantity: 'angular-velocity',
              id: 'w',
              body: 'crank',
              value: { value: omega[0], sigma: omega[1] },
              basis: '',
            },
          ],
        },
      ],
    });
    const { solution, failure, pose } = answerStation(document, 's', []);
    expect(failure).toBeNull();
    // the rod may also point away from the slide; both ways are shown
    expect(pose?.alternatives).toHaveLength(1);
    const [branch] = solution?.branches ?? [];
    const { omega: rod, sigma } = branch.bodies['rod'];
    const slider = branch.points['rod.B'];
    expectClose(rod, a30.expected['w.rod'], { rel: 1e-9 });
    expectClose(slider.velocity?.[0], a30.expected['vx.B'], { rel: 1e-9 });
    expectClose(sigma.omega, a30.expected['u_w.rod'], { rel: 1e-6 });
    expectClose(slider.sigma.speed, a30.expected['u_vx.B'], { rel: 1e-6 });
  });
});
