import type * as z from 'zod';
import type { withheldItem } from '#shared/contracts/disclosure';

export type Withheld = z.output<typeof withheldItem>;
export const withholdReasons = ['privileged', 'irrelevant', 'sensitive', 'other'] as const;

/** What happens to an exhibit in a release. */
export type Decision =
  | { readonly released: true }
  | {
      readonly released: false;
      readonly reason: Withheld['reason'] | null;
      readonly explanation: string;
    };

export interface Decisions {
  readonly released: string[];
  readonly withheld: Withheld[];
  /** Numbers that hold the release back: not decided, or without the reason that is needed. */
  readonly open: string[];
}

/** "Other" says nothing by itself: it needs words. */
export const isComplete = (decision: Decision): boolean =>
  decision.released ||
  (decision.reason !== null && (decision.reason !== 'other' || decision.explanation.trim() !== ''));

/** Sorts the exhibits of a case by what was decided about each. */
export function decisions(
  numbers: readonly string[],
  chosen: ReadonlyMap<string, Decision>,
): Decisions {
  const result: Decisions = { released: [], withheld: [], open: [] };
  for (const number of numbers) {
    const decision = chosen.get(number);
    if (decision === undefined || !isComplete(decision)) result.open.push(number);
    else if (decision.released) result.released.push(number);
    else if (decision.reason !== null) {
      const { reason, explanation } = decision;
      result.withheld.push({ exhibit: number, reason, explanation: explanation.trim() });
    }
  }
  return result;
}
