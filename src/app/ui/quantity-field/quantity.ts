import type { AbstractControl, ValidatorFn } from '@angular/forms';
import { parseQuantity } from '#shared/units/parse-quantity';
import type { Dimension, UnitSymbol } from '#shared/units/units';

/** What a text field for a quantity accepts. */
export interface QuantityRule {
  readonly dimension: Dimension;
  /** Meant when no unit is typed; without it a unit must be typed. */
  readonly unit?: UnitSymbol;
  readonly sign?: 'positive';
  /** May be left empty. */
  readonly optional?: boolean;
}

export type ReadQuantity =
  | { readonly ok: true; readonly value: number | null }
  | { readonly ok: false; readonly message: string };

/** The value of a typed quantity in SI; null where nothing is typed and nothing needs to be. */
export function readQuantity(text: string, rule: QuantityRule): ReadQuantity {
  if (text.trim() === '' && rule.optional) return { ok: true, value: null };
  const parsed = parseQuantity(text, rule.dimension, { unit: rule.unit });
  if (!parsed.ok) return { ok: false, message: parsed.message };
  if (rule.sign === 'positive' && !(parsed.value > 0)) {
    return { ok: false, message: 'This must be more than zero.' };
  }
  return { ok: true, value: parsed.value };
}

export const quantity =
  (rule: QuantityRule): ValidatorFn =>
  (control: AbstractControl) => {
    const read = readQuantity(String(control.value), rule);
    return read.ok ? null : { quantity: read.message };
  };

/**
 * What a text with one comma may mean, as texts without it: a comma is asked about, never guessed.
 * "1,250 m" may be 1.250 m or 1250 m; "12,5 m" can only be 12.5 m.
 */
export function meaningsOfComma(text: string): string[] {
  const parts = /^([^,.]*\d),(\d+)([^\d,.][^,.]*)?$/.exec(text.trim());
  if (!parts) return [];
  const [, before, after, rest = ''] = parts;
  const decimal = `${before}.${after}${rest}`;
  return after.length === 3 && !/^-?0\d*$/.test(before.trim())
    ? [decimal, `${before}${after}${rest}`]
    : [decimal];
}
