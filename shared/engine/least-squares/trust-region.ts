import { applyTransposed, factorise, type Qr } from './qr';

/**
 * The λ ≥ 0 and step that solve min |J·s + r|² + λ|D·s|² with |D·s| within a tenth of the trust
 * radius, or λ = 0 when the full step is inside: Moré's safeguarded Newton iteration on
 * φ(λ) = |D·s(λ)| − Δ.
 */
export function trustRegionStep(
  qr: Qr,
  projected: Float64Array,
  scale: Float64Array,
  trust: number,
  previous: number,
): { step: Float64Array; lambda: number } {
  const n = qr.columns;
  const full = dampedStep(qr, projected, scale, 0);
  let phi = full === null ? Infinity : scaledNorm(scale, full.step) - trust;
  if (full !== null && phi <= 0.1 * trust) return { step: full.step, lambda: 0 };
  let lower = full === null ? 0 : Math.max(0, phi / trust / full.slope);
  let upper = gradientNorm(qr, projected, scale) / trust || Number.MIN_VALUE;
  let lambda = Math.min(Math.max(previous, lower), upper);
  if (lambda === 0) lambda = upper * 1e-3;
  let best: Float64Array = new Float64Array(n);
  for (let i = 0; i < 20; i++) {
    const damped = dampedStep(qr, projected, scale, Math.max(lambda, 1e-300));
    if (damped === null) break;
    best = damped.step;
    const before = phi;
    phi = scaledNorm(scale, best) - trust;
    if (Math.abs(phi) <= 0.1 * trust || (lower === 0 && phi <= before && before < 0)) break;
    if (phi > 0) lower = Math.max(lower, lambda);
    else upper = Math.min(upper, lambda);
    lambda = Math.max(lower, lambda + phi / trust / damped.slope);
    if (lambda > upper) lambda = Math.sqrt(Math.max(lower, upper * 1e-3) * upper);
  }
  return { step: best, lambda };
}

/** The step at λ, and −φ′(λ)/|D·s|, both from the triangle of [R; √λ·D·P]. */
function dampedStep(
  qr: Qr,
  projected: Float64Array,
  scale: Float64Array,
  lambda: number,
): { step: Float64Array; slope: number } | null {
  const n = qr.columns;
  const kept = Math.min(n, qr.rows);
  const root = Math.sqrt(lambda);
  const rows = kept + (lambda > 0 ? n : 0);
  const a = new Float64Array(rows * n);
  const b = new Float64Array(rows);
  for (let j = 0; j < n; j++) {
    for (let k = 0; k <= Math.min(j, kept - 1); k++) a[j * rows + k] = qr.factors[j * qr.rows + k];
    if (lambda > 0) a[j * rows + kept + j] = root * scale[qr.pivots[j]];
  }
  for (let k = 0; k < kept; k++) b[k] = -projected[k];
  const triangle = factorise(a, rows, n, Number.EPSILON * 8);
  if (triangle.rank < n) return null;
  const y = applyTransposed(triangle, b);
  const inner = backSubstitute(triangle, y);
  const step = new Float64Array(n);
  for (let j = 0; j < n; j++) step[qr.pivots[triangle.pivots[j]]] = inner[j];
  const length = scaledNorm(scale, step);
  if (length === 0) return { step, slope: 1 };
  const w = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    const p = qr.pivots[triangle.pivots[j]];
    w[j] = (scale[p] * scale[p] * step[p]) / length;
  }
  forwardSubstitute(triangle, w);
  const slope = w.reduce((total, value) => total + value * value, 0);
  return { step, slope };
}

function backSubstitute(qr: Qr, y: Float64Array): Float64Array {
  const n = qr.columns;
  const x = new Float64Array(n);
  for (let k = n - 1; k >= 0; k--) {
    let sum = y[k];
    for (let j = k + 1; j < n; j++) sum -= qr.factors[j * qr.rows + k] * x[j];
    x[k] = sum / qr.factors[k * qr.rows + k];
  }
  return x;
}

/** Solves Rᵀ·x = w in place. */
function forwardSubstitute(qr: Qr, w: Float64Array): void {
  for (let k = 0; k < qr.columns; k++) {
    let sum = w[k];
    for (let j = 0; j < k; j++) sum -= qr.factors[k * qr.rows + j] * w[j];
    w[k] = sum / qr.factors[k * qr.rows + k];
  }
}

/** |D⁻¹·Jᵀ·r|. */
function gradientNorm(qr: Qr, projected: Float64Array, scale: Float64Array): number {
  let total = 0;
  for (let j = 0; j < qr.columns; j++) {
    let sum = 0;
    for (let k = 0; k <= Math.min(j, qr.rows - 1); k++)
      sum += qr.factors[j * qr.rows + k] * projected[k];
    total += (sum / scale[qr.pivots[j]]) ** 2;
  }
  return Math.sqrt(total);
}

/** |J·step|. */
export function linearNorm(qr: Qr, step: Float64Array): number {
  const n = qr.columns;
  let sum = 0;
  for (let k = 0; k < Math.min(n, qr.rows); k++) {
    let row = 0;
    for (let j = k; j < n; j++) row += qr.factors[j * qr.rows + k] * step[qr.pivots[j]];
    sum += row * row;
  }
  return Math.sqrt(sum);
}

/** |D·a|. */
export function scaledNorm(scale: Float64Array, a: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < scale.length; i++) sum += (scale[i] * a[i]) ** 2;
  return Math.sqrt(sum);
}
