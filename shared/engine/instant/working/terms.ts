import type { Factor, Reference, Term, Unit, WorkingEquation, WorkingSymbol } from './working';

/** Digits that are enough to follow the arithmetic; the data behind them are not rounded. */
const digits = 4;

export const numberTex = (value: number): string => {
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size >= 1e5 || size < 1e-3) {
    const [mantissa, exponent] = value.toExponential(digits - 1).split('e');
    return `${mantissa}\\cdot 10^{${Number(exponent)}}`;
  }
  return value.toPrecision(digits);
};

export const quantity = (number: number, unit: Unit, from: Reference | null = null): Factor => ({
  number,
  unit,
  from,
});

export const unknown = (symbol: WorkingSymbol): Factor => ({ symbol });

export const term = (sign: 1 | -1, ...factors: Factor[]): Term => ({ sign, factors });

/** The number that a term multiplies its symbols with. */
export const coefficientOf = (t: Term): number =>
  t.factors.reduce<number>((product, f) => ('number' in f ? product * f.number : product), t.sign);

export const symbolsOf = (t: Term): WorkingSymbol[] =>
  t.factors.flatMap((f) => ('symbol' in f ? [f.symbol] : []));

/** An angle that stands alone is read in degrees. */
const loneTex = (f: Extract<Factor, { readonly number: number }>): string =>
  f.unit === 'rad'
    ? `${numberTex((Math.abs(f.number) * 180) / Math.PI)}^{\\circ}`
    : numberTex(Math.abs(f.number));

const productTex = (factors: readonly Factor[]): string => {
  const seen: { tex: string; count: number; isNumber: boolean }[] = [];
  for (const f of factors) {
    if ('number' in f && f.number === 1 && factors.length > 1) continue;
    const isNumber = 'number' in f;
    const plain = isNumber ? numberTex(f.number) : f.symbol.tex;
    const tex = isNumber && f.number < 0 ? `(${plain})` : plain;
    const before = seen.find((x) => x.tex === tex);
    if (before === undefined) seen.push({ tex, count: 1, isNumber });
    else before.count++;
  }
  return seen
    .map(({ tex, count, isNumber }, i) => {
      const base = count > 1 && isNumber && !tex.startsWith('(') ? `(${tex})` : tex;
      const text = count > 1 ? `${base}^{${count}}` : base;
      if (i === 0) return text;
      return isNumber && seen[i - 1].isNumber ? ` \\cdot ${text}` : `\\,${text}`;
    })
    .join('');
};

/** Terms of a sum; those that are exactly zero are left out, unless nothing is left. */
export const sumTex = (terms: readonly Term[]): string => {
  const seen = terms.filter((t) => coefficientOf(t) !== 0);
  if (seen.length === 0) return '0';
  return seen
    .map((t, i) => {
      const [lone] = t.factors;
      const single = t.factors.length === 1 && 'number' in lone;
      // A single negative number carries its own sign.
      const negative = single ? t.sign * lone.number < 0 : t.sign < 0;
      const tex = single ? loneTex(lone) : productTex(t.factors);
      if (i === 0) return negative ? `-${tex}` : tex;
      return negative ? ` - ${tex}` : ` + ${tex}`;
    })
    .join('');
};

export const scalarEquation = (
  role: 'x' | 'y' | 'scalar',
  left: readonly Term[],
  right: readonly Term[],
): WorkingEquation => ({ role, left, right, tex: `${sumTex(left)} = ${sumTex(right)}` });

/** Left less right as coefficients of unknowns and a constant; null when it is not linear. */
export interface Linear {
  readonly coefficients: Map<string, { symbol: WorkingSymbol; value: number }>;
  readonly constant: number;
}

export const linearOf = (left: readonly Term[], right: readonly Term[]): Linear | null => {
  const coefficients: Linear['coefficients'] = new Map();
  let constant = 0;
  for (const [terms, side] of [
    [left, 1],
    [right, -1],
  ] as const)
    for (const t of terms) {
      const symbols = symbolsOf(t);
      const value = side * coefficientOf(t);
      if (symbols.length > 1) return null;
      if (symbols.length === 0) constant += value;
      else {
        const [symbol] = symbols;
        const before = coefficients.get(symbol.tex)?.value ?? 0;
        coefficients.set(symbol.tex, { symbol, value: before + value });
      }
    }
  return { coefficients, constant };
};
