/** Steps that people divide scales by: 1, 2 or 5 times a power of ten. */
export function stepAtLeast(value: number): number {
  const power = powerBelow(value);
  const digits = value / power;
  const step = digits <= 1 ? 1 : digits <= 2 ? 2 : digits <= 5 ? 5 : 10;
  return step * power;
}

export function stepAtMost(value: number): number {
  const power = powerBelow(value);
  const digits = value / power;
  return (digits >= 5 ? 5 : digits >= 2 ? 2 : 1) * power;
}

/** Read from the digits: the logarithm of 1000 is a little less than 3 in doubles. */
const powerBelow = (value: number): number => Number(`1e${value.toExponential().split('e')[1]}`);

const feetPerMetre = 1 / 0.3048;

export interface ScaleBar {
  readonly pixels: number;
  readonly text: string;
  readonly middle: string;
}

/** The longest round bar of at most `most` pixels; `resolution` is in metres per pixel. */
export function scaleBar(resolution: number, unit: 'm' | 'ft', most: number): ScaleBar {
  const perMetre = unit === 'm' ? 1 : feetPerMetre;
  const length = stepAtMost(resolution * most * perMetre);
  return {
    pixels: length / perMetre / resolution,
    text: unit === 'm' ? metres(length) : `${plain(length)} ft`,
    middle: plain(unit === 'm' && length < 1 ? (length / 2) * 1000 : length / 2),
  };
}

/** Lines of the grid stand at least this many pixels apart. */
const closestLines = 36;

export const gridStep = (resolution: number): number => stepAtLeast(resolution * closestLines);

/** A round length: millimetres below a metre. */
export function metres(length: number): string {
  return length < 1 ? `${plain(length * 1000)} mm` : `${plain(length)} m`;
}

const plain = (value: number): string => String(Number(value.toPrecision(6)));

/** Pixels that the longest vector of its kind takes at most. */
const longestVector = 96;

export interface VectorScale {
  readonly pixelsPerUnit: number;
  /** A round magnitude and how long it is drawn: the key beside the plan. */
  readonly sample: number;
  readonly samplePixels: number;
}

/** A stepwise scale: it does not change with every small change of the vectors. */
export function vectorScale(largest: number): VectorScale | null {
  if (!(largest > 0) || !Number.isFinite(largest)) return null;
  const full = stepAtLeast(largest);
  const pixelsPerUnit = longestVector / full;
  const sample = stepAtMost(full / 2);
  return { pixelsPerUnit, sample, samplePixels: sample * pixelsPerUnit };
}
