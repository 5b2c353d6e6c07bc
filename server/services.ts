import type { Logger } from 'pino';
import type { Sequelize } from 'sequelize';
import type { AccessLog } from './access-log/access-log';
import type { Config } from './config';

/** What use cases work with; made once in main.ts, or by a test. */
export interface Services {
  readonly config: Config;
  readonly log: Logger;
  readonly sequelize: Sequelize;
  readonly accessLog: AccessLog;
}
