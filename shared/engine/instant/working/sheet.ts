import { pointMotion } from '../knowns';
import type { Level, Model, Place, State } from '../model';
import { armX, armY, positionX, positionY } from '../model';
import type { Notation } from './notation';
import { quantity, scalarEquation, sumTex, symbolsOf, coefficientOf, term, unknown } from './terms';
import type {
  Arrow,
  Factor,
  Reference,
  Term,
  WorkingEquation,
  WorkingQuantity,
  WorkingStep,
  WorkingSymbol,
} from './working';

/** One vector of a sum, as written and in its components. */
export interface Part {
  readonly tex: string;
  readonly role: Arrow['role'];
  readonly x: readonly Term[];
  readonly y: readonly Term[];
}

/** A place whose motion is expressed, and how. */
export interface Base {
  readonly place: Place;
  readonly parts: readonly Part[];
}

/** The sheet of one level while it is written: what is known so far, and the steps. */
export class Sheet {
  readonly steps: WorkingStep[] = [];
  private readonly scalars = new Map<string, number>();
  private readonly truths = new Map<string, number>();
  private readonly bases = new Map<number, Base>();

  constructor(
    readonly model: Model,
    readonly state: State,
    readonly level: Level,
    readonly notation: Notation,
  ) {}

  /** A number if the scalar is known by now, else its symbol; `truth` is what it will turn out to be. */
  scalar(symbol: WorkingSymbol, truth: number): Factor {
    this.truths.set(symbol.tex, truth);
    const value = this.scalars.get(symbol.tex);
    return value === undefined ? unknown(symbol) : quantity(value, symbol.unit, symbol.of);
  }

  settle(symbol: WorkingSymbol, value: number): void {
    this.scalars.set(symbol.tex, value);
  }

  truthOf(symbol: WorkingSymbol): number {
    return this.truths.get(symbol.tex) ?? NaN;
  }

  isKnown(symbol: WorkingSymbol): boolean {
    return this.scalars.has(symbol.tex);
  }

  setBase(body: number, base: Base): void {
    this.bases.set(body, base);
  }

  hasBase(body: number): boolean {
    return this.bases.has(body);
  }

  baseOf(body: number): Base {
    const base = this.bases.get(body);
    if (base === undefined) throw new Error(`the sheet has not reached body ${body}`);
    return base;
  }

  /** ω (or α) of a body as a factor; the ground does not turn. */
  turn(level: Level, body: number): Factor {
    const { state, model } = this;
    if (body === model.ground) return quantity(0, level === 'velocity' ? 'rad/s' : 'rad/s²');
    const symbol = this.notation.turn(level, body);
    const motion = level === 'velocity' ? state.velocity : state.acceleration;
    const truth = motion[3 * body + 2];
    // On the sheet of accelerations the rates of turning are known from that of velocities.
    if (level !== this.level) return quantity(truth, symbol.unit, symbol.of);
    return this.scalar(symbol, truth);
  }

  /** The motion of a place of a body, as its base and what turning adds. */
  expression(place: Place, prime = ''): Part[] {
    const base = this.baseOf(place.body);
    if (base.place.at === place.at && base.place.body === place.body) return [...base.parts];
    const rx = armX(this.state, place) - armX(this.state, base.place);
    const ry = armY(this.state, place) - armY(this.state, base.place);
    const r = `\\mathbf r_{${this.notation.pointTex(place)}${prime}/${this.notation.pointTex(base.place)}}`;
    return [...base.parts, ...this.turningParts(place.body, rx, ry, r)];
  }

  turningParts(body: number, rx: number, ry: number, r: string): Part[] {
    if (body === this.model.ground) return [];
    const from = this.notation.bodyReference(body);
    const [x, y] = [quantity(rx, 'm', from), quantity(ry, 'm', from)];
    const turn = this.turn(this.level, body);
    const turning: Part = {
      tex: `${this.notation.turn(this.level, body).tex}\\,\\mathbf k\\times${r}`,
      role: 'relative',
      x: [term(-1, turn, y)],
      y: [term(1, turn, x)],
    };
    if (this.level === 'velocity') return [turning];
    const omega = this.turn('velocity', body);
    const inward: Part = {
      tex: `-${this.notation.turn('velocity', body).tex}^{2}\\,${r}`,
      role: 'relative',
      x: [term(-1, omega, omega, x)],
      y: [term(-1, omega, omega, y)],
    };
    return [turning, inward];
  }

  /** A vector that is known by now. */
  numeric(tex: string, v: readonly [number, number], from: Reference | null): Part {
    const unit = this.level === 'velocity' ? 'm/s' : 'm/s²';
    return {
      tex,
      role: 'absolute',
      x: [term(1, quantity(v[0], unit, from))],
      y: [term(1, quantity(v[1], unit, from))],
    };
  }

  /** What the solver found for a place. */
  motionOf(place: Place): [number, number] {
    return pointMotion(this.level, this.state, place);
  }

  position(place: Place): [number, number] {
    return [positionX(this.state, place), positionY(this.state, place)];
  }

  /** The value of an expression in which everything is known by now. */
  evaluate(parts: readonly Part[]): [number, number] {
    return [this.sum(parts.flatMap((p) => p.x)), this.sum(parts.flatMap((p) => p.y))];
  }

  private sum(terms: readonly Term[]): number {
    return terms.reduce(
      (total, t) =>
        total +
        symbolsOf(t).reduce(
          (product, s) => product * (this.scalars.get(s.tex) ?? this.truthOf(s)),
          coefficientOf(t),
        ),
      0,
    );
  }

  /** left = right as a vector equation with its components; `of` is what both sides are. */
  vectorEquation(left: readonly Part[], right: readonly Part[], of?: string): WorkingEquation[] {
    const whole = of === undefined || of === partsTex(left) ? '' : `${of} = `;
    const vector: WorkingEquation = {
      role: 'vector',
      tex: `${whole}${partsTex(left)} = ${partsTex(right)}`,
    };
    return [
      vector,
      scalarEquation(
        'x',
        left.flatMap((p) => p.x),
        right.flatMap((p) => p.x),
      ),
      scalarEquation(
        'y',
        left.flatMap((p) => p.y),
        right.flatMap((p) => p.y),
      ),
    ];
  }

  /** Symbols that an equation still leaves to be found, each once. */
  unknownsOf(equations: readonly WorkingEquation[]): WorkingSymbol[] {
    const found = new Map<string, WorkingSymbol>();
    for (const e of equations)
      if (e.role !== 'vector')
        for (const t of [...e.left, ...e.right])
          if (coefficientOf(t) !== 0) for (const s of symbolsOf(t)) found.set(s.tex, s);
    return [...found.values()];
  }

  result(symbol: WorkingSymbol, value: number, sigma: number | null = null): WorkingQuantity {
    const number = sumTex([term(1, quantity(value, symbol.unit))]);
    const unit = ['', 'rad'].includes(symbol.unit)
      ? ''
      : `\\ \\text{${symbol.unit.replace('²', '')}}${symbol.unit.endsWith('²') ? '^{2}' : ''}`;
    return { symbol, value, sigma, tex: `${symbol.tex} = ${number}${unit}` };
  }

  add(step: Partial<WorkingStep> & Pick<WorkingStep, 'kind' | 'text'>): void {
    this.steps.push({
      level: this.level,
      equations: [],
      scalarEquations: 0,
      unknowns: [],
      results: [],
      uses: [],
      arrows: [],
      ...step,
    });
  }

  /** The parts of a sum head to tail, and their sum, once all of it is known. */
  arrows(tex: string, parts: readonly Part[]): Arrow[] {
    let from: [number, number] = [0, 0];
    const chain = parts.map((p): Arrow => {
      const [x, y] = this.evaluate([p]);
      const to: [number, number] = [from[0] + x, from[1] + y];
      const arrow = { tex: p.tex, role: p.role, from, to };
      from = to;
      return arrow;
    });
    return [...chain, { tex, role: 'result', from: [0, 0], to: from }];
  }

  /**
   * Makes the motion of a place of a solved body known by number, writing the step from the body's
   * base to it if there is one to write.
   */
  carry(place: Place, prime = ''): Part {
    const tex = this.notation.vectorTex(this.level, place, prime);
    const from = this.notation.pointReference(place);
    const base = this.baseOf(place.body);
    if (base.place.at === place.at) return this.numeric(tex, this.evaluate(base.parts), from);
    const parts = this.expression(place, prime);
    const value = this.evaluate(parts);
    const x = this.notation.component(this.level, place, 'x');
    const y = this.notation.component(this.level, place, 'y');
    const left: Part = {
      tex,
      role: 'result',
      x: [term(1, unknown(x))],
      y: [term(1, unknown(y))],
    };
    this.add({
      kind: 'step',
      text: `From ${this.notation.pointName(base.place)} to ${this.notation.pointName(place)}, both on the ${this.notation.bodyName(place.body)}.`,
      equations: this.vectorEquation([left], parts),
      scalarEquations: 2,
      unknowns: [x, y],
      results: [this.result(x, value[0]), this.result(y, value[1])],
      uses: [this.notation.bodyReference(place.body)],
      arrows: this.arrows(tex, parts),
    });
    // From here on the carried place is the body's nearest known one.
    const known = this.numeric(tex, value, from);
    this.setBase(place.body, { place, parts: [known] });
    return known;
  }
}

export const partsTex = (parts: readonly Part[]): string =>
  parts.length === 0
    ? '\\mathbf 0'
    : parts.reduce(
        (sum, { tex }, i) =>
          i === 0 ? tex : tex.startsWith('-') ? `${sum} - ${tex.slice(1)}` : `${sum} + ${tex}`,
        '',
      );
