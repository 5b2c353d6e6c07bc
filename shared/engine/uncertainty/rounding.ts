export interface Rounded {
  readonly value: string;
  readonly sigma: string;
  /** Places after the decimal point; negative where tens or hundreds are rounded. */
  readonly places: number;
}

const mostPlaces = 12;

/**
 * A value and its standard uncertainty as text, the value never with finer digits than the
 * uncertainty supports: u keeps two significant digits and the value the same places
 * (JCGM 100:2008, 7.2.6). An exact value (σ = 0) keeps twelve significant digits at most. The
 * number itself is never rounded; this is for display.
 *
 * Example: 17.4382 with σ 0.2371 gives 17.44 and 0.24; 17438.2 with σ 237 gives 17440 and 240.
 */
export function roundToUncertainty(value: number, sigma: number): Rounded {
  if (!(sigma > 0) || !Number.isFinite(sigma) || !Number.isFinite(value))
    return {
      value: String(Number(value.toPrecision(mostPlaces))),
      sigma: String(sigma),
      places: 0,
    };
  // toExponential rounds first, so that 0.0996 counts as 0.10
  const exponent = Number(sigma.toExponential(1).split('e')[1]);
  const places = Math.min(mostPlaces, 1 - exponent);
  return { value: fixed(value, places), sigma: fixed(sigma, places), places };
}

function fixed(value: number, places: number): string {
  const unit = 10 ** -places;
  const text = places >= 0 ? value.toFixed(places) : String(Math.round(value / unit) * unit);
  return Number(text) === 0 ? text.replace('-', '') : text;
}
