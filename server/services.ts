import type { Logger } from 'pino';
import type { Sequelize } from 'sequelize';
import type { AccessLog } from './access-log/access-log';
import type { Config } from './config';
import type { ArchiveJobs } from './disclosure/archive-jobs';
import type { SigningKey } from './ledger/head';
import type { FileStore } from './store/file-store';
import type { Inspector } from './store/inspector';

/** What use cases work with; made once in main.ts, or by a test. */
export interface Services {
  readonly config: Config;
  readonly log: Logger;
  readonly sequelize: Sequelize;
  readonly accessLog: AccessLog;
  /** Exhibits' files and what was made from them, by the hash of their content. */
  readonly store: FileStore;
  /** Looks into files in a thread of its own. */
  readonly inspector: Inspector;
  /** Signs the custody ledger's heads. */
  readonly signingKey: SigningKey;
  /** Where that key lies, with the public parts of earlier ones. */
  readonly keysDir: string;
  /** Builds the archives of releases beside the ordinary work. */
  readonly archives: ArchiveJobs;
}
