import { dragFactor } from './sliding';
import type { GivenQuantity, Worksheet } from './worksheet';

const brach =
  'R. M. Brach, An analytical assessment of the critical speed formula, SAE 970957 (1997): the accuracy depends on where along the mark the curvature is taken, and braking biases it';

const lateral: GivenQuantity = {
  ...dragFactor,
  symbol: 'mu',
  meaning: 'friction coefficient across the tyre',
  usual: [0.3, 1],
};

const superelevation: GivenQuantity = {
  symbol: 'e',
  meaning: 'superelevation: tangent of the bank, positive toward the centre of the curve',
  unit: '1',
  usual: [-0.1, 0.12],
  usualSource: 'common practice',
};

const chord: readonly GivenQuantity[] = [
  {
    symbol: 'C',
    meaning: 'chord on the mark of the outer front wheel',
    unit: 'm',
    usual: [9, 30],
    usualSource: 'common practice: 9–15 m on a car’s mark',
  },
  {
    symbol: 'M',
    meaning: 'middle ordinate',
    unit: 'm',
    usual: [0.05, 3],
    usualSource: 'common practice',
  },
];

const radiusOfMark = {
  symbol: 'r',
  meaning: 'radius of the mark',
  unit: 'm',
  formula: 'C^2 / (8 * M) + M / 2',
} as const;

const yawValidity = [
  'a yaw mark of wheels that roll and slip sideways (slanting striations), with little braking',
  'the first part of the mark, at nearly constant speed over the chord',
  'not after an impact, not for locked wheels, not where the radius falls quickly',
];

const positiveOrdinate = {
  formula: 'M - 1e-6',
  message: 'The middle ordinate must be over zero.',
  needed: true,
} as const;

export const chordRadius: Worksheet = {
  id: 'chord-radius',
  title: 'Radius from chord and middle ordinate',
  inputs: chord,
  results: [radiusOfMark],
  conditions: [positiveOrdinate],
  validity: [
    'a circular arc over the whole chord; repeat on the next chord to see whether the radius grows',
    'with the middle ordinate known to worse than 10 % the radius is skewed to larger values',
  ],
  sources: ['Sagitta of a circular arc (geometry)'],
};

export const threePoints: Worksheet = {
  id: 'three-points',
  title: 'Radius from three points',
  inputs: [1, 2, 3].flatMap((i): GivenQuantity[] => [
    { symbol: `x${i}`, meaning: `x of point ${i}`, unit: 'm' },
    { symbol: `y${i}`, meaning: `y of point ${i}`, unit: 'm' },
  ]),
  results: [
    {
      symbol: 'a',
      meaning: 'distance of points 2 and 3',
      unit: 'm',
      formula: 'sqrt((x2 - x3)^2 + (y2 - y3)^2)',
    },
    {
      symbol: 'b',
      meaning: 'distance of points 1 and 3',
      unit: 'm',
      formula: 'sqrt((x1 - x3)^2 + (y1 - y3)^2)',
    },
    {
      symbol: 'c',
      meaning: 'distance of points 1 and 2',
      unit: 'm',
      formula: 'sqrt((x1 - x2)^2 + (y1 - y2)^2)',
    },
    {
      symbol: 'r',
      meaning: 'radius of the circle through them',
      unit: 'm',
      formula: 'a * b * c / (2 * abs((x2 - x1) * (y3 - y1) - (x3 - x1) * (y2 - y1)))',
    },
  ],
  conditions: [
    {
      formula: 'abs((x2 - x1) * (y3 - y1) - (x3 - x1) * (y2 - y1)) - 1e-9',
      message: 'The three points are on a straight line.',
      needed: true,
    },
  ],
  validity: ['a circular arc; points far apart compared with their uncertainty'],
  sources: ['Circumradius of a triangle (geometry)'],
};

export const criticalSpeed: Worksheet = {
  id: 'critical-speed',
  title: 'Critical speed in a curve',
  inputs: [
    lateral,
    {
      symbol: 'R',
      meaning: 'radius of the path of the mass centre',
      unit: 'm',
      usual: [30, 200],
      usualSource: 'common practice',
    },
    superelevation,
  ],
  results: [
    {
      symbol: 'v',
      meaning: 'critical speed',
      unit: 'm/s',
      formula: 'sqrt(g * R * (mu + e) / (1 - mu * e))',
    },
    {
      symbol: 'va',
      meaning: 'the same, approximately: √(g·R·(µ + e))',
      unit: 'm/s',
      formula: 'sqrt(g * R * (mu + e))',
    },
  ],
  conditions: [
    {
      formula: 'mu + e',
      message: 'Friction and bank together must not be negative.',
      needed: true,
    },
    { formula: '1 - mu * e', message: 'On this bank there is no critical speed.', needed: true },
  ],
  validity: [...yawValidity, 'R is about the radius of the mark less half the track width'],
  sources: ['Circular motion on a banked surface', brach],
};

export const yawMark: Worksheet = {
  id: 'yaw-mark',
  title: 'Speed from a yaw mark: chord, middle ordinate, track, friction',
  inputs: [
    ...chord,
    {
      symbol: 'w',
      meaning: 'track width of the vehicle',
      unit: 'm',
      usual: [1.2, 2.2],
      usualSource: 'common practice',
    },
    lateral,
    superelevation,
  ],
  results: [
    radiusOfMark,
    {
      symbol: 'R',
      meaning: 'radius of the path of the mass centre',
      unit: 'm',
      formula: 'r - w / 2',
    },
    {
      symbol: 'v',
      meaning: 'critical speed',
      unit: 'm/s',
      formula: 'sqrt(g * R * (mu + e) / (1 - mu * e))',
    },
  ],
  conditions: [
    positiveOrdinate,
    { formula: '1 - mu * e', message: 'On this bank there is no critical speed.', needed: true },
  ],
  validity: yawValidity,
  sources: ['Sagitta of a circular arc (geometry)', 'Circular motion on a banked surface', brach],
};

export const curves: readonly Worksheet[] = [chordRadius, threePoints, criticalSpeed, yawMark];
