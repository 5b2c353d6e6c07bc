import type { GivenQuantity, Worksheet } from './worksheet';

const speed: GivenQuantity = { symbol: 'v', meaning: 'speed', unit: 'm/s', usual: [0, 60] };
const response: GivenQuantity = {
  symbol: 'tr',
  meaning: 'perception–response time',
  unit: 's',
  usual: [0.7, 2.5],
  usualSource:
    'an unexpected hazard about 0.9–1.5 s (at second hand); 2.5 s is a design value (AASHTO), not an estimate of a driver',
};
const deceleration: GivenQuantity = {
  symbol: 'a',
  meaning: 'deceleration',
  unit: 'm/s²',
  usual: [1, 10],
  usualSource: '3.4 m/s² is a design value (AASHTO)',
};
const positive = (symbol: string, message: string) => ({
  formula: `${symbol} - 1e-9`,
  message,
  needed: true,
});
const braking = positive('a', 'The deceleration must be over zero.');
const kinematics = 'Motion with constant acceleration (kinematics)';
const validity = ['constant speed, then constant deceleration'];

export const stopping: Worksheet = {
  id: 'stopping',
  title: 'Distance and time to stop, with perception–response and build-up of braking',
  inputs: [
    speed,
    response,
    {
      symbol: 'tb',
      meaning: 'time in which the braking builds up, linearly',
      unit: 's',
      usual: [0, 0.6],
      usualSource: 'common practice',
    },
    deceleration,
  ],
  results: [
    { symbol: 'dr', meaning: 'way before braking', unit: 'm', formula: 'v * tr' },
    {
      symbol: 'db',
      meaning: 'way while braking',
      unit: 'm',
      formula: 'v * tb - a * tb^2 / 6 + (v - a * tb / 2)^2 / (2 * a)',
    },
    { symbol: 'd', meaning: 'whole way', unit: 'm', formula: 'dr + db' },
    { symbol: 't', meaning: 'whole time', unit: 's', formula: 'tr + tb + (v - a * tb / 2) / a' },
  ],
  conditions: [
    braking,
    {
      formula: 'v - a * tb / 2',
      message: 'The vehicle stops while the braking still builds up: the formula does not hold.',
      needed: true,
    },
  ],
  validity,
  sources: [kinematics],
};

export const speedAtConflict: Worksheet = {
  id: 'speed-at-conflict',
  title: 'Speed left at a point of conflict',
  inputs: [
    speed,
    response,
    deceleration,
    { symbol: 'D', meaning: 'way to the point of conflict', unit: 'm', usual: [0, 300] },
  ],
  results: [
    {
      symbol: 'vc',
      meaning: 'speed at the point of conflict',
      unit: 'm/s',
      formula: 'sqrt(v^2 - 2 * a * (D - v * tr))',
    },
    { symbol: 't', meaning: 'time to it', unit: 's', formula: 'tr + (v - vc) / a' },
  ],
  conditions: [
    braking,
    {
      formula: 'D - v * tr',
      message: 'The point of conflict is reached before any braking: at full speed.',
      needed: true,
    },
    {
      formula: 'v^2 - 2 * a * (D - v * tr)',
      message: 'The vehicle stops before the point of conflict.',
      needed: true,
    },
  ],
  validity,
  sources: [kinematics],
};

export const speedToStop: Worksheet = {
  id: 'speed-to-stop',
  title: 'Greatest speed from which one can stop within a distance',
  inputs: [
    { symbol: 'D', meaning: 'distance', unit: 'm', usual: [1, 300] },
    response,
    deceleration,
  ],
  results: [
    {
      symbol: 'v',
      meaning: 'greatest speed',
      unit: 'm/s',
      formula: 'sqrt((a * tr)^2 + 2 * a * D) - a * tr',
    },
  ],
  conditions: [braking],
  validity,
  sources: [kinematics],
};

export const fromRest: Worksheet = {
  id: 'from-rest',
  title: 'Time and speed after a distance from rest',
  inputs: [
    { symbol: 'D', meaning: 'distance', unit: 'm', usual: [0, 300] },
    {
      symbol: 'a',
      meaning: 'acceleration',
      unit: 'm/s²',
      usual: [0.3, 4],
      usualSource: 'common practice',
    },
  ],
  results: [
    { symbol: 't', meaning: 'time', unit: 's', formula: 'sqrt(2 * D / a)' },
    { symbol: 'v', meaning: 'speed reached', unit: 'm/s', formula: 'sqrt(2 * a * D)' },
  ],
  conditions: [positive('a', 'The acceleration must be over zero.')],
  validity: ['constant acceleration'],
  sources: [kinematics],
};

export const timing: readonly Worksheet[] = [stopping, speedAtConflict, speedToStop, fromRest];
