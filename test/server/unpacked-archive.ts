import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import type { ArchiveSource } from '#server/archive/archive-source';
import { buildArchive } from '#server/archive/build-archive';
import { archiveFixture } from '../fixtures/archive';
import { armComputations } from '../fixtures/computations';
import { bundleTools } from '../../scripts/bundle-tools.mjs';

const run = promisify(execFile);
const packages: Record<string, string> = {
  '7z': 'p7zip-full',
  sh: 'dash',
  openssl: 'openssl',
  python3: 'python3',
  sha256sum: 'coreutils',
  sha512sum: 'coreutils',
  unzip: 'unzip',
};

interface Outcome {
  readonly code: number;
  readonly output: string;
}

/** Runs a program in an empty environment; one that is missing fails the test and says what to install. */
export async function ordinary(program: string, args: string[], cwd: string): Promise<Outcome> {
  try {
    const { stdout, stderr } = await run(program, args, { cwd, env: { PATH: '/usr/bin:/bin' } });
    return { code: 0, output: stdout + stderr };
  } catch (error) {
    const failed = error as { code?: unknown; stdout?: string; stderr?: string };
    if (failed.code === 'ENOENT') {
      throw new Error(`"${program}" is not here. Install Debian's package ${packages[program]}.`);
    }
    return { code: Number(failed.code), output: `${failed.stdout}${failed.stderr}` };
  }
}

/** The verifier that shares nothing with the program that made the bag. */
export const independentVerifier = (bag: string): Promise<Outcome> =>
  ordinary('python3', ['-I', join(process.cwd(), 'test/verify_bag.py'), bag], bag);

export interface UnpackedArchive {
  /** A folder for the test's own files. */
  readonly folder: string;
  readonly source: ArchiveSource;
  readonly zip: string;
  readonly bag: string;
  readonly remove: () => Promise<void>;
}

/** Builds the archive of the fixture, with its real tools, and unpacks it with unzip. */
export async function unpackArchive(): Promise<UnpackedArchive> {
  const folder = await mkdtemp(join(tmpdir(), 'centrode-archive-'));
  await bundleTools(join(folder, 'tools'));
  const tool = (name: string) => readFile(join(folder, 'tools', `${name}.mjs`), 'utf8');
  const source = archiveFixture({
    computations: armComputations(),
    tools: { verify: await tool('verify'), recompute: await tool('recompute') },
  });
  const zip = join(folder, 'release.zip');
  await buildArchive(source, zip);
  await ordinary('unzip', ['-q', zip], folder);
  return {
    folder,
    source,
    zip,
    bag: join(folder, '2026-014-release-2'),
    remove: () => rm(folder, { recursive: true, force: true }),
  };
}
