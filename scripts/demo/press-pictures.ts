import type { Shot } from './draft';
import { type Vec3, unit } from './picture/camera';
import { type Stage, flatPlane } from './picture/render';
import {
  type Colour,
  type Paint,
  type Solid,
  blend,
  box,
  capsule,
  placed,
  shifted,
} from './picture/solids';
import { cloud, noise, ramp, stripe } from './picture/texture';
import { lettering, numeral, rule, tag } from './picture/things';
import { place } from './plane-motion';
import { asFound, atContact } from './press-motion';
import { SHAFT_HEIGHT, driveParts, frameParts, movingParts, upright } from './press-parts';
import { DATUMS, WITNESSES, partPoint } from './press-survey';

const shot = (
  number: number,
  title: string,
  time: string,
  eye: Vec3,
  aim: Vec3,
  focalLength: number,
  stage: Shot['stage'] = 'main',
): Shot => ({
  number,
  title,
  takenAt: `2026-08-19T${time}-08:00`,
  takenBy: 'S. Lindqvist',
  sensitive: false,
  camera: { eye, target: aim, focalLength },
  stage,
});

const BENCH: Vec3 = [6, 0, 0.9];

export const PRESS_SHOTS: readonly Shot[] = [
  shot(
    1,
    'Press 4 as found, locked out, from the operator side',
    '16:12:08',
    [0.12, -2.5, 1.45],
    [0, 0, 1.16],
    35,
  ),
  shot(2, 'Press 4 from the left', '16:14:41', [-1.7, -1.75, 1.75], [0, 0.05, 1.15], 32),
  shot(
    3,
    'Crank web and guard bolt, witness marks W1 and W2',
    '16:21:19',
    [-0.05, -0.95, 1.42],
    [-0.03, 0, 1.36],
    42,
  ),
  shot(
    4,
    'Left gib, witness mark W4, with rule',
    '16:26:55',
    [0.02, -0.55, 0.98],
    [-0.17, -0.03, 0.885],
    45,
  ),
  shot(5, 'Plate of the drive motor', '16:33:02', [5.6, -0.5, 1.06], [5.6, 0, 1.05], 50, 'detail'),
  {
    ...shot(
      6,
      'Glove from the die space',
      '16:48:30',
      [6.1, -0.42, 1.32],
      [6.06, 0.0, 0.9],
      40,
      'detail',
    ),
    sensitive: true,
  },
];

const floor = (x: number, y: number, _z: number, footprint: number): Colour => {
  const tone =
    0.2 *
    (0.6 + 0.5 * cloud(x, y, 0.6, 5, footprint) + 0.3 * (cloud(x, y, 0.03, 3, footprint) - 0.5));
  const oil = 1 - 0.55 * ramp(0.55, 0.75, cloud(x + 3, y, 0.5, 3, footprint));
  const line = stripe(y + 1.1, 0.04, footprint) * ramp(0.3, 0.5, cloud(x, y, 0.1, 3, footprint));
  return [
    tone * oil * (1 - line) + 0.5 * line,
    tone * oil * (1 - line) + 0.38 * line,
    tone * 0.96 * oil * (1 - line) + 0.04 * line,
  ];
};

/** A painted wall of blocks with a darker base. */
const wall = (x: number, _y: number, z: number, footprint: number): Colour => {
  const row = Math.floor(z / 0.2);
  const joint = Math.max(
    stripe(z - 0.2 * Math.round(z / 0.2), 0.006, footprint),
    stripe((((x + 0.2 * (row % 2)) % 0.4) + 0.4) % 0.4, 0.006, footprint),
  );
  const tone = 0.85 + 0.25 * (cloud(x, z, 0.8, 4, footprint) - 0.5) - 0.3 * joint;
  return z < 1.2 ? [0.16 * tone, 0.2 * tone, 0.22 * tone] : [0.45 * tone, 0.44 * tone, 0.4 * tone];
};

/** A worn work glove lying on the bench, with a stain; nothing else is shown. */
function glove(): Solid {
  const fingers = [-0.033, -0.011, 0.012, 0.034].map((y, i) =>
    capsule([0.05, y, 0.012], [0.115 - 0.012 * Math.abs(i - 1.4), y * 1.5, 0.011], 0.0115),
  );
  const palm = shifted(box(0.06, 0.046, 0.014, 0.013), 0, 0, 0.014);
  const thumb = capsule([-0.01, -0.045, 0.013], [0.045, -0.083, 0.012], 0.0125);
  const cuff = shifted(box(0.035, 0.05, 0.017, 0.015), -0.085, 0, 0.016);
  const shape = blend(0.018, palm, thumb, cuff, ...fingers);
  const paint: Paint = (x, y, z) => {
    const weave = 0.85 + 0.3 * noise(x * 900, y * 900) * noise(x * 120, z * 300);
    const away = Math.hypot(x - 0.045, (y - 0.012) * 1.3) + 0.02 * (noise(x * 60, y * 60) - 0.5);
    const stain = 0.75 * (1 - ramp(0.016, 0.034, away));
    const cloth: Colour = x < -0.055 ? [0.12, 0.16, 0.22] : [0.42, 0.37, 0.27];
    return [
      weave * (cloth[0] * (1 - stain) + 0.1 * stain),
      weave * (cloth[1] * (1 - stain) + 0.05 * stain),
      weave * (cloth[2] * (1 - stain) + 0.035 * stain),
    ];
  };
  return placed(
    { distance: (x, y, z) => shape(x, y, z) * 0.9, paint, gloss: 0, reach: 0.16 },
    {
      at: [BENCH[0] + 0.05, 0, BENCH[2]],
      heading: 0.5,
    },
  );
}

async function motorPlate(): Promise<Solid> {
  const rows = [
    ['FENNEL DRIVES', 200, 34, 22],
    ['Type FD 132   No. 40417', 200, 74, 17],
    ['3 ~   400 V   50 Hz   4.0 kW', 200, 106, 17],
    ['960 min\u207B\u00B9  \u00B1 3 %', 200, 146, 26],
    ['Gear 17.0 : 1', 200, 180, 20],
    ['IP 54   cos \u03C6 0.80', 200, 212, 15],
  ] as const;
  const text = rows
    .map(
      ([words, x, y, size]) =>
        `<text x="${x}" y="${y}" font-size="${size}" font-family="DejaVu Sans, sans-serif"
          font-weight="bold" text-anchor="middle">${words}</text>`,
    )
    .join('');
  const border =
    '<rect x="8" y="8" width="384" height="224" fill="none" stroke="black" stroke-width="3"/>';
  const face = await lettering(border + text, 240);
  const [hx, hz] = [0.075, 0.045];
  const paint: Paint = (x, _y, z) => {
    const scratch = 0.85 + 0.2 * noise(x * 60 + z * 30, z * 900);
    const ink = face((x + hx) / (2 * hx), (hz - z) / (2 * hz));
    const worn = 1 - 0.5 * ramp(0.55, 0.7, cloud(x * 10, z * 10, 0.4, 3, 0));
    const tone = scratch * (0.42 - 0.38 * ink * worn);
    return [tone, tone, tone * 1.02];
  };
  return placed(
    { distance: box(hx, 0.002, hz, 0.001), paint, gloss: 0.12, reach: 0.1 },
    {
      at: [5.6, -0.002, 1.05],
      tilt: 0.02,
    },
  );
}

export async function pressStages(): Promise<Record<Shot['stage'], Stage>> {
  const contact = atContact();
  const found = asFound();
  const faces = await Promise.all(WITNESSES.map(({ id }) => numeral(id)));
  const asides = [
    [-0.04, 0.045],
    [0.02, 0.07],
    [0.17, 0.035],
    [-0.06, 0],
    [0.06, 0],
  ];
  const tags = WITNESSES.map((witness, i) => {
    const [x, y] = place(contact[witness.body].pose, partPoint(witness));
    return tag(upright([x + asides[i][0], y + asides[i][1]], -0.135), faces[i]);
  });
  const [gibX, gibY] = place(contact.ram.pose, partPoint(WITNESSES[3]));
  const lockout = placed(
    {
      distance: box(0.05, 0.004, 0.08, 0.003),
      paint: (_x, _y, z) => (Math.abs(z - 0.02) < 0.02 ? [0.7, 0.68, 0.64] : [0.6, 0.05, 0.03]),
      gloss: 0.05,
      reach: 0.11,
    },
    { at: [0.36, -0.012, SHAFT_HEIGHT - 0.18] },
  );
  const room: Pick<Stage, 'sky' | 'sun' | 'daylight' | 'haze'> = {
    sky: () => [0.5, 0.5, 0.48],
    sun: { towards: unit([-0.45, -0.7, 0.75]), strength: 1.15, softness: 7 },
    daylight: 0.85,
    haze: 90,
  };
  const main: Stage = {
    ...room,
    planes: [flatPlane([0, 0, 1], 0, floor), flatPlane([0, -1, 0], 1.7, wall)],
    solids: [
      ...frameParts(),
      ...movingParts(found),
      ...driveParts(),
      ...tags,
      lockout,
      rule(upright([gibX - 0.022, gibY], -0.125), Math.PI / 2, 0.1),
      ...Object.values(DATUMS).map(([x, y]) =>
        placed(
          {
            distance: box(0.016, 0.001, 0.016),
            paint: (dx, _dy, dz) => (dx * dz > 0 ? [0.02, 0.02, 0.02] : [0.8, 0.8, 0.78]),
            gloss: 0,
            reach: 0.03,
          },
          { at: upright([x, y], -0.003) },
        ),
      ),
    ],
  };
  const bench = (x: number, y: number, _z: number, footprint: number): Colour => {
    const grain = 0.7 + 0.5 * cloud(x * 0.3, y * 6, 0.12, 4, footprint);
    return [0.3 * grain, 0.23 * grain, 0.15 * grain];
  };
  const housing = (x: number, _y: number, z: number, footprint: number): Colour => {
    const tone = 0.8 + 0.4 * (cloud(x, z, 0.15, 4, footprint) - 0.5);
    return [0.08 * tone, 0.13 * tone, 0.19 * tone];
  };
  const detail: Stage = {
    ...room,
    planes: [flatPlane([0, 0, 1], BENCH[2], bench), flatPlane([0, -1, 0], 0.35, housing)],
    solids: [
      await motorPlate(),
      placed(
        {
          distance: box(0.16, 0.05, 0.14, 0.02),
          paint: (x, _y, z) => housing(x, 0, z, 0.001),
          gloss: 0.1,
          reach: 0.3,
        },
        { at: [5.6, 0.05, 1.05] },
      ),
      glove(),
      rule([BENCH[0] + 0.06, -0.13, BENCH[2] + 0.012], 0, 0.2),
    ],
  };
  return { main, detail };
}
