import type { Sequelize } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';
import { migrations } from './migrations';

/** Umzug over the owner's connection. */
export function migrator(owner: Sequelize): Umzug<Sequelize> {
  return new Umzug<Sequelize>({
    migrations: migrations.map((migration) => ({
      name: migration.name,
      up: () => migration.up(owner),
      down: () => migration.down(owner),
    })),
    context: owner,
    storage: new SequelizeStorage({ sequelize: owner, tableName: 'migrations' }),
    logger: undefined,
  });
}
