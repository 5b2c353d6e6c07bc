import { create, parseDependencies, type MathNode } from 'mathjs/number';
import { EngineError } from '../errors';

/**
 * Arithmetic in text, such as `sqrt(2 * g * mu * d)`, read by mathjs and evaluated here.
 *
 * Only what is listed below is allowed, and nothing is handed to mathjs to be run: a formula
 * cannot reach anything but its own symbols. Evaluation carries the derivative by every symbol
 * along (forward mode), exact to rounding, for the propagation of uncertainty.
 */
export interface Dual {
  readonly value: number;
  /** ∂value/∂symbol, in the order of the expression's symbols. */
  readonly gradient: Float64Array;
}

export interface Expression {
  readonly text: string;
  /** Symbols in the order in which `evaluate` takes them. */
  readonly symbols: readonly string[];
  /** Symbols that the text uses. */
  readonly used: ReadonlySet<string>;
  evaluate(values: readonly number[]): number;
  differentiate(values: readonly number[]): Dual;
}

const { parse } = create(parseDependencies, {});
const longest = 400;

type Rule = (x: Dual) => Dual;

/** f(x) with f′(x). */
const lift =
  (f: (x: number) => number, derivative: (x: number, y: number) => number): Rule =>
  (x) => {
    const value = f(x.value);
    return chain(value, x, derivative(x.value, value));
  };

const functions: Readonly<Record<string, Rule>> = {
  sqrt: lift(Math.sqrt, (_, y) => 0.5 / y),
  exp: lift(Math.exp, (_, y) => y),
  log: lift(Math.log, (x) => 1 / x),
  sin: lift(Math.sin, Math.cos),
  cos: lift(Math.cos, (x) => -Math.sin(x)),
  tan: lift(Math.tan, (_, y) => 1 + y * y),
  asin: lift(Math.asin, (x) => 1 / Math.sqrt(1 - x * x)),
  acos: lift(Math.acos, (x) => -1 / Math.sqrt(1 - x * x)),
  atan: lift(Math.atan, (x) => 1 / (1 + x * x)),
  abs: lift(Math.abs, Math.sign),
};

const chain = (value: number, x: Dual, slope: number): Dual => ({
  value,
  gradient: x.gradient.map((g) => (g === 0 ? 0 : g * slope)),
});

const combine = (value: number, a: Dual, slopeA: number, b: Dual, slopeB: number): Dual => ({
  value,
  gradient: a.gradient.map(
    (g, i) => (g === 0 ? 0 : g * slopeA) + (b.gradient[i] === 0 ? 0 : b.gradient[i] * slopeB),
  ),
});

const operators: Readonly<Record<string, (a: Dual, b: Dual) => Dual>> = {
  '+': (a, b) => combine(a.value + b.value, a, 1, b, 1),
  '-': (a, b) => combine(a.value - b.value, a, 1, b, -1),
  '*': (a, b) => combine(a.value * b.value, a, b.value, b, a.value),
  '/': (a, b) => {
    const quotient = a.value / b.value;
    return combine(quotient, a, 1 / b.value, b, -quotient / b.value);
  },
  '^': (a, b) => {
    const power = a.value ** b.value;
    return combine(
      power,
      a,
      b.value * a.value ** (b.value - 1),
      b,
      a.value > 0 ? power * Math.log(a.value) : 0,
    );
  },
};

/** Functions of two arguments: each picks one of them, or is an angle. */
const binary: Readonly<Record<string, (a: Dual, b: Dual) => Dual>> = {
  max: (a, b) => (a.value >= b.value ? a : b),
  min: (a, b) => (a.value <= b.value ? a : b),
  atan2: (a, b) => {
    const square = a.value ** 2 + b.value ** 2;
    return combine(Math.atan2(a.value, b.value), a, b.value / square, b, -a.value / square);
  },
};

type Term = (values: readonly Dual[]) => Dual;

/**
 * Reads a formula. `constants` are symbols with a fixed value.
 * Throws EngineError `unsupported` with `field` when the text is not arithmetic of the symbols.
 */
export function readExpression(
  text: string,
  symbols: readonly string[],
  field: string,
  constants: Readonly<Record<string, number>> = { pi: Math.PI },
): Expression {
  if (text.length > longest)
    throw new EngineError('unsupported', field, `The formula is over ${longest} characters long.`);
  const used = new Set<string>();
  const order = new Map(symbols.map((symbol, i) => [symbol, i]));
  const reader: Reader = { field, used, order, constants };
  const term = read(parseText(text, field), reader);
  const differentiate = (values: readonly number[]): Dual =>
    term(
      values.map((value, i) => {
        const gradient = new Float64Array(symbols.length);
        gradient[i] = 1;
        return { value, gradient };
      }),
    );
  return {
    text,
    symbols,
    used,
    differentiate,
    evaluate: (values) =>
      term(values.map((value) => ({ value, gradient: new Float64Array(0) }))).value,
  };
}

function parseText(text: string, field: string): MathNode {
  try {
    return parse(text);
  } catch {
    throw new EngineError('unsupported', field, `The formula "${text}" cannot be read.`);
  }
}

interface Reader {
  readonly field: string;
  readonly used: Set<string>;
  readonly order: ReadonlyMap<string, number>;
  readonly constants: Readonly<Record<string, number>>;
}

function read(node: MathNode, reader: Reader): Term {
  const refuse = (what: string): never => {
    throw new EngineError('unsupported', reader.field, `The formula may not contain ${what}.`);
  };
  if (isConstant(node)) {
    const value = Number(node.value);
    return Number.isFinite(value) ? constant(value) : refuse(`"${String(node.value)}"`);
  }
  if (isParenthesis(node)) return read(node.content, reader);
  if (isSymbol(node)) {
    const at = reader.order.get(node.name);
    if (at !== undefined) {
      reader.used.add(node.name);
      return (values) => values[at];
    }
    return Object.hasOwn(reader.constants, node.name)
      ? constant(reader.constants[node.name])
      : refuse(`the unknown symbol "${node.name}"`);
  }
  if (isOperator(node)) {
    const terms = node.args.map((arg) => read(arg, reader));
    if (terms.length === 1 && node.op === '-') {
      const [inner] = terms;
      return (values) => {
        const x = inner(values);
        return chain(-x.value, x, -1);
      };
    }
    const rule = Object.hasOwn(operators, node.op) ? operators[node.op] : refuse(`"${node.op}"`);
    if (terms.length < 2) refuse(`"${node.op}" before a value`);
    return terms.reduce((left, right) => (values) => rule(left(values), right(values)));
  }
  if (isFunction(node)) {
    const name = isSymbol(node.fn) ? node.fn.name : refuse('that call');
    const terms = node.args.map((arg) => read(arg, reader));
    if (Object.hasOwn(functions, name) && terms.length === 1) {
      const [inner] = terms;
      return (values) => functions[name](inner(values));
    }
    if (Object.hasOwn(binary, name) && terms.length === 2) {
      const [a, b] = terms;
      return (values) => binary[name](a(values), b(values));
    }
    return refuse(`the function "${name}" with ${terms.length} arguments`);
  }
  return refuse('anything but arithmetic');
}

const constant = (value: number): Term => {
  return (values) => ({
    value,
    gradient: new Float64Array(values.length === 0 ? 0 : values[0].gradient.length),
  });
};

interface Typed {
  readonly type: string;
}
const isType = (node: MathNode, type: string): boolean => (node as Typed).type === type;
const isConstant = (node: MathNode): node is MathNode & { value: unknown } =>
  isType(node, 'ConstantNode');
const isParenthesis = (node: MathNode): node is MathNode & { content: MathNode } =>
  isType(node, 'ParenthesisNode');
const isSymbol = (node: MathNode): node is MathNode & { name: string } =>
  isType(node, 'SymbolNode');
const isOperator = (node: MathNode): node is MathNode & { op: string; args: MathNode[] } =>
  isType(node, 'OperatorNode');
const isFunction = (node: MathNode): node is MathNode & { fn: MathNode; args: MathNode[] } =>
  isType(node, 'FunctionNode');
