import { type Dimension, type Unit, findUnit, unitsOf } from './units';

/** The decimal sign that the person is known to use; null: not known, so a comma is never guessed. */
export type DecimalSign = '.' | ',' | null;

export type ParsedQuantity =
  | {
      readonly ok: true;
      /** In SI. */
      readonly value: number;
      /** The unit that was typed or taken for granted; feet for feet and inches. */
      readonly unit: Unit;
    }
  | {
      readonly ok: false;
      readonly code: 'empty' | 'not-a-number' | 'comma' | 'unit-missing' | 'unit-unknown';
      readonly message: string;
    };

export interface ParseOptions {
  /** Symbol of the unit that is meant when none is typed; without it a unit must be typed. */
  readonly unit?: string;
  readonly decimal?: DecimalSign;
}

const number = '[+-]?(?:\\d+\\.?\\d*|\\.\\d+)(?:e[+-]?\\d+)?';
const withUnit = new RegExp(`^(${number})\\s*(.*)$`, 'i');
const fraction = '(\\d+\\.?\\d*|\\.\\d+)?(?:(?:^|\\s+|-)(\\d+)/(\\d+))?';
/** 3'-6", 3' 6 1/2", 3 ft 6 in, 3'6 */
const feetAndInches = new RegExp(
  `^([+-]?)(\\d+)\\s*(?:'|′|ft|feet|foot)\\s*-?\\s*${fraction}\\s*(?:"|″|in|inch|inches)?$`,
  'i',
);

/**
 * Reads a quantity as people write it: `12.5 m/s`, `45 mph`, `3'-6"`, `2.4 deg`, `0.7 g`.
 *
 * A comma is a decimal sign only where the person is known to write it so: 1,250 m is read by one
 * person as a kilometre and by another as a metre and a quarter, and nobody can tell from the text.
 */
export function parseQuantity(
  text: string,
  dimension: Dimension,
  options: ParseOptions = {},
): ParsedQuantity {
  const given = text
    .trim()
    .replaceAll('−', '-')
    .replace(/[\u00a0\u2009\u202f]/g, ' ');
  if (given === '') return failure('empty', 'Type a value.');
  const clean = withDecimalPoint(given, options.decimal ?? null);
  if (clean === null) {
    return failure('comma', 'A comma can mean two things. Write the value with a decimal point.');
  }
  if (dimension === 'length') {
    const feet = readFeetAndInches(clean);
    if (feet !== null) return feet;
  }
  const parts = withUnit.exec(clean);
  const value = Number(parts?.[1]);
  if (parts === null || !Number.isFinite(value)) {
    return failure('not-a-number', `"${text.trim()}" is not a number with a unit.`);
  }
  const named = parts[2]?.trim() ?? '';
  const symbol = named === '' ? (options.unit ?? (dimension === 'ratio' ? '' : null)) : named;
  if (symbol === null) {
    return failure('unit-missing', `Write the unit too: ${choices(dimension)}.`);
  }
  const unit = findUnit(symbol, dimension);
  if (unit === null) {
    return failure('unit-unknown', `"${symbol}" is not a unit here. Use ${choices(dimension)}.`);
  }
  return { ok: true, value: value * unit.factor, unit };
}

function withDecimalPoint(text: string, decimal: DecimalSign): string | null {
  if (!text.includes(',')) return text;
  if (decimal !== ',') return null;
  return text.split(',').length === 2 && !text.includes('.') ? text.replace(',', '.') : null;
}

function readFeetAndInches(text: string): ParsedQuantity | null {
  const parts = feetAndInches.exec(text);
  const feet = findUnit('ft', 'length');
  const inches = findUnit('in', 'length');
  if (parts === null || feet === null || inches === null) return null;
  const [, sign, whole, rest, above, below] = parts;
  if (below !== undefined && Number(below) === 0) return null;
  const more = Number(rest ?? 0) + (above === undefined ? 0 : Number(above) / Number(below));
  if (more >= 12) {
    return failure('not-a-number', 'Inches after feet go up to 12. Write the feet anew.');
  }
  const value = Number(whole) * feet.factor + more * inches.factor;
  return { ok: true, value: sign === '-' ? -value : value, unit: feet };
}

function choices(dimension: Dimension): string {
  const symbols = unitsOf(dimension)
    .map((unit) => unit.symbol)
    .filter((symbol) => symbol !== '');
  return symbols.length > 1
    ? `${symbols.slice(0, -1).join(', ')} or ${symbols.at(-1) ?? ''}`
    : (symbols[0] ?? 'a plain number');
}

function failure(
  code: (ParsedQuantity & { ok: false })['code'],
  message: string,
): ParsedQuantity & { ok: false } {
  return { ok: false, code, message };
}
