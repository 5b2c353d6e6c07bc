import type { Mark, MarkEntry, MarkKind } from '#shared/contracts/survey';
import { readQuantity, type QuantityRule } from '../../ui/quantity-field/quantity';
import { correlationOf, shortLength, sigmaOf } from './show-mark';

/** A mark as it stands in the form: every field is the text that is typed. */
export interface MarkTexts {
  readonly label: string;
  readonly kind: MarkKind;
  readonly x: string;
  readonly y: string;
  readonly sigmaX: string;
  /** Empty: as along x. */
  readonly sigmaY: string;
  readonly correlation: string;
  readonly height: string;
  readonly trace: string;
  readonly order: string;
  readonly note: string;
}

export const markFields: readonly { key: keyof MarkTexts; label: string }[] = [
  { key: 'label', label: 'Label' },
  { key: 'kind', label: 'Kind' },
  { key: 'x', label: 'x' },
  { key: 'y', label: 'y' },
  { key: 'sigmaX', label: 'Uncertainty along x' },
  { key: 'sigmaY', label: 'Uncertainty along y' },
  { key: 'correlation', label: 'Correlation of x and y' },
  { key: 'height', label: 'Height' },
  { key: 'trace', label: 'Trace' },
  { key: 'order', label: 'Place in the trace' },
  { key: 'note', label: 'Note' },
];

export const lengthRule: QuantityRule = { dimension: 'length', unit: 'm' };
export const heightRule: QuantityRule = { ...lengthRule, optional: true };
/** No unit is meant here: "20" without one could be millimetres or metres. */
export const sigmaRule: QuantityRule = { dimension: 'length', sign: 'positive' };
export const otherSigmaRule: QuantityRule = { ...sigmaRule, optional: true };

export const emptyTexts: MarkTexts = {
  label: '',
  kind: 'tyre mark',
  x: '',
  y: '',
  sigmaX: '',
  sigmaY: '',
  correlation: '',
  height: '',
  trace: '',
  order: '',
  note: '',
};

export function textsOf(mark: Mark): MarkTexts {
  const [sx, sy] = sigmaOf(mark).map(exactly);
  const correlation = correlationOf(mark);
  return {
    label: mark.label,
    kind: mark.kind,
    x: `${mark.at[0]} m`,
    y: `${mark.at[1]} m`,
    sigmaX: sx,
    sigmaY: sx === sy ? '' : sy,
    correlation: correlation === 0 ? '' : String(correlation),
    height: mark.height === null ? '' : `${mark.height} m`,
    trace: mark.trace ?? '',
    order: mark.order === null ? '' : String(mark.order),
    note: mark.note,
  };
}

/** The root of a variance differs in its last digit from what was typed; twelve digits are the same. */
function exactly(sigma: number): string {
  const short = shortLength(sigma);
  const read = readQuantity(short, sigmaRule);
  return read.ok && Math.abs((read.value ?? 0) - sigma) < 1e-12 * sigma
    ? short
    : `${Number(sigma.toPrecision(12))} m`;
}

/** What is sent. The texts must be valid: the form's validators see to that. */
export function entryOf(texts: MarkTexts): MarkEntry {
  const length = (text: string): number => {
    const read = readQuantity(text, lengthRule);
    return read.ok && read.value !== null ? read.value : Number.NaN;
  };
  return {
    label: texts.label.trim(),
    kind: texts.kind,
    at: [length(texts.x), length(texts.y)],
    sigma: [length(texts.sigmaX), length(texts.sigmaY.trim() || texts.sigmaX)],
    correlation: texts.correlation.trim() === '' ? 0 : Number(texts.correlation),
    height: texts.height.trim() === '' ? null : length(texts.height),
    trace: texts.trace.trim() || null,
    order: texts.order.trim() === '' ? null : Number(texts.order),
    note: texts.note,
    raw: wordsOf(texts),
  };
}

/** The measured quantities word for word. */
function wordsOf({ x, y, sigmaX, sigmaY, correlation, height }: MarkTexts): string {
  const words = [
    ['x', x],
    ['y', y],
    ['uncertainty x', sigmaX],
    ['uncertainty y', sigmaY],
    ['correlation', correlation],
    ['height', height],
  ];
  return words
    .filter(([, text]) => text.trim() !== '')
    .map(([name, text]) => `${name}: ${text.trim()}`)
    .join('; ')
    .slice(0, 400);
}

export const sameField = (key: keyof MarkTexts, a: MarkTexts, b: MarkTexts): boolean =>
  a[key].trim() === b[key].trim();

export const changedFields = (base: MarkTexts, mine: MarkTexts): (keyof MarkTexts)[] =>
  markFields.map(({ key }) => key).filter((key) => !sameField(key, base, mine));
