import type { Sheet } from './sheet';
import { linearOf, quantity, scalarEquation, term, unknown } from './terms';
import type { Reference, WorkingEquation, WorkingSymbol } from './working';

/**
 * A vector of known magnitude and unknown direction beside one other unknown w: the squares of the
 * x and y equations add to a w² + b w + c = 0, whose root of this branch is taken. False when the
 * equations are not of that form.
 */
export const quadraticStep = (
  sheet: Sheet,
  equations: readonly WorkingEquation[],
  unknowns: readonly WorkingSymbol[],
  uses: readonly Reference[],
): boolean => {
  const others = unknowns.filter((s) => !/^\\(cos|sin)/.test(s.tex));
  if (equations.length !== 2 || others.length !== 1 || unknowns.length !== 3) return false;
  const [w] = others;
  let [a, b, c] = [0, 0, 0];
  for (const e of equations) {
    if (e.role === 'vector') return false;
    const linear = linearOf(e.left, e.right);
    if (linear === null) return false;
    const z = linear.coefficients.get(w.tex)?.value ?? 0;
    const angles = [...linear.coefficients.values()].filter((x) => x.symbol.tex !== w.tex);
    if (angles.length !== 1) return false;
    a += z * z;
    b += 2 * z * linear.constant;
    c += linear.constant ** 2 - angles[0].value ** 2 / 2;
  }
  const root = Math.sqrt(Math.max(0, b * b - 4 * a * c));
  const truth = sheet.truthOf(w);
  const roots = [(-b - root) / (2 * a), (-b + root) / (2 * a)];
  const value = roots.reduce((x, y) => (Math.abs(y - truth) < Math.abs(x - truth) ? y : x));
  unknowns.forEach((s) => sheet.settle(s, s === w ? value : sheet.truthOf(s)));
  sheet.add({
    kind: 'solve',
    text: 'The squares of both equations are added, which leaves a quadratic equation; each of its roots is a branch.',
    equations: [
      scalarEquation(
        'scalar',
        [
          term(1, quantity(a, ''), unknown(w), unknown(w)),
          term(b < 0 ? -1 : 1, quantity(Math.abs(b), ''), unknown(w)),
          term(c < 0 ? -1 : 1, quantity(Math.abs(c), '')),
        ],
        [],
      ),
    ],
    scalarEquations: 1,
    unknowns: [w],
    results: [sheet.result(w, value)],
    uses,
  });
  return true;
};
