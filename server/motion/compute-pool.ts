import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { ComputeAnswer, ComputeTask } from './compute-worker';

/** From source, tsx loads the worker; the build lays it down as an entry of its own beside main.js. */
const fromSource = import.meta.url.endsWith('.ts');
const worker = new URL(
  fromSource ? './compute-worker.ts' : './motion/compute-worker.js',
  import.meta.url,
);

/** Idle threads keep nothing alive: the process may end with the pool as it is. */
let pool: Piscina<ComputeTask, ComputeAnswer> | undefined;

/** Computes in a worker thread, so that no request waits for another one's arithmetic. */
export function compute(task: ComputeTask): Promise<ComputeAnswer> {
  pool ??= new Piscina<ComputeTask, ComputeAnswer>({
    filename: fileURLToPath(worker),
    execArgv: fromSource ? ['--import', 'tsx'] : [],
    minThreads: 0,
    maxThreads: 2,
    idleTimeout: 60_000,
    maxQueue: 200,
    resourceLimits: { maxOldGenerationSizeMb: 512 },
  });
  return pool.run(task, { signal: AbortSignal.timeout(60_000) });
}
