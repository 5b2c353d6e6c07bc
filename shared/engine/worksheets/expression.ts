import { create, parseDependencies, type MathNode } from 'mathjs/number';
import { EngineError } from '../errors';
import { binary, chain, functions, operators, type Dual } from './dual';

/**
 * Arithmetic in text, such as `sqrt(2 * g * mu * d)`, read by mathjs and evaluated here.
 *
 * Only numbers, known symbols, + - * / ^ and the functions of dual.ts are allowed, and nothing is
 * handed to mathjs to be run: a formula cannot reach anything but its own symbols. `sum(…)` adds a
 * term over the rows of a table.
 */
export interface Expression {
  readonly text: string;
  /** Symbols in the order in which `evaluate` takes them. */
  readonly symbols: readonly string[];
  readonly term: Term;
  evaluate(values: readonly number[]): number;
  differentiate(values: readonly number[]): Dual;
}

const { parse } = create(parseDependencies, {});
const longest = 400;

type Term = (values: readonly Dual[]) => Dual;

export interface Scope {
  /** Symbols with a fixed value. */
  readonly constants?: Readonly<Record<string, number>>;
  /** Symbols that stand for another expression of the same symbols. */
  readonly definitions?: ReadonlyMap<string, Expression>;
  /** Columns of a table; row i of column `d` is the symbol `d_i`, from 1. */
  readonly rows?: { readonly columns: readonly string[]; readonly count: number };
}

/**
 * Reads a formula of the given symbols.
 * Throws EngineError `unsupported` with `field` when the text is not arithmetic of them.
 */
export function readExpression(
  text: string,
  symbols: readonly string[],
  field: string,
  scope: Scope = {},
): Expression {
  if (text.length > longest)
    throw new EngineError('unsupported', field, `The formula is over ${longest} characters long.`);
  const order = new Map(symbols.map((symbol, i) => [symbol, i]));
  const reader: Reader = { field, order, scope, row: null };
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
    term,
    differentiate,
    evaluate: (values) => term(values.map((value) => ({ value, gradient: none }))).value,
  };
}

const none = new Float64Array(0);
const fixed: Readonly<Record<string, number>> = { pi: Math.PI };

function parseText(text: string, field: string): MathNode {
  try {
    return parse(text);
  } catch {
    throw new EngineError('unsupported', field, `The formula "${text}" cannot be read.`);
  }
}

interface Reader {
  readonly field: string;
  readonly order: ReadonlyMap<string, number>;
  readonly scope: Scope;
  /** Row of the table that `sum` is at. */
  readonly row: number | null;
}

function refuse(reader: Reader, what: string): never {
  throw new EngineError('unsupported', reader.field, `The formula may not contain ${what}.`);
}

function read(node: MathNode, reader: Reader): Term {
  if (isConstant(node))
    return typeof node.value === 'number' && Number.isFinite(node.value)
      ? constant(node.value)
      : refuse(reader, `"${String(node.value)}"`);
  if (isParenthesis(node)) return read(node.content, reader);
  if (isSymbol(node)) return readSymbol(node.name, reader);
  if (isOperator(node)) return readOperator(node, reader);
  if (isFunction(node)) return readCall(node, reader);
  return refuse(reader, 'anything but arithmetic');
}

function readSymbol(name: string, reader: Reader): Term {
  const { order, scope, row } = reader;
  const inRow = row !== null && scope.rows?.columns.includes(name);
  const at = order.get(inRow ? `${name}_${row}` : name);
  if (at !== undefined) return (values) => values[at];
  const definition = scope.definitions?.get(name);
  if (definition !== undefined) return definition.term;
  const constants = { ...fixed, ...scope.constants };
  return Object.hasOwn(constants, name)
    ? constant(constants[name])
    : refuse(reader, `the unknown symbol "${name}"`);
}

function readOperator({ op, args }: { op: string; args: MathNode[] }, reader: Reader): Term {
  const terms = args.map((arg) => read(arg, reader));
  if (terms.length === 1 && op === '-') {
    const [inner] = terms;
    return (values) => {
      const x = inner(values);
      return chain(-x.value, x, -1);
    };
  }
  if (terms.length < 2 || !Object.hasOwn(operators, op)) refuse(reader, `"${op}" there`);
  const rule = operators[op];
  return terms.reduce((left, right) => (values) => rule(left(values), right(values)));
}

function readCall({ fn, args }: { fn: MathNode; args: MathNode[] }, reader: Reader): Term {
  const name = isSymbol(fn) ? fn.name : refuse(reader, 'that call');
  if (name === 'sum' && args.length === 1) return readSum(args[0], reader);
  const terms = args.map((arg) => read(arg, reader));
  if (Object.hasOwn(functions, name) && terms.length === 1) {
    const [inner] = terms;
    return (values) => functions[name](inner(values));
  }
  if (Object.hasOwn(binary, name) && terms.length === 2) {
    const [a, b] = terms;
    return (values) => binary[name](a(values), b(values));
  }
  return refuse(reader, `the function "${name}" with ${terms.length} arguments`);
}

function readSum(node: MathNode, reader: Reader): Term {
  const { rows } = reader.scope;
  if (rows === undefined || reader.row !== null) return refuse(reader, '"sum" there');
  const terms = Array.from({ length: rows.count }, (_, i) => read(node, { ...reader, row: i + 1 }));
  const add = operators['+'];
  return (values) => terms.reduce((total, term) => add(total, term(values)), constant(0)(values));
}

const constant =
  (value: number): Term =>
  (values) => ({
    value,
    gradient: values.length === 0 ? none : new Float64Array(values[0].gradient.length),
  });

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
