const finest = 1e-6;

/**
 * Rounding for the reader: digits never finer than the range. The value itself is never rounded
 * in what is kept or computed.
 *
 * The half-width of the interval keeps one significant digit, two where the first is 1 or 2 (one
 * digit alone would then change it by up to half); value and bounds are shown to the same place.
 * JCGM 100:2008, 7.2.6: at most two digits for an uncertainty, the estimate rounded to agree with it.
 * No step is finer than a millionth of the unit: a joint holds a point still to the computer's
 * rounding, and fifteen noughts would say that somebody had measured it.
 */
export function roundingStep(halfWidth: number): number {
  if (!Number.isFinite(halfWidth) || halfWidth <= 0) {
    throw new RangeError('A rounding step needs a positive half-width');
  }
  // The first two digits decide after rounding: 2.96 is 3.0, 9.97 is 10.
  const [digits = '1', exponent = '0'] = halfWidth.toExponential(1).split('e');
  return Math.max(finest, 10 ** (Number(exponent) - (Number(digits) < 3 ? 1 : 0)));
}

/** A number to a place (a power of ten), with a true minus sign: `showTo(-12.34, 0.1)` is "−12.3". */
export function showTo(value: number, step: number): string {
  if (!Number.isFinite(value)) return '–';
  const places = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const rounded = step > 1 ? Math.round(value / step) * step : value;
  const text = rounded.toFixed(Math.min(places, 15));
  return withMinus(Number(text) === 0 ? text.replace('-', '') : text);
}

/** An exactly stated number to at most so many significant digits, without idle zeros. */
export function showPlain(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return '–';
  return withMinus(String(Number(value.toPrecision(digits))));
}

export const withMinus = (text: string): string => text.replace(/^-/, '−').replace('e-', 'e−');
