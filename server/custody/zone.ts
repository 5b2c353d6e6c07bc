import type { Request } from 'express';

/**
 * The time zone in which a person works, as their browser names it ("Europe/Lisbon"). It is recorded
 * beside the UTC time; a name that this machine does not know counts as not told.
 */
export function zoneOf(request: Request): string {
  const name = request.get('Time-Zone') ?? '';
  if (name === '' || name.length > 60) return 'UTC';
  try {
    return new Intl.DateTimeFormat('en', { timeZone: name }).resolvedOptions().timeZone;
  } catch {
    return 'UTC';
  }
}
