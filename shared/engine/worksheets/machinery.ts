import type { GivenQuantity, Worksheet } from './worksheet';

const crank: readonly GivenQuantity[] = [
  { symbol: 'r', meaning: 'crank radius', unit: 'm', usual: [0.01, 1] },
  { symbol: 'l', meaning: 'length of the connecting rod', unit: 'm', usual: [0.05, 5] },
  {
    symbol: 'theta',
    meaning: 'crank angle from the dead centre where the slide is farthest out',
    unit: 'rad',
    usual: [-3.2, 3.2],
  },
  { symbol: 'w', meaning: 'angular velocity of the crank', unit: 'rad/s', usual: [0, 60] },
];

const rodReaches = {
  formula: 'l - r - 1e-9',
  message: 'The rod must be longer than the crank.',
  needed: true,
} as const;

const brake: readonly GivenQuantity[] = [
  {
    symbol: 'td',
    meaning: 'delay from the signal to the first braking',
    unit: 's',
    usual: [0, 0.3],
    usualSource: 'common practice',
  },
  { symbol: 'alpha', meaning: 'deceleration of the crank', unit: 'rad/s²', usual: [1, 500] },
];

const machineCaution =
  'the stopping time is measured, in the worst case and with the brake as it was; isolate and lock out the machine before anyone works on it';

export const slideSpeed: Worksheet = {
  id: 'slide-speed',
  title: 'Speed of the slide of a crank press',
  inputs: crank,
  results: [
    {
      symbol: 'v',
      meaning: 'speed of the slide',
      unit: 'm/s',
      formula: 'abs(r * w * sin(theta) * (1 + r * cos(theta) / sqrt(l^2 - (r * sin(theta))^2)))',
    },
  ],
  conditions: [rodReaches],
  validity: ['rigid parts, bearings without play'],
  sources: ['In-line slider-crank (kinematics)'],
};

export const machineStopping: Worksheet = {
  id: 'machine-stopping',
  title: 'Stopping of a crank press',
  inputs: [...crank, ...brake],
  results: [
    { symbol: 't', meaning: 'stopping time', unit: 's', formula: 'td + w / alpha' },
    {
      symbol: 'phi',
      meaning: 'angle turned while stopping',
      unit: 'rad',
      formula: 'w * td + w^2 / (2 * alpha)',
    },
    { symbol: 'end', meaning: 'crank angle at rest', unit: 'rad', formula: 'theta + phi' },
    {
      symbol: 's',
      meaning: 'way of the slide while stopping',
      unit: 'm',
      formula:
        'abs(r * cos(end) + sqrt(l^2 - (r * sin(end))^2) - r * cos(theta) - sqrt(l^2 - (r * sin(theta))^2))',
    },
  ],
  conditions: [
    rodReaches,
    { formula: 'alpha - 1e-9', message: 'The deceleration must be over zero.', needed: true },
  ],
  validity: ['constant deceleration after the delay', machineCaution],
  sources: ['Motion with constant deceleration; in-line slider-crank (kinematics)'],
};

export const separation: Worksheet = {
  id: 'separation',
  title: 'Separation of a light curtain from the danger',
  inputs: [
    {
      symbol: 'T',
      meaning: 'whole stopping time, curtain and machine',
      unit: 's',
      usual: [0.01, 2],
    },
    {
      symbol: 'd',
      meaning: 'detection capability of the curtain',
      unit: 'm',
      usual: [0.01, 0.04],
      usualSource: 'the formula holds to 0.04 m',
    },
  ],
  results: [
    {
      symbol: 'C',
      meaning: 'added for the reach through it',
      unit: 'm',
      formula: 'max(0, 8 * (d - 0.014))',
    },
    { symbol: 'Sh', meaning: 'distance at 2 m/s', unit: 'm', formula: '2 * T + C' },
    {
      symbol: 'Sw',
      meaning: 'distance at 1.6 m/s, not under 0.5 m',
      unit: 'm',
      formula: 'max(0.5, 1.6 * T + C)',
    },
    {
      symbol: 'S',
      meaning: 'separation: at 2 m/s up to 0.5 m, at 1.6 m/s beyond',
      unit: 'm',
      formula: 'min(Sh, Sw)',
    },
  ],
  conditions: [
    {
      formula: '0.04 - d',
      message: 'Over 0.04 m of detection capability this formula does not hold.',
      needed: true,
    },
  ],
  validity: [
    'the approach speeds are conventions, not measured speeds of a person',
    'check against the edition in force: a revision of 2024 exists (from memory)',
    machineCaution,
  ],
  sources: ['EN ISO 13855:2010, at second hand'],
};

export const machinery: readonly Worksheet[] = [slideSpeed, machineStopping, separation];
