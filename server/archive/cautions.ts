import type { ReleasedSummary } from '#shared/contracts/disclosure';

/** Said in every archive, besides the caution of the release itself. */
export const cautions: readonly string[] = [
  'The results depend on the measurements and assumptions that are listed here. A range holds only if these hold.',
  'They are for use by a qualified person who answers for them. They do not replace local law, codes or licensed practice.',
  'A person’s liberty may rest on a number in this archive. Recompute it, and look at the alternatives, before relying on it.',
  'Where a method is used outside its published range, the computation says so in its warnings.',
  'Exhibits may show injured people and may be distressing.',
  'If you visit the scene, see to traffic control first; before work on a machine, isolate it, lock it out and let stored energy go.',
  'The archive is for the party that is named on it. Give it on only as the court or the law allows.',
];

/** The two lines below the plan's title. */
export const planCaption = (summary: ReleasedSummary): [string, string] => [
  `${summary.laboratory}, ${summary.releasedAt.slice(0, 10)}`,
  `Release ${summary.releaseNumber} to ${summary.party}. Marks as measured, their uncertainties are in the table.`,
];
