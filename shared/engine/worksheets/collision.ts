import type { GivenQuantity, Worksheet } from './worksheet';

const mass = (i: number): GivenQuantity => ({
  symbol: `m${i}`,
  meaning: `mass of vehicle ${i} with its load`,
  unit: 'kg',
  usual: [500, 60_000],
  usualSource: 'common practice',
});

const brach =
  'R. M. Brach and P. F. Dunn, Uncertainty Analysis for Forensic Science (2009), from memory, for the uncertainty';

export const momentumPlane: Worksheet = {
  id: 'momentum-plane',
  title: 'Momentum of two vehicles in the plane: speeds before from those after',
  inputs: [
    mass(1),
    mass(2),
    { symbol: 'a1', meaning: 'direction of travel of vehicle 1 before', unit: 'rad' },
    { symbol: 'a2', meaning: 'direction of travel of vehicle 2 before', unit: 'rad' },
    { symbol: 'u1', meaning: 'speed of vehicle 1 after', unit: 'm/s', usual: [0, 40] },
    { symbol: 'u2', meaning: 'speed of vehicle 2 after', unit: 'm/s', usual: [0, 40] },
    { symbol: 'f1', meaning: 'direction of travel of vehicle 1 after', unit: 'rad' },
    { symbol: 'f2', meaning: 'direction of travel of vehicle 2 after', unit: 'rad' },
  ],
  results: [
    {
      symbol: 'v1',
      meaning: 'speed of vehicle 1 before',
      unit: 'm/s',
      formula: '(m1 * u1 * sin(a2 - f1) + m2 * u2 * sin(a2 - f2)) / (m1 * sin(a2 - a1))',
    },
    {
      symbol: 'v2',
      meaning: 'speed of vehicle 2 before',
      unit: 'm/s',
      formula: '(m1 * u1 * sin(f1 - a1) + m2 * u2 * sin(f2 - a1)) / (m2 * sin(a2 - a1))',
    },
    {
      symbol: 'dv1',
      meaning: 'change of velocity of vehicle 1',
      unit: 'm/s',
      formula: 'sqrt(u1^2 + v1^2 - 2 * u1 * v1 * cos(f1 - a1))',
    },
    {
      symbol: 'dv2',
      meaning: 'change of velocity of vehicle 2',
      unit: 'm/s',
      formula: 'sqrt(u2^2 + v2^2 - 2 * u2 * v2 * cos(f2 - a2))',
    },
    {
      symbol: 'E',
      meaning: 'energy lost',
      unit: 'J',
      formula: '(m1 * (v1^2 - u1^2) + m2 * (v2^2 - u2^2)) / 2',
    },
  ],
  conditions: [
    {
      formula: 'abs(sin(a2 - a1)) - 0.25',
      message:
        'The directions before are within about 15° of one line: the speeds are ill-conditioned, and Monte Carlo should replace the first-order interval.',
      needed: false,
    },
    {
      formula: 'E',
      message: 'The energy grows in this impact: the data do not agree.',
      needed: false,
    },
    { formula: 'v1', message: 'Vehicle 1 would have travelled backwards.', needed: false },
    { formula: 'v2', message: 'Vehicle 2 would have travelled backwards.', needed: false },
  ],
  validity: [
    'speeds and directions of travel of the mass centres just before and just after the contact',
    'forces of the ground during the contact are left out',
    'both speeds come from one solution and are correlated',
  ],
  sources: ['Conservation of linear momentum', brach],
};

export const momentumLine: Worksheet = {
  id: 'momentum-line',
  title: 'Momentum of two vehicles in one line',
  inputs: [
    mass(1),
    mass(2),
    { symbol: 'v2', meaning: 'velocity of vehicle 2 before, along the line', unit: 'm/s' },
    { symbol: 'u1', meaning: 'velocity of vehicle 1 after, along the line', unit: 'm/s' },
    { symbol: 'u2', meaning: 'velocity of vehicle 2 after, along the line', unit: 'm/s' },
  ],
  results: [
    {
      symbol: 'v1',
      meaning: 'velocity of vehicle 1 before',
      unit: 'm/s',
      formula: 'u1 + m2 / m1 * (u2 - v2)',
    },
    {
      symbol: 'e',
      meaning: 'restitution',
      unit: '1',
      formula: '(u2 - u1) / (v1 - v2)',
    },
  ],
  conditions: [
    {
      formula: 'abs(v1 - v2) - 1e-9',
      message: 'The vehicles did not close on each other.',
      needed: true,
    },
    {
      formula: 'e',
      message: 'The restitution is negative: one passes through the other.',
      needed: false,
    },
    {
      formula: '1 - e',
      message: 'The restitution is over 1: the data do not agree.',
      needed: false,
    },
  ],
  validity: ['a central impact in one line'],
  sources: ['Conservation of linear momentum'],
};

export const forceDirection: Worksheet = {
  id: 'force-direction',
  title: 'Principal direction of force from a change of velocity',
  inputs: [
    { symbol: 'dx', meaning: 'change of velocity along the scene’s x', unit: 'm/s' },
    { symbol: 'dy', meaning: 'change of velocity along the scene’s y', unit: 'm/s' },
    { symbol: 'psi', meaning: 'heading of the vehicle', unit: 'rad' },
  ],
  results: [
    { symbol: 'dv', meaning: 'change of velocity', unit: 'm/s', formula: 'sqrt(dx^2 + dy^2)' },
    {
      symbol: 'p',
      meaning: 'direction from which the force acts, clockwise from straight ahead',
      unit: 'rad',
      formula: 'atan2(dy * cos(psi) - dx * sin(psi), -(dx * cos(psi) + dy * sin(psi)))',
    },
  ],
  conditions: [
    {
      formula: 'dv - 1e-9',
      message: 'Without a change of velocity there is no direction.',
      needed: true,
    },
  ],
  validity: ['the clock hour of a collision record stands for ±15° and is no precise angle'],
  sources: [
    'SAE J224 (MAR80) for the clock directions, at second hand: the direction from which the force acts, 12 o’clock ahead',
  ],
};

const depths: readonly GivenQuantity[] = [1, 2, 3, 4, 5, 6].map((i) => ({
  symbol: `C${i}`,
  meaning: `residual crush depth ${i} of six, equally spaced`,
  unit: 'm',
  usual: [0, 1.2],
  usualSource: 'common practice',
}));

const campbell =
  'K. L. Campbell, Energy basis for collision severity, SAE 740565 (1974), number from memory';

const crushValidity = [
  'coefficients of the vehicle’s own kind and age: they do not carry over between generations of cars',
  'not for offset under-ride and pole impacts outside the model',
];

export const crushEnergy: Worksheet = {
  id: 'crush-energy',
  title: 'Crush energy from six depths, force linear in depth',
  inputs: [
    { symbol: 'A', meaning: 'force per width at no crush', unit: 'N/m', usual: [1e4, 1e5] },
    { symbol: 'B', meaning: 'rise of it with depth', unit: 'N/m²', usual: [1e5, 2e6] },
    { symbol: 'L', meaning: 'width of the damage', unit: 'm', usual: [0.2, 4] },
    ...depths,
    mass(0),
  ],
  results: [
    {
      symbol: 'S1',
      meaning: 'sum of the depths, the ends by half',
      unit: 'm',
      formula: '(C1 + 2 * (C2 + C3 + C4 + C5) + C6) / 2',
    },
    {
      symbol: 'S2',
      meaning: 'sum of squares and products of neighbours, over six',
      unit: '1',
      formula:
        '(C1^2 + 2 * (C2^2 + C3^2 + C4^2 + C5^2) + C6^2 + C1*C2 + C2*C3 + C3*C4 + C4*C5 + C5*C6) / 6',
    },
    {
      symbol: 'E',
      meaning: 'crush energy',
      unit: 'J',
      formula: 'L / 5 * (A * S1 + B * S2 + 5 * A^2 / (2 * B))',
    },
    {
      symbol: 'v',
      meaning: 'speed equivalent of the energy',
      unit: 'm/s',
      formula: 'sqrt(2 * E / m0)',
    },
  ],
  conditions: [
    { formula: 'B - 1e-9', message: 'B must be over zero.', needed: true },
    { formula: 'E', message: 'The energy must not be negative.', needed: true },
  ],
  validity: [...crushValidity, 'A and B of one kind of vehicle are strongly correlated'],
  sources: [campbell],
};

export const crushCoefficients: Worksheet = {
  id: 'crush-coefficients',
  title: 'Crush coefficients from barrier tests, speed linear in depth',
  inputs: [
    { symbol: 'm', meaning: 'mass of the tested vehicle', unit: 'kg', usual: [500, 5000] },
    { symbol: 'w', meaning: 'width of the crush', unit: 'm', usual: [1, 2.5] },
    { symbol: 'b0', meaning: 'speed without residual crush', unit: 'm/s', usual: [1, 4] },
    { symbol: 'b1', meaning: 'rise of speed with crush, (m/s)/m', unit: '1', usual: [8, 40] },
  ],
  results: [
    {
      symbol: 'A',
      meaning: 'force per width at no crush',
      unit: 'N/m',
      formula: 'm * b0 * b1 / w',
    },
    { symbol: 'B', meaning: 'rise of it with depth', unit: 'N/m²', formula: 'm * b1^2 / w' },
  ],
  conditions: [],
  validity: crushValidity,
  sources: [campbell],
};

export const collision: readonly Worksheet[] = [
  momentumPlane,
  momentumLine,
  forceDirection,
  crushEnergy,
  crushCoefficients,
];
