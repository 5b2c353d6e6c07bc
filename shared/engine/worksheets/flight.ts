import type { GivenQuantity, Worksheet } from './worksheet';

const launchAngle: GivenQuantity = {
  symbol: 'theta',
  meaning: 'angle of the launch above the horizontal',
  unit: 'rad',
  usual: [-0.2, 0.8],
  usualSource: 'common practice',
};

export const airborne: Worksheet = {
  id: 'airborne',
  title: 'Speed of a launch from the edge of a drop',
  inputs: [
    { symbol: 'd', meaning: 'horizontal distance of the mass centre', unit: 'm', usual: [1, 80] },
    { symbol: 'h', meaning: 'drop of the mass centre', unit: 'm', usual: [0, 60] },
    launchAngle,
  ],
  results: [
    {
      symbol: 'v',
      meaning: 'speed at the launch',
      unit: 'm/s',
      formula: 'd / cos(theta) * sqrt(g / (2 * (h + d * tan(theta))))',
    },
    {
      symbol: 'vm',
      meaning: 'least speed at any angle of launch',
      unit: 'm/s',
      formula: 'sqrt(g * (sqrt(h^2 + d^2) - h))',
    },
  ],
  conditions: [
    {
      formula: 'h + d * tan(theta) - 1e-9',
      message: 'With this angle the mass centre cannot come down there.',
      needed: true,
    },
  ],
  validity: [
    'no drag of the air and no contact that pitches the vehicle',
    'distances of the mass centre, from loss of support to first contact',
    'an error of 1° in the angle can change the speed by several per cent',
  ],
  sources: ['Flight without drag (mechanics)'],
};

const throwInputs: readonly GivenQuantity[] = [
  {
    symbol: 'mu',
    meaning: 'friction of the body on the ground',
    unit: '1',
    usual: [0.57, 0.79],
    usualSource: 'dry asphalt 0.57–0.72, grass 0.79 (from memory)',
  },
  {
    symbol: 's',
    meaning: 'distance from first contact to rest',
    unit: 'm',
    usual: [2, 80],
    usualSource: 'common practice',
  },
  {
    symbol: 'H',
    meaning: 'height of the mass centre at the launch, above that at rest',
    unit: 'm',
    usual: [0, 1.5],
    usualSource: 'common practice',
  },
];

const searle = [
  'J. A. Searle and A. Searle, The trajectories of pedestrians, motorcycles, motorcyclists, etc., following a road accident, SAE 831622 (1983)',
  'J. A. Searle, SAE 930659 (1993), from memory',
];

const throwValidity = [
  'a full forward projection; the speed of the vehicle may be higher where the body wraps around it (projection efficiency 0.6–0.9, from memory)',
  'not after a roof vault, a carry, a side-swipe or a second impact',
  'the body still slides forward after it lands',
];

const reaches = {
  formula: 's - mu * H',
  message: 'The distance is too short for a fall from this height.',
  needed: true,
} as const;

export const throwBounds: Worksheet = {
  id: 'throw-bounds',
  title: 'Bounds of the projection speed of a pedestrian or rider',
  inputs: throwInputs,
  results: [
    {
      symbol: 'vl',
      meaning: 'least projection speed',
      unit: 'm/s',
      formula: 'sqrt(2 * mu * g * (s - mu * H) / (1 + mu^2))',
    },
    {
      symbol: 'vh',
      meaning: 'projection speed of a launch along the ground',
      unit: 'm/s',
      formula: 'sqrt(2 * mu * g * (s - mu * H))',
    },
    {
      symbol: 'a',
      meaning: 'angle of launch that the least speed takes',
      unit: 'rad',
      formula: 'atan(mu)',
    },
  ],
  conditions: [reaches],
  validity: throwValidity,
  sources: searle,
};

export const throwAtAngle: Worksheet = {
  id: 'throw-at-angle',
  title: 'Projection speed of a pedestrian or rider at a known angle of launch',
  inputs: [...throwInputs, launchAngle],
  results: [
    {
      symbol: 'v',
      meaning: 'projection speed',
      unit: 'm/s',
      formula: 'sqrt(2 * mu * g * (s - mu * H)) / (cos(theta) + mu * sin(theta))',
    },
    {
      symbol: 'w',
      meaning: 'vertical speed at the landing',
      unit: 'm/s',
      formula: 'sqrt((v * sin(theta))^2 + 2 * g * H)',
    },
  ],
  conditions: [
    reaches,
    {
      formula: 'v * cos(theta) - mu * w',
      message: 'The body would not slide forward after it lands: the formula does not hold.',
      needed: false,
    },
  ],
  validity: throwValidity,
  sources: searle,
};

export const flight: readonly Worksheet[] = [airborne, throwBounds, throwAtAngle];
