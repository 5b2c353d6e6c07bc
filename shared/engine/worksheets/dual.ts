/**
 * Numbers that carry their derivative by every input along (forward mode), exact to rounding.
 */
export interface Dual {
  readonly value: number;
  /** ∂value/∂symbol, in the order of the expression's symbols. */
  readonly gradient: Float64Array;
}

export type Rule = (x: Dual) => Dual;

/** f(x) with f′(x). */
const lift =
  (f: (x: number) => number, derivative: (x: number, y: number) => number): Rule =>
  (x) => {
    const value = f(x.value);
    return chain(value, x, derivative(x.value, value));
  };

export const functions: Readonly<Record<string, Rule>> = {
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

/** A value that depends on x with this slope. */
export const chain = (value: number, x: Dual, slope: number): Dual => ({
  value,
  gradient: x.gradient.map((g) => (g === 0 ? 0 : g * slope)),
});

const combine = (value: number, a: Dual, slopeA: number, b: Dual, slopeB: number): Dual => ({
  value,
  gradient: a.gradient.map(
    (g, i) => (g === 0 ? 0 : g * slopeA) + (b.gradient[i] === 0 ? 0 : b.gradient[i] * slopeB),
  ),
});

export const operators: Readonly<Record<string, (a: Dual, b: Dual) => Dual>> = {
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
export const binary: Readonly<Record<string, (a: Dual, b: Dual) => Dual>> = {
  max: (a, b) => (a.value >= b.value ? a : b),
  min: (a, b) => (a.value <= b.value ? a : b),
  atan2: (a, b) => {
    const square = a.value ** 2 + b.value ** 2;
    return combine(Math.atan2(a.value, b.value), a, b.value / square, b, -a.value / square);
  },
};
