import { roundingStep, showPlain, showTo } from './rounding';
import { type UnitSymbol, fromSi } from './units';

/** A value with the interval that covers it, in SI. */
export interface Ranged {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/** The texts of a figure in one unit. */
export interface ShownFigure {
  readonly value: string;
  readonly low: string;
  readonly high: string;
  /** Half the interval, as it stands after ±. */
  readonly half: string;
  readonly unit: UnitSymbol;
}

/** A figure in a unit, its digits never finer than its range. */
export function showRanged(figure: Ranged, unit: UnitSymbol): ShownFigure {
  const value = fromSi(figure.value, unit);
  const low = fromSi(figure.low, unit);
  const high = fromSi(figure.high, unit);
  const half = Math.abs(high - low) / 2;
  if (!(half > 0) || !Number.isFinite(half)) {
    return {
      value: showPlain(value),
      low: showPlain(low),
      high: showPlain(high),
      half: half === 0 ? '0' : '–',
      unit,
    };
  }
  const step = roundingStep(half);
  return {
    value: showTo(value, step),
    low: showTo(low, step),
    high: showTo(high, step),
    half: showTo(half, step),
    unit,
  };
}

/** A value and its standard uncertainty (SI), as "16.4 ± 0.5 m/s"; ± stands for k = 1. */
export function showUncertain(value: number, sigma: number, unit: UnitSymbol): string {
  const shown = fromSi(value, unit);
  if (!(sigma > 0)) return joined(showPlain(shown), unit);
  const spread = fromSi(sigma, unit);
  const step = roundingStep(spread);
  return joined(`${showTo(shown, step)} ± ${showTo(spread, step)}`, unit);
}

/** A value (SI) without a range: lengths on a plan, times. Never for a published figure. */
export function showValue(value: number, unit: UnitSymbol, digits = 4): string {
  return joined(showPlain(fromSi(value, unit), digits), unit);
}

/** Degrees and per cent stand close to their number, other units after a space. */
function joined(text: string, unit: UnitSymbol): string {
  if (unit === '') return text;
  return unit.startsWith('°') ? `${text}${unit}` : `${text} ${unit}`;
}
