import { QueryTypes, type Sequelize } from 'sequelize';
import { run } from './connection';
import { appendOnly } from './migrations/migration';

/**
 * Gives the application's account what it needs, table by table: rows of ordinary tables, and on
 * append-only tables only INSERT and SELECT. Without a second account there is nothing to give;
 * the triggers still refuse.
 */
export async function grantApplication(owner: Sequelize, applicationUrl: string): Promise<void> {
  const user = decodeURIComponent(new URL(applicationUrl).username);
  const database = owner.getDatabaseName();
  const [{ me }] = await owner.query<{ me: string }>('SELECT CURRENT_USER() AS me', {
    type: QueryTypes.SELECT,
  });
  const [ownerName, host] = me.split('@');
  if (ownerName === user || user === '') return;
  const tables = await owner.query<{ name: string; comment: string }>(
    `SELECT table_name AS name, table_comment AS comment FROM information_schema.tables
      WHERE table_schema = DATABASE() AND table_type = 'BASE TABLE'`,
    { type: QueryTypes.SELECT },
  );
  for (const { name, comment } of tables) {
    const rights =
      name === 'migrations'
        ? 'SELECT'
        : comment === appendOnly
          ? 'SELECT, INSERT'
          : 'SELECT, INSERT, UPDATE, DELETE';
    await run(owner, `GRANT ${rights} ON \`${database}\`.\`${name}\` TO '${user}'@'${host}'`);
  }
}
