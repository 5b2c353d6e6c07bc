import { PRESS } from './press-motion';
import { CRANK_OUTLINE, RAM_OUTLINE, ROD_OUTLINE } from './press-sketch';
import { FOUND_POINTS, PRESS_SIGMA, type PressSurvey, WITNESSES } from './press-survey';
import type { Vec2 } from './plane-motion';
import { rounded } from './folder';
import { type Joint, type Reconstruction, type SceneBody, type Station } from './scene';

export const EXHIBIT = {
  survey: 1,
  photographs: 2,
  machine: 3,
  note: 4,
  bolt: 5,
  glove: 6,
  glovePhotograph: 7,
};
const POINT_SIGMA = 0.0002;

/** Motor speed over gear, rad/s, and the plate's tolerance as a rectangular half-width. */
export const PLATE = { motorPerMinute: 960, gear: 17, tolerance: 0.03 };
export const PLATE_SPEED = (PLATE.motorPerMinute * 2 * Math.PI) / 60 / PLATE.gear;

const TITLES: Record<string, string> = {
  O: 'crank shaft centre',
  A: 'crank pin',
  B: 'ram pin',
  H: 'ram, upper guide pad',
  P1: 'bruise on the web rim',
  P2: 'bare patch on the counterweight',
  Q1: 'scrape on the rod shank',
  CL: 'ram, lower left edge',
  CR: 'ram, lower right edge',
};

function body(
  id: 'crank' | 'rod' | 'ram',
  name: string,
  colour: string,
  outline: Vec2[],
): SceneBody {
  const points = Object.entries<Vec2>(PRESS.points[id]).map(([point, at]) => {
    const origin = at[0] === 0 && at[1] === 0;
    const sigma: Vec2 = origin ? [0, 0] : [POINT_SIGMA, POINT_SIGMA];
    return [point, { at, sigma, title: TITLES[point] }] as const;
  });
  return {
    id,
    name,
    colour,
    points: Object.fromEntries(points),
    outline,
    mass: null,
    inertia: null,
  };
}

export function pressBodies(): SceneBody[] {
  return [
    body('crank', 'Crank with web', 'steel', CRANK_OUTLINE),
    body('rod', 'Connecting rod', 'steel', ROD_OUTLINE),
    body('ram', 'Ram', 'steel', RAM_OUTLINE),
  ];
}

export function jointsOf(survey: PressSurvey): Joint[] {
  const down = -Math.PI / 2;
  const measured = new Map(survey.book.rows.map((row) => [row.id, row.at]));
  const rails = survey.lines.map(({ points }) => points);
  const mean = (ids: readonly string[]): number =>
    ids.reduce((sum, id) => sum + (measured.get(id)?.[0] ?? 0), 0) / ids.length;
  const middle = (mean(rails[0]) + mean(rails[1])) / 2;
  const guide = (id: string, title: string, point: string): Joint => ({
    id,
    title,
    kind: 'guide',
    a: { body: 'ram', point },
    direction: down,
    radius: null,
    at: [middle, -0.4],
    sigma: PRESS_SIGMA.edge,
    survey: rails.flat(),
  });
  return rounded(
    [
      {
        id: 'shaft',
        title: 'Crank shaft in the frame',
        kind: 'pin',
        a: { body: 'crank', point: 'O' },
        ground: true,
        at: measured.get('O') ?? PRESS.shaft,
        sigma: PRESS_SIGMA.edge,
        survey: ['O'],
      },
      {
        id: 'crank-pin',
        title: 'Crank pin',
        kind: 'pin',
        a: { body: 'crank', point: 'A' },
        b: { body: 'rod', point: 'A' },
      },
      {
        id: 'ram-pin',
        title: 'Ram pin',
        kind: 'pin',
        a: { body: 'rod', point: 'B' },
        b: { body: 'ram', point: 'B' },
      },
      guide('lower-guide', 'Ram in the gibs at the ram pin', 'B'),
      guide('upper-guide', 'Ram in the gibs at the upper pad', 'H'),
    ],
    9,
  );
}

function stationsOf(): Station[] {
  return rounded(
    [
      {
        id: 'S1',
        title: 'Contact with the guard frame',
        basis: 'Five fresh marks that fit together in one position of crank, rod and ram only.',
        marks: WITNESSES.map(({ id, body: part, point }) => ({ survey: id, body: part, point })),
        tangents: [],
        knowns: [
          {
            id: 'S1-crank-speed',
            title: 'Motor plate over gear ratio, 3 per cent either way, evenly likely',
            source: { file: 'machine.json', exhibit: EXHIBIT.machine },
            quantity: 'angular-velocity',
            body: 'crank',
            value: PLATE_SPEED,
            sigma: (PLATE_SPEED * PLATE.tolerance) / Math.sqrt(3),
          },
          {
            id: 'S1-crank-acceleration',
            title: 'Flywheel drive runs evenly; slowing under load bounded by its inertia',
            source: { file: 'machine.json', exhibit: EXHIBIT.machine },
            quantity: 'angular-acceleration',
            body: 'crank',
            value: 0,
            sigma: 0.5,
          },
        ],
        checks: [],
      },
      {
        id: 'S2',
        title: 'As found, locked out',
        basis: 'Measured on the machine at rest.',
        marks: FOUND_POINTS.map(({ id, body: part, point }) => ({ survey: id, body: part, point })),
        tangents: [],
        knowns: [],
        checks: [],
      },
    ],
    6,
  );
}

export function reconstruction(survey: PressSurvey): Reconstruction {
  return {
    title: 'Press 4 at contact',
    assumption: 'The crank turned counter-clockwise, down stroke, at the speed of the motor plate.',
    bodies: pressBodies(),
    joints: jointsOf(survey),
    stations: stationsOf(),
    traces: [],
    timeBase: [],
    alternatives: [
      {
        id: 'B',
        title: 'Ram dents older',
        assumption:
          'The gib dents W4 and W5 are from an earlier event; only W1, W2 and W3 fix the position.',
        traces: {},
        marks: {},
        droppedJoints: [],
      },
    ],
    asked: [
      { station: 'S1', body: 'ram', point: 'B', quantity: 'speed', question: 1 },
      { station: 'S1', body: 'ram', point: 'B', quantity: 'acceleration', question: 2 },
      { station: 'S2', body: 'crank', point: null, quantity: 'pose', question: 3 },
    ],
  };
}
