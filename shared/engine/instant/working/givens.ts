import type { ModelKnown } from '../model';
import type { Sheet } from './sheet';
import { quantity, scalarEquation, term, unknown } from './terms';
import type { Reference, WorkingEquation, WorkingQuantity, WorkingSymbol } from './working';

/** The step that states a known as it was given, and the step that says how it was adjusted. */
export const writeKnownSteps = (sheet: Sheet, known: ModelKnown, given: Float64Array): void => {
  const uses: Reference[] = [{ kind: 'known', id: known.id }];
  const values = known.parts.map((p) => given[p.at]);
  const symbols = known.parts.map((_, i) => symbolOf(sheet, known, i));
  const sigmas = known.parts.map((p) => sigmaOf(sheet, p.at));
  sheet.add({
    kind: 'known',
    text: textOf(sheet, known),
    equations: symbols.map((s, i) => equation(s, values[i], uses[0])),
    results: symbols.map((s, i) => sheet.result(s, values[i], sigmas[i])),
    uses,
  });
  const adjusted = known.parts.map((p) => sheet.state.g[p.at]);
  if (adjusted.every((v, i) => Math.abs(v - values[i]) <= 1e-12 * Math.max(1, Math.abs(v)))) return;
  sheet.add({
    kind: 'adjusted',
    text: 'There are more knowns than the motion needs: the least-squares adjustment moves this one to the value used below.',
    equations: symbols.map((s, i) => equation(s, adjusted[i], uses[0])),
    results: symbols.map((s, i): WorkingQuantity => sheet.result(s, adjusted[i])),
    uses,
  });
};

const equation = (symbol: WorkingSymbol, value: number, from: Reference): WorkingEquation =>
  scalarEquation(
    'scalar',
    [term(1, unknown(symbol))],
    [term(1, quantity(value, symbol.unit, from))],
  );

const sigmaOf = (sheet: Sheet, at: number): number | null => {
  const amounts = sheet.model.noises.flatMap((n) =>
    n.entries.flatMap((e) => (e.at === at ? [e.amount] : [])),
  );
  return amounts.length === 0 ? null : Math.hypot(...amounts);
};

const symbolOf = (sheet: Sheet, known: ModelKnown, part: number): WorkingSymbol => {
  const { notation, level } = sheet;
  switch (known.kind) {
    case 'angular':
      return notation.turn(level, known.body);
    case 'slide':
      return alongJoint(sheet, known.joint.id);
    case 'components':
      return notation.component(level, known.a, part === 0 ? 'x' : 'y');
    case 'curvature':
      return {
        tex: `\\kappa_{${notation.pointTex(known.a)}}`,
        text: `curvature of the mark of ${notation.pointName(known.a)}`,
        unit: '1/m',
        of: notation.pointReference(known.a),
      };
    case 'polar':
      return known.parts[part].part === 'magnitude'
        ? notation.magnitude(level, known.a)
        : notation.direction(level, known.a);
  }
};

export const alongJoint = (sheet: Sheet, id: string): WorkingSymbol =>
  sheet.notation.along(sheet.level, { kind: 'joint', id }, `along ${id}`);

const textOf = (sheet: Sheet, known: ModelKnown): string => {
  const { notation, level } = sheet;
  const quantityName = level === 'velocity' ? 'velocity' : 'acceleration';
  switch (known.kind) {
    case 'angular':
      return `The angular ${quantityName} of the ${notation.bodyName(known.body)} is known.`;
    case 'slide':
      return `The ${level === 'velocity' ? 'speed' : 'change of speed'} along ${known.joint.id} is known.`;
    case 'curvature':
      return `The mark of ${notation.pointName(known.a)} has a known curvature.`;
    case 'components':
      return `The ${quantityName} of ${notation.pointName(known.a)} is known in magnitude and direction.`;
    case 'polar': {
      const of = `the ${quantityName} of ${notation.pointName(known.a)}`;
      if (known.directionAt < 0) return `Only the magnitude of ${of} is known.`;
      const direction = known.line ? 'the line' : 'the direction';
      return known.magnitudeAt < 0
        ? `Only ${direction} of ${of} is known.`
        : `The magnitude and ${direction} of ${of} are known.`;
    }
  }
};
