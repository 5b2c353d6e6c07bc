import { createAccountsAndCases } from './2026-12-01-0100-create-accounts-and-cases';
import { createExhibitsAndCustody } from './2026-12-01-0200-create-exhibits-and-custody';
import { createMarksAndReconstructions } from './2026-12-01-0300-create-marks-and-reconstructions';
import { createFindingsNotesAndReleases } from './2026-12-01-0400-create-findings-notes-and-releases';
import type { Migration } from './migration';

/** In order; a migration that has been released is never changed. */
export const migrations: readonly Migration[] = [
  createAccountsAndCases,
  createExhibitsAndCustody,
  createMarksAndReconstructions,
  createFindingsNotesAndReleases,
];
