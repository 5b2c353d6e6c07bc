import { EngineError } from '../../errors';
import type { Noise, Place } from '../model';

/** Share of an angle (rad), or of a local length, by which the equations are differentiated. */
export const smallStep = 1e-3;

/** The vector of all values while it is being laid out, and the causes of uncertainty. */
export class Layout {
  readonly values: number[] = [];
  readonly steps: number[] = [];
  readonly noises: Noise[] = [];

  push(value: number, step: number): number {
    this.values.push(value);
    this.steps.push(step);
    return this.values.length - 1;
  }

  /** A value that the equations are linear in. */
  linear(value: number): number {
    return this.push(value, Math.abs(value) > 0 ? Math.abs(value) : 1);
  }

  angle(value: number): number {
    return this.push(value, smallStep);
  }

  place(body: number, x: number, y: number, step: number): Place {
    const at = this.push(x, step);
    this.push(y, step);
    return { body, at };
  }

  /** Makes the value at a place uncertain; a missing or zero sigma leaves it exact. */
  uncertain(
    kind: Noise['source']['kind'],
    id: string,
    at: number,
    sigma: number | undefined,
    field: string,
  ): void {
    if (sigma === undefined || sigma === 0) return;
    if (sigma < 0) throw new EngineError('not-positive', field, `${field} must not be negative.`);
    this.noises.push({ source: { kind, id }, entries: [{ at, amount: sigma }] });
  }
}
