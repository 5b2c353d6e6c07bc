import { describe, expect, it } from '@jest/globals';
import { type Decision, decisions } from './decisions';

describe('the decisions of a release', () => {
  const chosen = new Map<string, Decision>([
    ['1', { released: true }],
    ['2', { released: false, reason: 'privileged', explanation: '' }],
    ['3', { released: false, reason: null, explanation: 'later' }],
    ['4', { released: false, reason: 'other', explanation: ' ' }],
    ['5', { released: false, reason: 'other', explanation: ' held for another court ' }],
  ]);

  it('an exhibit is released, withheld with a reason, or holds the release back', () => {
    const outcome = decisions(['1', '2', '3', '4', '5', '6'], chosen);
    expect(outcome.released).toEqual(['1']);
    expect(outcome.withheld).toEqual([
      { exhibit: '2', reason: 'privileged', explanation: '' },
      { exhibit: '5', reason: 'other', explanation: 'held for another court' },
    ]);
    expect(outcome.open).toEqual(['3', '4', '6']);
  });
});
