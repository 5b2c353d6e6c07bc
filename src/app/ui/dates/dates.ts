const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const millisecondsPerDay = 86_400_000;

/** "2026-12-18" as "18 Dec 2026". A day has no zone, so it never goes through a `Date`. */
export function showDay(day: string): string {
  const [year, month, date] = day.split('-').map(Number);
  return `${date} ${months[(month ?? 1) - 1]} ${year}`;
}

/** Whole days from one day to another; negative when the second is earlier. */
export function daysBetween(from: string, to: string): number {
  return Math.round(
    (Date.parse(`${to}T00:00:00Z`) - Date.parse(`${from}T00:00:00Z`)) / millisecondsPerDay,
  );
}

/** A recorded moment in UTC, as it stands in the ledger and the log: "1 Dec 2026, 13:24 UTC". */
export function showMoment(moment: string): string {
  return `${showDay(moment.slice(0, 10))}, ${moment.slice(11, 16)} UTC`;
}

/** The same in two columns' width: "1 Dec 2026, 13:24:07 UTC". */
export function showExactMoment(moment: string): string {
  return `${showDay(moment.slice(0, 10))}, ${moment.slice(11, 19)} UTC`;
}

/** What a person typed by the clock of this device ("2026-12-01T13:24"), as a moment in UTC. */
export function utcFromLocal(text: string): string {
  return new Date(text).toISOString();
}
