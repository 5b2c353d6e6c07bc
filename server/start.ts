import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import pino from 'pino';
import { QueryTypes } from 'sequelize';
import { AccessLog } from './access-log/access-log';
import { createApp } from './app';
import type { Config } from './config';
import { connect } from './database/connection';
import { grantApplication } from './database/grants';
import { migrator } from './database/migrate';
import { initModels } from './database/models';
import { ArchiveJobs } from './disclosure/archive-jobs';
import { sweepStore } from './exhibits/sweep-store';
import { openSigningKey } from './ledger/signing-key';
import type { Services } from './services';
import { FileStore } from './store/file-store';
import { Inspector } from './store/inspector';

export interface Running {
  readonly address: string;
  readonly services: Services;
  /** Ends open requests, writes what waits, closes the database. */
  readonly stop: () => Promise<void>;
}

/** Brings the database up to date, as its owner. */
export async function prepareDatabase(config: Config): Promise<void> {
  const owner = connect(config.databaseOwnerUrl);
  try {
    await migrator(owner).up();
    await grantApplication(owner, config.databaseUrl);
  } finally {
    await owner.close();
  }
}

/** Connects, and makes what use cases work with. */
export function createServices(config: Config): Services {
  const log = pino({ level: config.logLevel });
  const sequelize = connect(config.databaseUrl, log);
  initModels(sequelize);
  const keysDir = join(config.dataDir, 'keys');
  const services = {
    config,
    log,
    sequelize,
    accessLog: new AccessLog(sequelize),
    store: new FileStore(join(config.dataDir, 'store')),
    inspector: new Inspector(),
    signingKey: openSigningKey(keysDir),
    keysDir,
  };
  return { ...services, archives: new ArchiveJobs(services) };
}

/** Serves until stopped. */
export async function listen(services: Services): Promise<Running> {
  const { config, sequelize, accessLog } = services;
  await sequelize.query('DELETE FROM sessions WHERE expires < UTC_TIMESTAMP()', {
    type: QueryTypes.DELETE,
  });
  await sweepStore(services);
  await services.archives.resume();
  const app = createApp(services);
  const server = await new Promise<Server>((done, failed) => {
    const listening = app.listen(config.port, config.host, (error?: Error) => {
      if (error) failed(error);
      else done(listening);
    });
  });
  // A slow sender is given up after five minutes of headers or silence, not for ever.
  server.headersTimeout = 60_000;
  server.requestTimeout = 0;
  server.timeout = 300_000;
  const { port } = server.address() as AddressInfo;
  return {
    address: `http://${config.host}:${port}`,
    services,
    stop: async () => {
      const closed = new Promise((done) => server.close(done));
      server.closeIdleConnections();
      const patience = setTimeout(() => server.closeAllConnections(), 5000);
      await closed;
      clearTimeout(patience);
      await services.archives.stop();
      await accessLog.idle();
      await services.inspector.close();
      await sequelize.close();
    },
  };
}
