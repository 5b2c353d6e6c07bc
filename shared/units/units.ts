/**
 * Units that people type and read, with the factor to SI.
 *
 * Factors are exact where their definition is: the international foot is 0.3048 m, the pound
 * 0.453 592 37 kg (international agreement of 1959), standard gravity 9.806 65 m/s² (3rd CGPM,
 * 1901); listed in NIST Special Publication 811 (2008), appendix B. The rest follows by arithmetic.
 */
export const dimensions = [
  'length',
  'speed',
  'acceleration',
  'angle',
  'angular velocity',
  'angular acceleration',
  'time',
  'mass',
  'ratio',
] as const;
export type Dimension = (typeof dimensions)[number];

export interface Unit {
  /** As it is shown. */
  readonly symbol: string;
  readonly dimension: Dimension;
  /** Value in SI = value in this unit × factor. */
  readonly factor: number;
  /** What may be typed besides the symbol; compared without regard to case. */
  readonly names: readonly string[];
}

const foot = 0.3048;
const inch = foot / 12;
const mile = 5280 * foot;
const degree = Math.PI / 180;

/** Standard acceleration of free fall, m/s²; exact by definition. */
export const standardGravity = 9.80665;

export const units = [
  { symbol: 'm', dimension: 'length', factor: 1, names: ['metre', 'metres', 'meter', 'meters'] },
  { symbol: 'cm', dimension: 'length', factor: 0.01, names: [] },
  { symbol: 'mm', dimension: 'length', factor: 0.001, names: [] },
  { symbol: 'km', dimension: 'length', factor: 1000, names: [] },
  { symbol: 'ft', dimension: 'length', factor: foot, names: ["'", '′', 'feet', 'foot'] },
  { symbol: 'in', dimension: 'length', factor: inch, names: ['"', '″', 'inch', 'inches'] },
  { symbol: 'm/s', dimension: 'speed', factor: 1, names: ['mps'] },
  { symbol: 'km/h', dimension: 'speed', factor: 1 / 3.6, names: ['kmh', 'kph', 'km/hr'] },
  { symbol: 'mph', dimension: 'speed', factor: mile / 3600, names: ['mi/h'] },
  { symbol: 'ft/s', dimension: 'speed', factor: foot, names: ['fps'] },
  { symbol: 'm/s²', dimension: 'acceleration', factor: 1, names: ['m/s2', 'm/s^2'] },
  { symbol: 'g', dimension: 'acceleration', factor: standardGravity, names: ['gn'] },
  { symbol: 'ft/s²', dimension: 'acceleration', factor: foot, names: ['ft/s2', 'ft/s^2'] },
  { symbol: 'rad', dimension: 'angle', factor: 1, names: [] },
  { symbol: '°', dimension: 'angle', factor: degree, names: ['deg', 'degree', 'degrees'] },
  { symbol: 'rad/s', dimension: 'angular velocity', factor: 1, names: [] },
  { symbol: '°/s', dimension: 'angular velocity', factor: degree, names: ['deg/s'] },
  {
    symbol: 'r/min',
    dimension: 'angular velocity',
    factor: (2 * Math.PI) / 60,
    names: ['rpm', 'rev/min'],
  },
  { symbol: 'rad/s²', dimension: 'angular acceleration', factor: 1, names: ['rad/s2', 'rad/s^2'] },
  {
    symbol: '°/s²',
    dimension: 'angular acceleration',
    factor: degree,
    names: ['deg/s2', 'deg/s^2'],
  },
  { symbol: 's', dimension: 'time', factor: 1, names: ['sec'] },
  { symbol: 'ms', dimension: 'time', factor: 0.001, names: [] },
  { symbol: 'min', dimension: 'time', factor: 60, names: [] },
  { symbol: 'kg', dimension: 'mass', factor: 1, names: [] },
  { symbol: 't', dimension: 'mass', factor: 1000, names: [] },
  { symbol: 'lb', dimension: 'mass', factor: 0.45359237, names: ['lbs'] },
  { symbol: '', dimension: 'ratio', factor: 1, names: [] },
  { symbol: '%', dimension: 'ratio', factor: 0.01, names: ['percent'] },
] as const satisfies readonly Unit[];

export type UnitSymbol = (typeof units)[number]['symbol'];

/** The unit of a dimension that a text names, or null. */
export function findUnit(text: string, dimension: Dimension): Unit | null {
  const wanted = text.trim().toLowerCase();
  return (
    unitsOf(dimension).find(
      (unit) => unit.symbol.toLowerCase() === wanted || unit.names.includes(wanted),
    ) ?? null
  );
}

export function unitsOf(dimension: Dimension): readonly Unit[] {
  return (units as readonly Unit[]).filter((unit) => unit.dimension === dimension);
}

/** The unit with this symbol. @throws RangeError when there is none */
export function unit(symbol: UnitSymbol): Unit {
  const found = (units as readonly Unit[]).find((one) => one.symbol === symbol);
  if (found === undefined) throw new RangeError(`There is no unit "${symbol}"`);
  return found;
}

/** A value in a unit, in SI. */
export const toSi = (value: number, symbol: UnitSymbol): number => value * unit(symbol).factor;

/** A value in SI, in a unit. */
export const fromSi = (value: number, symbol: UnitSymbol): number => value / unit(symbol).factor;
