import { describe, expect, it } from '@jest/globals';
import { caseSummaryOf } from '../../../test/web/records';
import { countByStage, inOrder, matches, slackOf, workInHand } from './workload';

const cases = [
  caseSummaryOf({ number: '2026-014', dueOn: '2026-12-18' }),
  caseSummaryOf({ number: '2026-011', title: 'Press 4, Fennel Works', dueOn: '2026-12-02' }),
  caseSummaryOf({ number: '2026-009', leadInvestigator: 'S. Lindqvist', stage: 'issued' }),
  caseSummaryOf({ number: '2026-016', leadInvestigator: null, stage: 'opened', dueOn: null }),
];

describe('the workload', () => {
  it('counts every stage, also the empty ones', () => {
    expect(countByStage(cases).map(({ count }) => count)).toEqual([1, 0, 2, 0, 1, 0, 0]);
  });

  it('counts work in hand by lead investigator; issued cases are done', () => {
    expect(workInHand(cases)).toEqual([{ name: 'E. Varo', count: 2, share: 1 }]);
  });

  it('says how many days are left, and nothing for work that is done', () => {
    expect(cases.map((item) => slackOf(item, '2026-12-04'))).toEqual([14, -2, null, null]);
  });

  it('finds a case by words of any of its texts', () => {
    expect(cases.filter((item) => matches(item, 'fennel varo'))).toHaveLength(1);
    expect(cases.filter((item) => matches(item, ''))).toHaveLength(4);
  });

  it('puts cases without a due date last in either direction', () => {
    const numbers = (descending: boolean) =>
      inOrder(cases, 'due', descending).map((item) => item.number);
    expect(numbers(false).slice(0, 2)).toEqual(['2026-011', '2026-014']);
    expect(numbers(true).slice(0, 2)).toEqual(['2026-014', '2026-011']);
  });
});
