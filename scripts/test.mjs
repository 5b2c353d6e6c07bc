/**
 * `npm test`: types, lint, every spec on a MariaDB of its own, then the built application driven in
 * a browser. Ends with one line, `N passed, N failed`.
 *
 *   npm test                    everything
 *   npm test -- --no-browser    without the browser suite
 */
import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  checkNode,
  installPackages,
  installPrograms,
  root,
  runScript,
  say,
  toTest,
} from './prepare.mjs';

const counts = { passed: 0, failed: 0 };

await runScript(async () => {
  checkNode();
  installPackages();
  installPrograms(toTest);
  const { startMariadb } = await import('./mariadb.mjs');
  const folder = mkdtempSync(join(tmpdir(), 'centrode-suite-'));
  const database = await startMariadb({ folder: join(folder, 'mariadb'), durable: false });
  try {
    for (const part of ['shared', 'server', 'spec', 'e2e']) {
      check(`types, ${part}`, 'node_modules/typescript/bin/tsc', [
        '-p',
        `tsconfig.${part}.json`,
        '--noEmit',
      ]);
    }
    check('lint', 'node_modules/eslint/bin/eslint.js', ['.', '--max-warnings=0']);
    check('format', 'node_modules/prettier/bin/prettier.cjs', [
      '--check',
      '--log-level=warn',
      '{src,server,shared,test,scripts}/**/*.{ts,mjs,html,scss}',
    ]);
    const { build } = await import('./build.mjs');
    await build();
    specs(folder, {
      CENTRODE_TEST_DATABASE: JSON.stringify({
        owner: database.url('owner', ''),
        app: database.url('app', ''),
      }),
    });
    if (!process.argv.includes('--no-browser')) browser(folder, database);
  } catch (error) {
    counts.failed += 1;
    process.stderr.write(`${error.message}\n`);
  } finally {
    await database.stop();
    rmSync(folder, { recursive: true, force: true });
  }
  say(`${counts.passed} passed, ${counts.failed} failed`);
  if (counts.failed > 0 || counts.passed === 0) process.exitCode = 1;
});

function node(args, env = {}) {
  const run = spawnSync(process.execPath, args, {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, ...env },
  });
  return run.status === 0;
}

function check(name, program, args) {
  const good = node([program, ...args]);
  counts[good ? 'passed' : 'failed'] += 1;
  say(`${good ? 'passed' : 'FAILED'}: ${name}`);
}

function specs(folder, env) {
  const file = join(folder, 'jest.json');
  node(
    [
      '--experimental-vm-modules',
      '--disable-warning=ExperimentalWarning',
      'node_modules/jest/bin/jest.js',
      '--ci',
      '--json',
      `--outputFile=${file}`,
      '--workerIdleMemoryLimit=1GB',
    ],
    env,
  );
  const result = JSON.parse(readFileSync(file, 'utf8'));
  counts.passed += result.numPassedTests;
  counts.failed += result.numFailedTests + result.numRuntimeErrorTestSuites;
}

/** The built server with the demo laboratory, in a data folder that is thrown away. */
function browser(folder, database) {
  mkdirSync(join(root, 'test-results'), { recursive: true });
  const file = join(folder, 'browser.json');
  writeFileSync(file, '{}');
  node(['node_modules/@playwright/test/cli.js', 'test', '-c', 'test/e2e/playwright.config.ts'], {
    CENTRODE_E2E_FOLDER: folder,
    CENTRODE_E2E_DATABASE: JSON.stringify({ app: database.appUrl, owner: database.ownerUrl }),
    PLAYWRIGHT_JSON_OUTPUT_NAME: file,
  });
  const { stats } = JSON.parse(readFileSync(file, 'utf8'));
  if (!stats) throw new Error('The browser suite did not run.');
  counts.passed += stats.expected;
  counts.failed += stats.unexpected + stats.flaky;
}
