import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { Inspection, InspectionTask } from './inspect-worker';

/** As TypeScript beside this file, or as built from it (scripts/build.mjs). */
const fromSource = import.meta.url.endsWith('.ts');
const workerFile = fileURLToPath(
  new URL(fromSource ? './inspect-worker.ts' : './store/inspect-worker.js', import.meta.url),
);

const seconds = 30;

/**
 * Looks into files that strangers may have made, in a thread of its own with limits of time and
 * memory: whatever a file does to the libraries, the server goes on.
 */
export class Inspector {
  private pool: Piscina<InspectionTask, Inspection> | null = null;

  async inspect(task: InspectionTask): Promise<Inspection> {
    const limit = AbortSignal.timeout(seconds * 1000);
    try {
      this.pool ??= makePool();
      return await this.pool.run(task, { signal: limit });
    } catch (error) {
      if (limit.aborted) {
        return { refused: `The file could not be looked into within ${seconds} seconds.` };
      }
      if ((error as NodeJS.ErrnoException).code === 'ERR_WORKER_OUT_OF_MEMORY') {
        return { refused: 'Looking into the file takes more memory than is allowed.' };
      }
      throw error;
    }
  }

  async close(): Promise<void> {
    await this.pool?.destroy();
    this.pool = null;
  }
}

const makePool = (): Piscina<InspectionTask, Inspection> =>
  new Piscina({
    filename: workerFile,
    execArgv: fromSource ? ['--import', 'tsx'] : [],
    minThreads: 0,
    maxThreads: 2,
    idleTimeout: 20_000,
    resourceLimits: { maxOldGenerationSizeMb: 256 },
  });
