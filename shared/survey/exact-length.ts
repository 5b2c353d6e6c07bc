import type { LengthUnit, SurveyMapping } from '#shared/contracts/survey';

/**
 * One unit in metres as `factor` × 10^`exponent`, exact by definition: the foot is the international
 * foot of 0.3048 m (agreement of 1959; NIST Special Publication 811 (2008), appendix B).
 */
const inMetres: Record<LengthUnit, { factor: bigint; exponent: number }> = {
  m: { factor: 1n, exponent: 0 },
  cm: { factor: 1n, exponent: -2 },
  mm: { factor: 1n, exponent: -3 },
  ft: { factor: 3048n, exponent: -4 },
  in: { factor: 254n, exponent: -4 },
};

export type ReadLength =
  { readonly ok: true; readonly metres: number } | { readonly ok: false; readonly message: string };

const plain = /^([+-]?)(\d*)(?:\.(\d*))?(?:e([+-]?\d{1,3}))?$/i;

/**
 * The length that a cell of a survey file states, in metres. The written decimal digits are
 * converted as whole numbers and rounded once, to the nearest double: nothing is lost to a
 * multiplication with 0.001 or 0.3048, neither of which a double holds exactly.
 *
 * A number with the other decimal sign, or with separators of thousands, is refused, not guessed.
 */
export function readLength(
  cell: string,
  unit: LengthUnit,
  decimal: SurveyMapping['decimal'],
): ReadLength {
  const text = cell.trim().replace(/^[−–]/, '-');
  const other = decimal === '.' ? ',' : '.';
  if (text.includes(other)) {
    const [here, there] = decimal === '.' ? ['point', 'comma'] : ['comma', 'point'];
    return fault(
      `"${shortened(text)}" has a ${there}, but the decimal sign of this file is the ${here}`,
    );
  }
  const parts = plain.exec(decimal === ',' ? text.replace(',', '.') : text);
  const digits = `${parts?.[2] ?? ''}${parts?.[3] ?? ''}`;
  if (!parts || digits === '') return fault(`"${shortened(text)}" is not a number`);
  const { factor, exponent } = inMetres[unit];
  const places = exponent + Number(parts[4] ?? 0) - (parts[3]?.length ?? 0);
  const metres = Number(`${parts[1]}${BigInt(digits) * factor}e${places}`);
  return Number.isFinite(metres)
    ? { ok: true, metres }
    : fault(`"${shortened(text)}" is too large`);
}

const shortened = (text: string): string => (text.length > 40 ? `${text.slice(0, 40)}…` : text);

const fault = (message: string): ReadLength => ({ ok: false, message });
