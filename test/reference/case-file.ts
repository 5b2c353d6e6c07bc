import { readFileSync } from 'node:fs';
import { expect } from '@jest/globals';

/** A check case from outside the project, with the source that its expected values came from. */
export interface CaseFile<Inputs, Expected> {
  readonly id: string;
  readonly title: string;
  readonly source: string;
  readonly inputs: Inputs;
  readonly expected: Expected;
  readonly tolerance: { readonly rel?: number; readonly abs?: number; readonly mc_rel?: number };
}

export function caseFile<Inputs, Expected>(id: string): CaseFile<Inputs, Expected> {
  const url = new URL(`./cases/${id}.json`, import.meta.url);
  return JSON.parse(readFileSync(url, 'utf8'));
}

/** Name of a test of a case, with its source. */
export const nameOf = (check: { id: string; title: string; source: string }): string =>
  `${check.id}: ${check.title} [${check.source}]`;

/** Equal within the larger of a relative and an absolute tolerance, for numbers and arrays of them. */
export function expectClose(
  actual: unknown,
  expected: unknown,
  tolerance: { readonly rel?: number; readonly abs?: number },
): void {
  if (Array.isArray(expected)) {
    const items = Array.from(actual as ArrayLike<unknown>);
    expect(items).toHaveLength(expected.length);
    expected.forEach((item, i) => expectClose(items[i], item, tolerance));
    return;
  }
  const want = expected as number;
  const margin = Math.max(tolerance.abs ?? 0, (tolerance.rel ?? 0) * Math.abs(want));
  const got = actual as number;
  const off = Math.abs(got - want);
  if (!(off <= margin)) expect({ got, off }).toEqual({ got: want, off: `at most ${margin}` });
  expect(off).toBeLessThanOrEqual(margin);
}
