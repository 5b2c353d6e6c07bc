import type { ReleasedSummary } from '#shared/contracts/disclosure';
import type { Figure } from '#shared/contracts/findings';

type SpeedUnit = ReleasedSummary['speedUnit'];

interface Unit {
  readonly name: string;
  /** How many of it one SI unit is. */
  readonly per: number;
}

/** 1 mile is 1609.344 m and 1 hour 3600 s, both exact. */
const speedUnits: Readonly<Record<SpeedUnit, Unit>> = {
  'm/s': { name: 'm/s', per: 1 },
  'km/h': { name: 'km/h', per: 3.6 },
  mph: { name: 'mph', per: 3600 / 1609.344 },
};

/** The unit for people first, the SI unit beside it. */
function unitsOf(figure: Figure, speedUnit: SpeedUnit): Unit[] {
  if (figure.quantity === 'speed') {
    const first = speedUnits[speedUnit];
    return first.name === 'm/s' ? [first] : [first, speedUnits['m/s']];
  }
  if (figure.quantity === 'acceleration') {
    return [
      { name: 'm/s²', per: 1 },
      { name: 'g', per: 1 / 9.80665 },
    ];
  }
  return [
    { name: '°/s', per: 180 / Math.PI },
    { name: 'rad/s', per: 1 },
  ];
}

export interface FigureText {
  readonly unit: string;
  readonly value: string;
  readonly range: string;
}

/** Decimals that are no finer than the first digit of the half range. */
function decimals(halfRange: number): number {
  if (!(halfRange > 0)) return 3;
  return Math.min(9, Math.max(0, -Math.floor(Math.log10(halfRange))));
}

/** A figure with its 95 % range in each unit, never with finer digits than the range supports. */
export function figureTexts(figure: Figure, speedUnit: SpeedUnit): FigureText[] {
  return unitsOf(figure, speedUnit).map(({ name, per }) => {
    const digits = decimals(((figure.high - figure.low) / 2) * per);
    const write = (value: number) => (value * per).toFixed(digits).replace(/^-(?=[0.]*$)/, '');
    return {
      unit: name,
      value: write(figure.value).replace('-', '−'),
      range: `${write(figure.low)} to ${write(figure.high)}`.replaceAll('-', '−'),
    };
  });
}
