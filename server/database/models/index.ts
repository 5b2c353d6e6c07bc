import type { Sequelize } from 'sequelize';
import { initAccessEvent } from './access-event';
import { initAccount } from './account';
import { initCases } from './case';
import { initIdempotencyKey } from './idempotency-key';

/** Ties every model to a connection; a process works with one database at a time. */
export function initModels(sequelize: Sequelize): void {
  initAccount(sequelize);
  initCases(sequelize);
  initIdempotencyKey(sequelize);
  initAccessEvent(sequelize);
}
