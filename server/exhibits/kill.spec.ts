import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { readdirSync } from 'node:fs';
import { request } from 'node:http';
import { join } from 'node:path';
import { setTimeout } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import type { Exhibit } from '#shared/contracts/exhibits';
import { verifyCase } from '../custody/verify-case';
import { DerivativeRecord, ExhibitFileRecord } from '../database/models/exhibit';
import { seeded } from '../ledger/testing';
import { startTestApi, testPassword, type TestApi } from '../testing/api';
import { openTestCase, type TestCase } from '../testing/factories';
import { sweepStore } from './sweep-store';
import { registerTestExhibit, testPicture } from './testing';

let api: TestApi;
let open: TestCase;
let exhibit: Exhibit;
beforeAll(async () => {
  api = await startTestApi();
  open = await openTestCase(api);
  exhibit = await registerTestExhibit(open.investigator, open.id, { kind: 'photographs' });
});
afterAll(() => api.stop());

/** A second server, in a process of its own, on the same database and store. */
async function startVictim(): Promise<{ process: ChildProcess; address: string }> {
  const { config } = api.services;
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    cwd: join(import.meta.dirname, '../..'),
    env: {
      ...process.env,
      NODE_ENV: 'test',
      DATABASE_URL: config.databaseUrl,
      DATABASE_OWNER_URL: config.databaseOwnerUrl,
      DATA_DIR: config.dataDir,
      WEB_DIR: '',
      PORT: '0',
      LOG_LEVEL: 'silent',
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const [line] = (await once(child.stdout, 'data')) as [Buffer];
  const address = /http:\/\/\S+/.exec(line.toString())?.[0];
  if (address === undefined) throw new Error(`No address in "${line.toString()}"`);
  return { process: child, address };
}

/** Sends a picture in small pieces; resolves when the server has ended or answered. */
async function sendSlowly(
  address: string,
  headers: Record<string, string>,
  bytes: Buffer,
): Promise<void> {
  const boundary = 'part-of-a-test';
  const body = Buffer.concat([
    Buffer.from(
      `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="p.jpg"\r\n\r\n`,
    ),
    bytes,
    Buffer.from(`\r\n--${boundary}--\r\n`),
  ]);
  const sending = request(`${address}/api/cases/${open.id}/exhibits/${exhibit.id}/files`, {
    method: 'POST',
    headers: {
      ...headers,
      'Content-Type': `multipart/form-data; boundary=${boundary}`,
      'Content-Length': body.length,
    },
  });
  const ended = new Promise<void>((done) => {
    sending.on('response', (answer) => answer.resume().on('close', done));
    sending.on('error', () => done());
  });
  const step = Math.ceil(body.length / 20);
  for (let from = 0; from < body.length; from += step) {
    sending.write(body.subarray(from, from + step));
    await setTimeout(5);
  }
  sending.end();
  await ended;
}

/** The cookie and token of somebody who is signed in at this server. */
async function entered(address: string): Promise<Record<string, string>> {
  const url = `${address}/api/session`;
  const read = async (answer: Response) => ({
    Cookie: answer.headers.getSetCookie()[0]?.split(';')[0] ?? '',
    'X-CSRF-Token': ((await answer.json()) as { csrfToken: string }).csrfToken,
  });
  const before = await read(await fetch(url));
  const body = { email: open.investigator.account?.email, password: testPassword };
  const answer = await fetch(url, {
    method: 'POST',
    headers: { ...before, 'Content-Type': 'application/json' },
    body: JSON.stringify(body),
  });
  return read(answer);
}

async function expectNothingHalf(): Promise<number> {
  const { store } = api.services;
  await sweepStore(api.services);
  expect(readdirSync(store.incomingDir)).toEqual([]);
  const files = await ExhibitFileRecord.findAll();
  const derivatives = await DerivativeRecord.findAll();
  const named = new Set([...files, ...derivatives].map(({ sha256 }) => sha256));
  for (const sha256 of named) expect((await store.measure(sha256))?.sha256).toBe(sha256);
  const kept = readdirSync(join(store.root, 'objects'), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map(({ name }) => name);
  expect(kept.sort()).toEqual([...named].sort());
  expect(derivatives).toHaveLength(3 * files.length);
  const report = await verifyCase(api.services, {
    caseId: open.id,
    caseNumber: open.file.number,
  });
  expect(report.findings).toEqual([]);
  return files.length;
}

describe('a server killed while it takes a picture in', () => {
  it('leaves the complete file or nothing at all (3 seeded moments)', async () => {
    const random = seeded(5);
    const before = await expectNothingHalf();
    // The sending alone takes 100 ms; the last picture has all the time that it needs.
    for (const [seed, wait] of [40, 250, null].entries()) {
      const victim = await startVictim();
      const headers = await entered(victim.address);
      const sending = sendSlowly(victim.address, headers, await testPicture(seed, {}, 900));
      if (wait === null) await sending;
      else await setTimeout(wait * (0.6 + 0.8 * random()));
      victim.process.kill('SIGKILL');
      await Promise.all([sending, once(victim.process, 'exit')]);
      await expectNothingHalf();
    }
    expect(await expectNothingHalf()).toBeGreaterThan(before);
  }, 240_000);
});
