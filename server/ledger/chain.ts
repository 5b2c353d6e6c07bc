import type { LedgerEvent } from '#shared/contracts/custody';
import { canonicalText, sha256Hex } from './canonical';

/** `previous` of the first event of a chain. */
export const firstPrevious = '0'.repeat(64);

/** Where a chain stands; the next event takes its place after this one. */
export interface ChainPosition {
  readonly sequence: number;
  readonly hash: string;
}

export const emptyChain: ChainPosition = { sequence: 0, hash: firstPrevious };

/** An event as it is kept: the exact text that was hashed, and its hash. */
export interface ChainedEvent {
  readonly event: LedgerEvent;
  readonly text: string;
  readonly hash: string;
}

/** Gives an event its place after `position` and its hash, which covers the hash before it. */
export function chainEvent(
  event: Omit<LedgerEvent, 'format' | 'sequence' | 'previous'>,
  position: ChainPosition,
): ChainedEvent {
  const chained: LedgerEvent = {
    ...event,
    format: 'centrode.custody-event/1',
    sequence: position.sequence + 1,
    previous: position.hash,
  };
  const text = canonicalText(chained);
  return { event: chained, text, hash: sha256Hex(text) };
}
