import { createHash, randomBytes, randomUUID } from 'node:crypto';
import { hostname } from 'node:os';

const machine = createHash('sha256').update(hostname()).digest('hex').slice(0, 8);
/** Another number at every start: process ids come again, in containers at once. */
const run = randomBytes(4).toString('hex');

/** A new name for a file that arrives here; it tells which run of which process is writing it. */
export const incomingName = (): string => `${machine}-${process.pid}-${run}-${randomUUID()}`;

/** True if the run that wrote the file has ended for certain; of other machines nothing is certain. */
export function isAbandoned(name: string): boolean {
  const [where, pid, which] = name.split('-');
  if (where !== machine || which === run) return false;
  return Number(pid) === process.pid || !isAlive(Number(pid));
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    // Not ours to signal, but there.
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}
