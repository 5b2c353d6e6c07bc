import { coverage95 } from '#shared/engine/documents/motion-quantities';
import type { Known } from '#shared/engine/documents/motion-problem';
import type {
  Unit,
  Working,
  WorkingKind,
  WorkingQuantity,
  WorkingStep,
} from '#shared/engine/instant/working/working';
import { showPlain } from '#shared/units/rounding';
import { showRanged } from '#shared/units/show-quantity';

export interface ShownStep {
  readonly number: number;
  readonly level: WorkingStep['level'];
  readonly kind: WorkingKind;
  /** Something that was given: its value says all, in one line. */
  readonly given: boolean;
  /** "known, direction only", "step", "result". */
  readonly label: string;
  readonly text: string;
  /** Ids of the knowns and joints that the step's numbers come from. */
  readonly from: readonly string[];
  readonly equations: readonly { readonly axis: string; readonly tex: string }[];
  /** "2 equations · 2 unknowns here:", or empty. */
  readonly count: string;
  readonly unknowns: WorkingStep['unknowns'];
  readonly results: readonly ShownResult[];
}

export interface ShownResult {
  readonly tex: string;
  readonly says: string;
  readonly value: string;
  /** "[1.74, 2.10]", or empty where no uncertainty is asked. */
  readonly interval: string;
}

/** The steps of a derivation as the sheet writes them; they are numbered through. */
export function stepsOf(
  working: Working,
  knowns: readonly Known[],
  shorten: (tex: string) => string = (tex) => tex,
): ShownStep[] {
  const byId = new Map(knowns.map((known) => [known.id, known]));
  return working.steps.map((step, index): ShownStep => {
    const from = step.uses.flatMap((use) =>
      use.kind === 'known' || use.kind === 'joint' ? [use.id] : [],
    );
    const given = step.kind === 'known' || step.kind === 'adjusted';
    return {
      number: index + 1,
      given,
      level: step.level,
      kind: step.kind,
      label: labelOf(step.kind, from.length === 1 ? byId.get(from[0]) : undefined),
      // What is free, and what would settle it, stands with the verdict.
      text: step.kind === 'open' ? step.text.split('. Still free')[0] : step.text,
      from: [...new Set(from)],
      equations: (given && step.results.length > 0 ? [] : step.equations).map((equation) => ({
        axis: equation.role === 'x' || equation.role === 'y' ? equation.role : '',
        tex: shorten(equation.tex),
      })),
      count:
        step.kind === 'step' || step.scalarEquations > 0
          ? countOf(step.scalarEquations, step.unknowns.length)
          : '',
      unknowns: step.unknowns.map((unknown) => ({ ...unknown, tex: shorten(unknown.tex) })),
      results: step.results.map((result) => resultOf(result, shorten)),
    };
  });
}

function labelOf(kind: WorkingKind, known: Known | undefined): string {
  if (known === undefined || (kind !== 'known' && kind !== 'adjusted')) return kind;
  return `${kind}, ${extentOf(known)}`;
}

function extentOf(known: Known): string {
  if (!('at' in known) || known.components !== undefined) {
    return 'at' in known ? 'both' : 'value';
  }
  if (known.magnitude === undefined) return known.line === true ? 'line only' : 'direction only';
  return known.direction === undefined ? 'magnitude only' : 'both';
}

function countOf(equations: number, unknowns: number): string {
  const plural = (count: number, word: string) => `${count} ${word}${count === 1 ? '' : 's'}`;
  const tail = unknowns === 0 ? '' : ' here:';
  return `${plural(equations, 'equation')} · ${unknowns === 0 ? 'no unknowns' : plural(unknowns, 'unknown')}${tail}`;
}

/** Directions are read in degrees. */
const unitOf = (unit: Unit) => (unit === 'rad' ? '°' : unit === '1/m' ? '' : unit);

function resultOf(
  { symbol, value, sigma }: WorkingQuantity,
  shorten: (tex: string) => string,
): ShownResult {
  const unit = unitOf(symbol.unit);
  const half = coverage95 * (sigma ?? 0);
  const ranged = { value, low: value - half, high: value + half };
  const figure = showRanged(ranged, unit);
  const known = sigma !== null && sigma > 0;
  const shown = known ? figure.value : showPlain(unit === '°' ? (value * 180) / Math.PI : value, 4);
  const space = unit === '°' || unit === '' ? '' : ' ';
  return {
    tex: shorten(symbol.tex),
    says: symbol.text,
    value: `${shown}${space}${symbol.unit === '1/m' ? ' 1/m' : unit}`,
    interval: known ? `[${figure.low}, ${figure.high}]` : '',
  };
}
