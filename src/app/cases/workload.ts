import { type CaseStage, type CaseSummary, caseStages } from '#shared/contracts/cases';
import { daysBetween } from '../ui/dates/dates';

export interface StageCount {
  readonly stage: CaseStage;
  readonly count: number;
}

export interface PersonLoad {
  readonly name: string;
  readonly count: number;
  /** 0 to 1, of the person with most cases. */
  readonly share: number;
}

/** Cases on which work is still to do. */
const working: readonly CaseStage[] = [
  'opened',
  'assigned',
  'in-examination',
  'in-technical-review',
];

export const isInWork = (item: CaseSummary): boolean => working.includes(item.stage);

export function countByStage(cases: readonly CaseSummary[]): StageCount[] {
  return caseStages.map((stage) => ({
    stage,
    count: cases.filter((item) => item.stage === stage).length,
  }));
}

/** Cases in hand of each lead investigator, most first. */
export function workInHand(cases: readonly CaseSummary[]): PersonLoad[] {
  const counts = new Map<string, number>();
  for (const item of cases.filter(isInWork)) {
    if (item.leadInvestigator === null) continue;
    counts.set(item.leadInvestigator, (counts.get(item.leadInvestigator) ?? 0) + 1);
  }
  const most = Math.max(1, ...counts.values());
  return [...counts]
    .map(([name, count]) => ({ name, count, share: count / most }))
    .sort((a, b) => b.count - a.count || a.name.localeCompare(b.name));
}

/** Days from today to the due date of work that is not done; null when nothing is due. */
export function slackOf(item: CaseSummary, today: string): number | null {
  return item.dueOn === null || !isInWork(item) ? null : daysBetween(today, item.dueOn);
}

export function matches(item: CaseSummary, text: string): boolean {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean);
  const subject = [item.number, item.title, item.kind, item.leadInvestigator ?? '']
    .join(' ')
    .toLowerCase();
  return words.every((word) => subject.includes(word));
}

export type CaseOrder = 'number' | 'title' | 'lead' | 'stage' | 'due';

/** A new list in the wanted order; cases without a value come last either way. */
export function inOrder(
  cases: readonly CaseSummary[],
  order: CaseOrder,
  descending: boolean,
): CaseSummary[] {
  const keyOf = (item: CaseSummary): string | null => {
    switch (order) {
      case 'number':
        return item.number;
      case 'title':
        return item.title.toLowerCase();
      case 'lead':
        return item.leadInvestigator;
      case 'stage':
        return String(caseStages.indexOf(item.stage));
      case 'due':
        return isInWork(item) ? item.dueOn : null;
    }
  };
  return [...cases].sort((a, b) => {
    const [x, y] = [keyOf(a), keyOf(b)];
    if (x === null || y === null) return Number(x === null) - Number(y === null);
    return descending ? y.localeCompare(x) : x.localeCompare(y);
  });
}
