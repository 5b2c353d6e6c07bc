import type { GivenQuantity, Worksheet } from './worksheet';

const sayers = 'M. W. Sayers, Vehicle offtracking models, Transp. Res. Record 1052 (1986) 53–62';
const slow = [
  'no slip angles: walking speed to about 10 km/h; at speed a trailer tracks outward',
  'several axles are replaced by one in their middle',
];

const trailerLength: GivenQuantity = {
  symbol: 'L',
  meaning: 'kingpin to axle of the trailer',
  unit: 'm',
  usual: [3, 10],
  usualSource: 'semi-trailers 6–9 m (common practice)',
};

const wheelbase: GivenQuantity = {
  symbol: 'wb',
  meaning: 'wheelbase',
  unit: 'm',
  usual: [2, 7],
  usualSource: 'cars 2.4–3.0 m, tractors 3.4–4.0 m (common practice)',
};

export const offTracking: Worksheet = {
  id: 'off-tracking',
  title: 'Off-tracking of a tractor and trailer in a steady turn',
  inputs: [
    {
      symbol: 'R',
      meaning: 'radius at the middle of the steered axle',
      unit: 'm',
      usual: [5, 200],
    },
    wheelbase,
    {
      symbol: 'k',
      meaning: 'kingpin ahead of the rear axle of the tractor',
      unit: 'm',
      usual: [-0.5, 1.5],
      usualSource: 'common practice',
    },
    trailerLength,
  ],
  results: [
    { symbol: 'Rr', meaning: 'radius at the rear axle', unit: 'm', formula: 'sqrt(R^2 - wb^2)' },
    { symbol: 'Rk', meaning: 'radius at the kingpin', unit: 'm', formula: 'sqrt(Rr^2 + k^2)' },
    {
      symbol: 'Rt',
      meaning: 'radius at the axle of the trailer',
      unit: 'm',
      formula: 'sqrt(Rk^2 - L^2)',
    },
    { symbol: 'ot', meaning: 'off-tracking of the tractor', unit: 'm', formula: 'R - Rr' },
    { symbol: 'o', meaning: 'off-tracking of the trailer', unit: 'm', formula: 'R - Rt' },
    {
      symbol: 'delta',
      meaning: 'steer angle of the tractor',
      unit: 'rad',
      formula: 'atan(wb / Rr)',
    },
    {
      symbol: 'gamma',
      meaning: 'articulation angle',
      unit: 'rad',
      formula: 'atan(L / Rt) + atan(k / Rr)',
    },
  ],
  conditions: [
    { formula: 'R - wb', message: 'The turn is too tight for the tractor.', needed: true },
    {
      formula: 'Rk - L',
      message: 'The turn is too tight for a steady state of the trailer.',
      needed: true,
    },
  ],
  validity: slow,
  sources: ['Sum of squares of the wheelbases (geometry)', sayers],
};

export const widestOffTracking: Worksheet = {
  id: 'widest-off-tracking',
  title: 'Largest off-tracking from the outer front wheel',
  inputs: [
    { symbol: 'tr', meaning: 'turning radius of the outer front wheel', unit: 'm', usual: [5, 50] },
    wheelbase,
    { symbol: 'ht', meaning: 'half the front track', unit: 'm', usual: [0.6, 1.2] },
    { symbol: 'k', meaning: 'offset of the kingpin', unit: 'm', usual: [-0.5, 1.5] },
    trailerLength,
  ],
  results: [
    {
      symbol: 'q',
      meaning: 'radius at the middle of the rear axle',
      unit: 'm',
      formula: 'sqrt(tr^2 - wb^2) - ht',
    },
    {
      symbol: 'o',
      meaning: 'off-tracking',
      unit: 'm',
      formula: 'sqrt(wb^2 + q^2) - sqrt(k^2 + q^2 - L^2)',
    },
  ],
  conditions: [
    { formula: 'tr - wb', message: 'The turn is too tight for the tractor.', needed: true },
    { formula: 'k^2 + q^2 - L^2', message: 'The turn is too tight for the trailer.', needed: true },
  ],
  validity: slow,
  sources: ['Terms of a published design diagram, at second hand', sayers],
};

const articulation: GivenQuantity = {
  symbol: 'psi0',
  meaning: 'articulation angle at the start',
  unit: 'rad',
  usual: [-1.6, 1.6],
  usualSource: 'common practice',
};

export const straightPull: Worksheet = {
  id: 'straight-pull',
  title: 'Articulation of a trailer pulled, or pushed, straight',
  inputs: [
    articulation,
    {
      symbol: 's',
      meaning: 'way of the kingpin; negative in reverse',
      unit: 'm',
      usual: [-20, 100],
    },
    trailerLength,
  ],
  results: [
    {
      symbol: 'psi',
      meaning: 'articulation angle at the end',
      unit: 'rad',
      formula: '2 * atan(tan(psi0 / 2) * exp(-s / L))',
    },
  ],
  conditions: [
    {
      formula: 's',
      message: 'In reverse the angle grows without bound: small errors of the start grow with it.',
      needed: false,
    },
  ],
  validity: slow,
  sources: ['Tractrix (geometry)', sayers],
};

export const circleEntry: Worksheet = {
  id: 'circle-entry',
  title: 'Articulation of a trailer whose kingpin enters a circle',
  inputs: [
    articulation,
    { symbol: 'R', meaning: 'radius of the circle of the kingpin', unit: 'm', usual: [5, 200] },
    { symbol: 'turn', meaning: 'angle turned on the circle', unit: 'rad', usual: [0, 6.3] },
    trailerLength,
  ],
  results: [
    {
      symbol: 'q',
      meaning: 'rate of the approach, 1/m',
      unit: '1',
      formula: 'sqrt(1 / L^2 - 1 / R^2)',
    },
    {
      symbol: 'lo',
      meaning: 'tangent of half the steady angle',
      unit: '1',
      formula: 'R / L - R * q',
    },
    { symbol: 'hi', meaning: 'the other root', unit: '1', formula: 'R / L + R * q' },
    {
      symbol: 'k',
      meaning: 'distance left to the steady state',
      unit: '1',
      formula: '(tan(psi0 / 2) - lo) / (tan(psi0 / 2) - hi) * exp(-q * R * turn)',
    },
    {
      symbol: 'psi',
      meaning: 'articulation angle',
      unit: 'rad',
      formula: '2 * atan((lo - k * hi) / (1 - k))',
    },
  ],
  conditions: [
    {
      formula: 'R - L - 1e-9',
      message: 'On a circle tighter than its own length the trailer reaches no steady state.',
      needed: true,
    },
  ],
  validity: slow,
  sources: ['R·dψ/ds = 1 − (R/L)·sin ψ, solved in tan(ψ/2)', sayers],
};

export const steering: Worksheet = {
  id: 'steering',
  title: 'Steer angles of the two front wheels',
  inputs: [
    wheelbase,
    { symbol: 'w', meaning: 'distance of the steering pivots', unit: 'm', usual: [1.2, 2.2] },
    { symbol: 'R', meaning: 'radius at the middle of the rear axle', unit: 'm', usual: [4, 500] },
  ],
  results: [
    {
      symbol: 'di',
      meaning: 'angle of the inner wheel',
      unit: 'rad',
      formula: 'atan(wb / (R - w / 2))',
    },
    {
      symbol: 'do',
      meaning: 'angle of the outer wheel',
      unit: 'rad',
      formula: 'atan(wb / (R + w / 2))',
    },
    {
      symbol: 'delta',
      meaning: 'angle of a single-track vehicle',
      unit: 'rad',
      formula: 'atan(wb / R)',
    },
  ],
  conditions: [
    {
      formula: 'R - w / 2 - 1e-9',
      message: 'The turn is tighter than the axle is wide.',
      needed: true,
    },
  ],
  validity: slow,
  sources: ['cot δo − cot δi = w/L (geometry)'],
};

export const turning: readonly Worksheet[] = [
  offTracking,
  widestOffTracking,
  straightPull,
  circleEntry,
  steering,
];
