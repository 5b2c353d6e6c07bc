import { QueryTypes, Sequelize } from 'sequelize';
import type { Logger } from 'pino';

/**
 * A pool on MariaDB. A database that hangs must not hang requests for ever, so every wait is bounded.
 * READ COMMITTED: each change of state locks the rows that it depends on, and sees them as they are.
 */
export function connect(url: string, log?: Logger): Sequelize {
  return new Sequelize(url, {
    dialect: 'mariadb',
    logging: log ? (sql) => log.trace({ sql }, 'query') : false,
    pool: { max: 12, min: 0, acquire: 5000, idle: 10_000 },
    isolationLevel: 'READ COMMITTED',
    timezone: '+00:00',
    dialectOptions: {
      connectTimeout: 2000,
      socketTimeout: 30_000,
      checkNumberRange: true,
      bigIntAsNumber: true,
      insertIdAsNumber: true,
    },
    define: { underscored: true, timestamps: false, freezeTableName: true },
  });
}

/** Runs one statement of a migration. Without a type, Sequelize 6 trips over the driver's answer. */
export async function run(sequelize: Sequelize, sql: string): Promise<void> {
  await sequelize.query(sql, { type: QueryTypes.RAW });
}
