import { describe, expect, it } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import { connect, run } from '#server/database/connection';
import { grantApplication } from '#server/database/grants';
import { migrator } from '#server/database/migrate';
import { migrations } from '#server/database/migrations/index';
import { createTestDatabase } from '#server/testing/database';

const tablesOf = async (sequelize: ReturnType<typeof connect>): Promise<string[]> =>
  (
    await sequelize.query<{ name: string }>(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() ORDER BY 1',
      { type: QueryTypes.SELECT },
    )
  ).map((row) => row.name);

describe('the schema', () => {
  it('goes all the way up, all the way down, and up again to the same tables', async () => {
    const database = await createTestDatabase();
    const owner = connect(database.ownerUrl);
    try {
      await migrator(owner).up();
      const before = await tablesOf(owner);
      expect(before.length).toBeGreaterThan(8);
      await migrator(owner).down({ to: 0 });
      expect(await tablesOf(owner)).toEqual(['migrations']);
      await migrator(owner).up();
      expect(await tablesOf(owner)).toEqual(before);
      expect(new Set(migrations.map((m) => m.name)).size).toBe(migrations.length);
    } finally {
      await owner.close();
      await database.drop();
    }
  });

  it('refuses changes of append-only rows to the application and to the owner', async () => {
    const database = await createTestDatabase();
    const owner = connect(database.ownerUrl);
    const application = connect(database.appUrl);
    try {
      await migrator(owner).up();
      await grantApplication(owner, database.appUrl);
      const insert = `INSERT INTO access_events (sequence, action, canonical, hash) VALUES (1, 'x', '{}', '${'0'.repeat(64)}')`;
      await run(application, insert);
      for (const statement of [
        "UPDATE access_events SET action = 'y'",
        'DELETE FROM access_events',
      ]) {
        await expect(run(application, statement)).rejects.toThrow(/denied/);
        await expect(run(owner, statement)).rejects.toThrow(/append-only/);
      }
      await expect(run(application, 'DROP TABLE access_events')).rejects.toThrow(/denied/);
      await expect(run(application, 'DROP TRIGGER access_events_refuse_update')).rejects.toThrow(
        /denied/,
      );
    } finally {
      await application.close();
      await owner.close();
      await database.drop();
    }
  });
});
