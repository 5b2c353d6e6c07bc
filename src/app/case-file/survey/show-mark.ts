import type { Mark } from '#shared/contracts/survey';
import { showTo, withMinus } from '#shared/units/rounding';
import { showUncertain } from '#shared/units/show-quantity';

/** A coordinate in metres to the millimetre, as surveys give it. */
export const coordinate = (value: number): string => showTo(value, 0.001);

/** Standard uncertainties along x and y, m. */
export const sigmaOf = ({ covariance: [[xx], [, yy]] }: Mark): [number, number] => [
  Math.sqrt(xx),
  Math.sqrt(yy),
];

export function correlationOf(mark: Mark): number {
  const [sx, sy] = sigmaOf(mark);
  // The variances were rounded when they were squared; an exact 0.5 is not to come back as 0.49999….
  return Number((mark.covariance[0][1] / (sx * sy)).toPrecision(12));
}

/** A length with few digits: millimetres below a metre. */
export function shortLength(value: number): string {
  const [shown, unit] = Math.abs(value) < 1 ? [value * 1000, 'mm'] : [value, 'm'];
  return `${withMinus(String(Number(shown.toPrecision(3))))} ${unit}`;
}

export const heightOf = ({ height }: Mark): string =>
  height === null ? '–' : `${coordinate(height)} m`;

export const placeInTrace = ({ trace, order }: Pick<Mark, 'trace' | 'order'>): string =>
  trace === null ? '' : order === null ? trace : `${trace}.${order}`;

/** Position along one axis with its standard uncertainty. */
export const withSigma = (value: number, sigma: number): string => showUncertain(value, sigma, 'm');

/** "1 row", "2 rows". */
export const counted = (number: number, what: string): string =>
  number === 1 ? `1 ${what}` : `${number} ${what}s`;

export function sourceOf({ source }: Mark): string {
  return source.kind === 'entry'
    ? `entered by ${source.by}`
    : `exhibit ${source.exhibitNumber}, ${source.fileName}, row ${source.row}`;
}
