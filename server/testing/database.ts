import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { connect, run } from '../database/connection';

interface TestDatabase {
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly drop: () => Promise<void>;
}

const standing = '/tmp/centrode-test-db/url.json';

/** The addresses of the test server's two accounts, without a database name. */
function addresses(): { owner: string; app: string } {
  const given = process.env['CENTRODE_TEST_DATABASE'];
  if (given !== undefined) return JSON.parse(given) as { owner: string; app: string };
  if (existsSync(standing)) {
    return JSON.parse(readFileSync(standing, 'utf8')) as { owner: string; app: string };
  }
  throw new Error('No test database: run the suite with `npm test`, which starts one.');
}

/** An empty database of its own for one test file. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const { owner, app } = addresses();
  const name = `centrode_test_${randomBytes(6).toString('hex')}`;
  const server = connect(owner);
  await run(server, `CREATE DATABASE ${name}`);
  await server.close();
  return {
    ownerUrl: owner + name,
    appUrl: app + name,
    drop: async () => {
      const again = connect(owner);
      await run(again, `DROP DATABASE ${name}`);
      await again.close();
    },
  };
}
