import type { Sequelize } from 'sequelize';
import { initAccessEvent } from './access-event';
import { initAccount } from './account';
import { initCases } from './case';
import { initComputation } from './computation';
import { initCustody } from './custody';
import { initExhibits } from './exhibit';
import { initFindings } from './findings';
import { initIdempotencyKey } from './idempotency-key';
import { initMarks } from './mark';
import { initNote } from './note';
import { initReconstruction } from './reconstruction';
import { initReleases } from './release';

/** Ties every model to a connection; a process works with one database at a time. */
export function initModels(sequelize: Sequelize): void {
  initAccount(sequelize);
  initCases(sequelize);
  initIdempotencyKey(sequelize);
  initAccessEvent(sequelize);
  initExhibits(sequelize);
  initCustody(sequelize);
  initMarks(sequelize);
  initReconstruction(sequelize);
  initComputation(sequelize);
  initFindings(sequelize);
  initNote(sequelize);
  initReleases(sequelize);
}
