import { createAccountsAndCases } from './2026-12-01-0100-create-accounts-and-cases';
import { createMarksAndReconstructions } from './2026-12-01-0300-create-marks-and-reconstructions';
import type { Migration } from './migration';

/** In order; a migration that has been released is never changed. */
export const migrations: readonly Migration[] = [
  createAccountsAndCases,
  createMarksAndReconstructions,
];
