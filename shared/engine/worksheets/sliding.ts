import type { GivenQuantity, Worksheet } from './worksheet';

const workEnergy =
  'Work and energy; e.g. R. M. Brach and R. M. Brach, Vehicle Accident Analysis and Reconstruction Methods, SAE (from memory)';

export const dragFactor: GivenQuantity = {
  symbol: 'f',
  meaning: 'drag factor: deceleration over g',
  unit: '1',
  usual: [0.1, 1],
  usualSource:
    'dry asphalt about 0.55–0.80, wet 0.50, gravel 0.35, snow 0.20–0.25, ice 0.10–0.15 (averages after R. K. Noon, Engineering Analysis of Vehicular Accidents, CRC 1994, at second hand)',
};

const friction: GivenQuantity = {
  ...dragFactor,
  symbol: 'mu',
  meaning: 'friction coefficient of tyre on road',
};

const distance: GivenQuantity = {
  symbol: 'd',
  meaning: 'length of the slide, along the surface',
  unit: 'm',
  usual: [1, 150],
  usualSource: 'common practice',
};

export const slideToStop: Worksheet = {
  id: 'slide-to-stop',
  title: 'Speed from a slide to rest',
  inputs: [dragFactor, distance],
  results: [
    { symbol: 'v', meaning: 'speed at the start', unit: 'm/s', formula: 'sqrt(2 * g * f * d)' },
    { symbol: 't', meaning: 'time to rest', unit: 's', formula: 'v / (f * g)' },
  ],
  conditions: [
    { formula: 'f * d', message: 'Drag factor and length must not be negative.', needed: true },
  ],
  validity: [
    'all wheels slide, and the drag factor holds over the whole length',
    'no aerodynamic or engine drag',
    'marks that begin late make it a lower bound',
  ],
  sources: [workEnergy],
};

export const surfaces: Worksheet = {
  id: 'surfaces',
  title: 'Speed from slides over several surfaces, to a known end speed',
  inputs: [
    { symbol: 've', meaning: 'speed at the end of the last surface', unit: 'm/s', usual: [0, 60] },
  ],
  table: { title: 'Surfaces in turn', columns: [dragFactor, distance] },
  results: [
    {
      symbol: 'v',
      meaning: 'speed at the start of the first surface',
      unit: 'm/s',
      formula: 'sqrt(ve^2 + 2 * g * sum(f * d))',
    },
  ],
  conditions: [],
  validity: [
    'a constant drag factor on each surface',
    'the order of the surfaces does not change the speed at the start, only that in between',
  ],
  sources: [workEnergy],
};

export const combinedSpeed: Worksheet = {
  id: 'combined-speed',
  title: 'Speed before two losses in turn',
  inputs: [
    { symbol: 'v1', meaning: 'speed equivalent of the first loss', unit: 'm/s' },
    { symbol: 'v2', meaning: 'speed equivalent of the second loss', unit: 'm/s' },
  ],
  results: [
    { symbol: 'v', meaning: 'speed before both', unit: 'm/s', formula: 'sqrt(v1^2 + v2^2)' },
  ],
  conditions: [],
  validity: ['energies add, so speeds combine as squares, never as a sum'],
  sources: [workEnergy],
};

export const grade: Worksheet = {
  id: 'grade',
  title: 'Slide on a grade, braked in part',
  inputs: [
    friction,
    {
      symbol: 'n',
      meaning: 'braking efficiency: 1 when all wheels slide',
      unit: '1',
      usual: [0, 1],
      usualSource: 'by definition',
    },
    {
      symbol: 'G',
      meaning: 'grade: tangent of the slope, positive uphill',
      unit: '1',
      usual: [-0.15, 0.15],
      usualSource: 'common practice',
    },
    distance,
  ],
  results: [
    {
      symbol: 'f',
      meaning: 'drag factor on the grade',
      unit: '1',
      formula: '(n * mu + G) / sqrt(1 + G^2)',
    },
    { symbol: 'fa', meaning: 'the same, approximately: n·µ + G', unit: '1', formula: 'n * mu + G' },
    { symbol: 'v', meaning: 'speed at the start', unit: 'm/s', formula: 'sqrt(2 * g * f * d)' },
  ],
  conditions: [
    {
      formula: 'n * mu + G',
      message: 'On this grade the vehicle would not stop: the drag factor is negative.',
      needed: true,
    },
  ],
  validity: ['the length is measured along the slope', 'a constant drag factor'],
  sources: ['Statics on an incline', workEnergy],
};

export const sliding: readonly Worksheet[] = [slideToStop, surfaces, combinedSpeed, grade];
