import type { ReleasedSummary } from '#shared/contracts/disclosure';
import { csv } from './csv';

/** What was left out, by number and reason, so that nobody can say it was hidden. */
export const withheldCsv = (items: ReleasedSummary['withheld']): string =>
  csv(
    ['exhibit', 'reason', 'explanation'],
    items.map((item) => [item.exhibit, item.reason, item.explanation]),
  );
