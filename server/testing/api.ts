/**
 * Tests of the API run the real server in this process on a free port, against the real database.
 *
 *   const api = await startTestApi();              // once a file, in beforeAll; await api.stop() in afterAll
 *   const lead = await api.as('laboratory-lead');  // a new account, signed in
 *   await lead.post('/api/cases', { title: 'A', kind: 'other' }).expect(201)
 *
 * Each file gets an empty database of its own, migrated, and a data folder of its own. The database server's
 * owner address comes from CENTRODE_TEST_DATABASE (scripts/test.mjs sets it) or /tmp/centrode-test-db/url.json.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import request from 'supertest';
import { v7 as newId } from 'uuid';
import type { AccountRole } from '#shared/contracts/accounts';
import { createAccount } from '../accounts/accounts';
import { readConfig } from '../config';
import type { AccountRecord } from '../database/models/account';
import { createServices, listen, prepareDatabase } from '../start';
import type { Services } from '../services';
import { createTestDatabase } from './database';

export const testPassword = 'a password for tests';

export interface TestApi {
  readonly services: Services;
  readonly address: string;
  /** A new account of this role, signed in. */
  readonly as: (role: AccountRole, name?: string) => Promise<TestPerson>;
  /** Nobody: a browser without a session. */
  readonly nobody: () => TestPerson;
  readonly stop: () => Promise<void>;
}

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** One signed-in browser. Sends the CSRF token, and a fresh Idempotency-Key unless one is set. */
export class TestPerson {
  private readonly agent: ReturnType<typeof request.agent>;
  private csrfToken = '';

  constructor(
    address: string,
    readonly account: AccountRecord | null,
  ) {
    this.agent = request.agent(address);
  }

  /** The id of the account; empty for nobody. */
  get id(): string {
    return this.account?.id ?? '';
  }

  async signIn(): Promise<this> {
    this.csrfToken = (await this.agent.get('/api/session')).body.csrfToken as string;
    if (this.account) {
      const answer = await this.agent
        .post('/api/session')
        .set('X-CSRF-Token', this.csrfToken)
        .send({ email: this.account.email, password: testPassword })
        .expect(200);
      this.csrfToken = answer.body.csrfToken as string;
    }
    return this;
  }

  get = (path: string): request.Test => this.call('get', path);
  post = (path: string, body?: object): request.Test => this.call('post', path, body);
  put = (path: string, body: object, version: number): request.Test =>
    this.call('put', path, body).set('If-Match', `"${version}"`);
  patch = (path: string, body: object, version: number): request.Test =>
    this.call('patch', path, body).set('If-Match', `"${version}"`);
  delete = (path: string): request.Test => this.call('delete', path);

  /** A bare request with the token; for uploads (`.attach`) and odd headers. */
  call(method: Method, path: string, body?: object): request.Test {
    const test = this.agent[method](path).set('X-CSRF-Token', this.csrfToken);
    if (method !== 'get') test.set('Idempotency-Key', newId());
    return body === undefined ? test : test.send(body);
  }
}

export async function startTestApi(environment: Record<string, string> = {}): Promise<TestApi> {
  const database = await createTestDatabase();
  const dataDir = mkdtempSync(join(tmpdir(), 'centrode-test-'));
  const config = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: database.appUrl,
    DATABASE_OWNER_URL: database.ownerUrl,
    DATA_DIR: dataDir,
    WEB_DIR: '',
    PORT: '0',
    LOG_LEVEL: process.env['LOG_LEVEL'] ?? 'silent',
    ...environment,
  });
  await prepareDatabase(config);
  const running = await listen(createServices(config));
  let people = 0;
  return {
    services: running.services,
    address: running.address,
    as: async (role, name = `Person ${++people}`) => {
      const account = await createAccount({
        name,
        email: `${newId()}@test.example`,
        role,
        password: testPassword,
      });
      return new TestPerson(running.address, account).signIn();
    },
    nobody: () => new TestPerson(running.address, null),
    stop: async () => {
      await running.stop();
      await database.drop();
      rmSync(dataDir, { recursive: true, force: true });
    },
  };
}
