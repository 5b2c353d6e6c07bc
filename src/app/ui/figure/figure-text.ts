import type { Figure } from '#shared/contracts/findings';
import { type ShownFigure, showRanged } from '#shared/units/show-quantity';
import type { UnitSymbol } from '#shared/units/units';

export type SpeedUnit = 'km/h' | 'mph' | 'm/s';

/** A figure in the unit that its reader is used to, and again in the other unit. */
export interface FigureText {
  readonly first: ShownFigure;
  /** The same in SI, or in the customary unit; null when there is no second unit. */
  readonly second: ShownFigure | null;
}

const secondUnits = {
  acceleration: ['m/s²', 'g'],
  'angular-velocity': ['°/s', 'rad/s'],
} as const satisfies Record<string, readonly [UnitSymbol, UnitSymbol]>;

export function figureText(
  figure: Pick<Figure, 'quantity' | 'value' | 'low' | 'high'>,
  speedUnit: SpeedUnit,
): FigureText {
  const [first, second] = unitsOf(figure.quantity, speedUnit);
  return {
    first: showRanged(figure, first),
    second: second === null ? null : showRanged(figure, second),
  };
}

function unitsOf(
  quantity: Figure['quantity'],
  speedUnit: SpeedUnit,
): readonly [UnitSymbol, UnitSymbol | null] {
  if (quantity === 'speed') return [speedUnit, speedUnit === 'm/s' ? null : 'm/s'];
  return secondUnits[quantity];
}

/** "67 to 75": a dash between numbers could be read as a minus sign. */
export const rangeText = (shown: ShownFigure): string => `${shown.low} to ${shown.high}`;

export const valueText = (shown: ShownFigure): string =>
  shown.unit.startsWith('°') ? `${shown.value}${shown.unit}` : `${shown.value} ${shown.unit}`;
