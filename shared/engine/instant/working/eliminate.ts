import type { Linear } from './terms';
import { quantity, scalarEquation, term, unknown } from './terms';
import type { WorkingEquation, WorkingSymbol } from './working';

/** How the equations of a step give its unknowns, one line after the other. */
export interface Elimination {
  readonly equations: readonly WorkingEquation[];
  /** By the symbol's tex. */
  readonly values: ReadonlyMap<string, number>;
}

/**
 * Solves linear equations as one does by hand: an equation with one unknown is solved and its
 * value put into the others; when there is none, an unknown is eliminated between two of them.
 * Null when they do not decide all unknowns.
 */
export const eliminate = (
  system: readonly Linear[],
  unknowns: readonly WorkingSymbol[],
): Elimination | null => {
  const lines: WorkingEquation[] = [];
  const values = new Map<string, number>();
  let open = system.map(tidy);
  // Each round settles an unknown or takes one out of an equation.
  for (let round = 0; values.size < unknowns.length; round++) {
    if (round > 4 * (system.length + unknowns.length) ** 2) return null;
    const single = strongest(open.filter((e) => e.coefficients.size === 1));
    if (single !== null) {
      const [{ symbol, value }] = single.coefficients.values();
      const root = -single.constant / value;
      const right = value < 0 ? single.constant : -single.constant;
      lines.push(
        scalarEquation(
          'scalar',
          [term(1, quantity(Math.abs(value), ''), unknown(symbol))],
          [term(1, quantity(right, ''))],
        ),
      );
      values.set(symbol.tex, root);
      open = open.filter((e) => e !== single).map((e) => tidy(substitute(e, symbol.tex, root)));
      continue;
    }
    const pair = choosePair(open);
    if (pair === null) return null;
    const combined = tidy(combine(pair.keep, pair.drop, pair.symbol.tex));
    open = open.map((e) => (e === pair.drop ? combined : e));
  }
  return { equations: lines, values };
};

/** Coefficients that are rounding of others are none. */
const tidy = (e: Linear): Linear => {
  const size = Math.max(0, ...[...e.coefficients.values()].map((c) => Math.abs(c.value)));
  const kept = [...e.coefficients].filter(([, c]) => Math.abs(c.value) > 1e-12 * size);
  return { coefficients: new Map(size > 0 ? kept : []), constant: e.constant };
};

const substitute = (e: Linear, tex: string, value: number): Linear => {
  const found = e.coefficients.get(tex);
  if (found === undefined) return e;
  const rest = new Map(e.coefficients);
  rest.delete(tex);
  return { coefficients: rest, constant: e.constant + found.value * value };
};

/** Of equations in one unknown, the one that divides by the largest share of what it came from. */
const strongest = (singles: readonly Linear[]): Linear | null => {
  let best: Linear | null = null;
  let most = 0;
  for (const e of singles) {
    const [{ value }] = e.coefficients.values();
    if (Math.abs(value) > most * (1 + 1e-9)) {
      most = Math.abs(value);
      best = e;
    }
  }
  return most > 1e-13 ? best : null;
};

/** The two equations with the fewest unknowns that share one, and the one to be eliminated. */
const choosePair = (
  open: readonly Linear[],
): { keep: Linear; drop: Linear; symbol: WorkingSymbol } | null => {
  const ordered = open
    .filter((e) => e.coefficients.size > 0)
    .sort((x, y) => x.coefficients.size - y.coefficients.size);
  for (const keep of ordered)
    for (const drop of ordered) {
      if (drop === keep || drop.coefficients.size < keep.coefficients.size) continue;
      let symbol: WorkingSymbol | null = null;
      let most = 0;
      for (const [tex, c] of keep.coefficients)
        if (drop.coefficients.has(tex) && Math.abs(c.value) > most) {
          most = Math.abs(c.value);
          symbol = c.symbol;
        }
      const covered = [...keep.coefficients.keys()].every((tex) => drop.coefficients.has(tex));
      if (symbol !== null && covered) return { keep, drop, symbol };
    }
  for (const keep of ordered)
    for (const drop of ordered)
      if (keep !== drop)
        for (const [tex, c] of keep.coefficients)
          if (drop.coefficients.has(tex)) return { keep, drop, symbol: c.symbol };
  return null;
};

/** drop − f · keep, without the named unknown. */
const combine = (keep: Linear, drop: Linear, tex: string): Linear => {
  const by = (drop.coefficients.get(tex)?.value ?? 0) / (keep.coefficients.get(tex)?.value ?? 1);
  const coefficients = new Map(drop.coefficients);
  for (const [key, c] of keep.coefficients) {
    const before = coefficients.get(key)?.value ?? 0;
    coefficients.set(key, { symbol: c.symbol, value: before - by * c.value });
  }
  coefficients.delete(tex);
  return { coefficients, constant: drop.constant - by * keep.constant };
};
