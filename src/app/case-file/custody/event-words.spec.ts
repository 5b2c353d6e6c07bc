import { describe, expect, it } from '@jest/globals';
import type { LedgerEvent } from '#shared/contracts/custody';
import { factsOf, isOverdue, latenessOf, sentenceOf } from './event-words';

const event = (over: Partial<LedgerEvent>): LedgerEvent => ({
  format: 'centrode.custody-event/1',
  caseNumber: '2026-014',
  sequence: 3,
  kind: 'stored',
  exhibit: '2026-014/1',
  recordedAt: '2026-11-05T10:00:00.000001Z',
  happenedAt: null,
  zone: 'UTC',
  recordedBy: { id: 'a', name: 'Ines Farrow' },
  releasedBy: null,
  receivedBy: null,
  purpose: '',
  condition: '',
  sealBefore: '',
  sealAfter: '',
  location: '',
  method: 'none',
  tracking: '',
  note: '',
  files: [],
  refersTo: null,
  previous: '0'.repeat(64),
  ...over,
});

describe('the words for an event', () => {
  it.each<[Partial<LedgerEvent>, string]>([
    [
      { kind: 'collected', receivedBy: 'R. Ostler', location: 'Marl Lane' },
      'Collected by R. Ostler: Marl Lane',
    ],
    [{ kind: 'received', receivedBy: 'Ines Farrow' }, 'Received by Ines Farrow'],
    [{ kind: 'handed over', releasedBy: 'A', receivedBy: 'B' }, 'Offered by A to B'],
    [{ kind: 'accepted', releasedBy: 'A', receivedBy: 'B' }, 'Accepted by B from A'],
    [{ kind: 'refused', releasedBy: 'A' }, 'Refused by Ines Farrow; A goes on holding it'],
    [{ kind: 'refused', purpose: 'withdrawn by the giver' }, 'Offer withdrawn by Ines Farrow'],
    [{ kind: 'opened', sealBefore: 'S-1' }, 'Seal S-1 opened'],
    [{ kind: 'corrected', refersTo: 2 }, 'Correction of event 2'],
  ])('%j', (over, sentence) => {
    expect(sentenceOf(event(over))).toBe(sentence);
  });

  it('name only what was said, and a seal that changed', () => {
    expect(factsOf(event({ location: 'shelf 4' }))).toEqual([]);
    const offer = event({
      kind: 'handed over',
      sealBefore: 'S-1',
      sealAfter: 'S-2',
      method: 'courier',
    });
    expect(factsOf(offer)).toEqual([
      { name: 'Seal', value: 'S-1 is now S-2' },
      { name: 'By', value: 'courier' },
    ]);
  });

  it('say of a late entry when it happened and how much later it was recorded', () => {
    expect(latenessOf(event({}))).toBe('');
    expect(latenessOf(event({ happenedAt: '2026-11-05T07:00:00Z' }))).toBe(
      'Late entry: happened 5 Nov 2026, 07:00 UTC, recorded 3 h later',
    );
    expect(latenessOf(event({ happenedAt: '2026-11-01T10:00:00Z' }))).toContain('4 days later');
  });

  it('call an offer overdue after two days', () => {
    const offered = '2026-11-05T10:00:00Z';
    expect(isOverdue(offered, Date.parse('2026-11-07T09:59:00Z'))).toBe(false);
    expect(isOverdue(offered, Date.parse('2026-11-07T10:01:00Z'))).toBe(true);
  });
});
