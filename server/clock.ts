let last = 0;

/**
 * The server's time in UTC with six decimals. The clock itself gives milliseconds; the last three
 * digits only keep two events of one millisecond in the order in which they were recorded.
 */
export function now(): string {
  last = Math.max(Date.now() * 1000, last + 1);
  const seconds = new Date(Math.floor(last / 1000)).toISOString().slice(0, 23);
  return `${seconds}${String(last % 1000).padStart(3, '0')}Z`;
}
