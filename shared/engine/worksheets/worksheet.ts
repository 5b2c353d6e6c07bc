/** A quantity of a worksheet. SI units: m, m/s, m/s², s, kg, rad, J, N/m, N/m²; 1 for a number. */
export interface Quantity {
  readonly symbol: string;
  readonly meaning: string;
  readonly unit:
    'm' | 'm/s' | 'm/s²' | 's' | 'kg' | 'rad' | 'rad/s' | 'rad/s²' | 'J' | 'N/m' | 'N/m²' | '1';
}

export interface GivenQuantity extends Quantity {
  /** What is usual in practice; a value outside it is warned of, not refused. */
  readonly usual?: readonly [low: number, high: number];
  /** Where the usual range is from. */
  readonly usualSource?: string;
}

export interface Result extends Quantity {
  /** Of the inputs, of earlier results and of g; `sum(…)` runs over the rows of the table. */
  readonly formula: string;
}

export interface Condition {
  /** The formula's value must not be below 0. */
  readonly formula: string;
  /** Said when it is. */
  readonly message: string;
  /** Without it there is no answer at all, not even a doubtful one. */
  readonly needed: boolean;
}

/** A closed formula of the trade, as data. */
export interface Worksheet {
  readonly id: string;
  readonly title: string;
  readonly inputs: readonly GivenQuantity[];
  /** Columns of a table with as many rows as there are, such as surfaces in turn. */
  readonly table?: { readonly title: string; readonly columns: readonly GivenQuantity[] };
  readonly results: readonly Result[];
  readonly conditions: readonly Condition[];
  /** Where the method holds, in words. */
  readonly validity: readonly string[];
  readonly sources: readonly string[];
}

/** Conventional acceleration of free fall, m/s² (ISO 80000-3; exact by definition). */
export const standardGravity = 9.80665;
