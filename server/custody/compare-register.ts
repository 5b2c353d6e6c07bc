import { ledgerEvent, type LedgerEvent, type LedgerFinding } from '#shared/contracts/custody';
import type { ExhibitFileRecord, ExhibitRecord } from '../database/models/exhibit';
import type { LedgerRow } from '../ledger/verify';

/** Events that can be read; the verifier names the others. */
export function readableEvents(rows: readonly LedgerRow[]): LedgerEvent[] {
  return rows.flatMap(({ text }) => {
    try {
      const parsed = ledgerEvent.safeParse(JSON.parse(text ?? ''));
      return parsed.success ? [parsed.data] : [];
    } catch {
      return [];
    }
  });
}

/** Where an item is after its events. */
interface Standing {
  holderId: string | null;
  location: string;
  seal: string;
  pendingSequence: number | null;
}

/** Follows the events of one exhibit; what the register repeats must come out the same. */
export function standingAfter(events: readonly LedgerEvent[]): Standing {
  const standing: Standing = { holderId: null, location: '', seal: '', pendingSequence: null };
  for (const event of events) {
    if (event.kind === 'collected') continue;
    standing.seal = event.sealAfter;
    standing.location = event.location;
    if (event.kind === 'received' || event.kind === 'accepted') {
      standing.holderId = event.recordedBy.id;
    }
    if (event.kind === 'handed over') standing.pendingSequence = event.sequence;
    if (event.kind === 'accepted' || event.kind === 'refused') standing.pendingSequence = null;
  }
  return standing;
}

/** The register's columns of each exhibit against what the ledger says of it. */
export function compareRegister(
  events: readonly LedgerEvent[],
  exhibits: readonly ExhibitRecord[],
): LedgerFinding[] {
  const byExhibit = grouped(events);
  const known = new Set(exhibits.map(({ number }) => number));
  const removed = [...byExhibit.keys()]
    .filter((number) => !known.has(number))
    .map((number) =>
      differs(byExhibit, number, `${number} is in the ledger and not in the register.`),
    );
  const differing = exhibits.flatMap((exhibit) => {
    const own = byExhibit.get(exhibit.number) ?? [];
    if (own.length === 0) {
      return [
        differs(
          byExhibit,
          exhibit.number,
          `${exhibit.number} is in the register and not in the ledger.`,
        ),
      ];
    }
    const standing = standingAfter(own);
    const names = [
      standing.holderId === exhibit.holderId ? '' : 'holder',
      standing.location === exhibit.location ? '' : 'location',
      standing.seal === exhibit.seal ? '' : 'seal',
      standing.pendingSequence === exhibit.pendingSequence ? '' : 'pending hand-over',
    ].filter((name) => name !== '');
    const message = `The register of ${exhibit.number} differs from the ledger in: ${names.join(', ')}.`;
    return names.length === 0 ? [] : [differs(byExhibit, exhibit.number, message)];
  });
  return [...removed, ...differing];
}

/** Each file that the ledger took in has its row, and each row its event. */
export function compareFileRows(
  events: readonly LedgerEvent[],
  rows: readonly ExhibitFileRecord[],
  exhibits: readonly ExhibitRecord[],
): LedgerFinding[] {
  const numberOf = new Map(exhibits.map(({ id, number }) => [id, number]));
  const keyOf = (sequence: number, exhibit: string | null | undefined, file: FileKey): string =>
    JSON.stringify([sequence, exhibit, file.name, Number(file.size), file.sha256, file.sha512]);
  const recorded = new Map(
    events
      .filter(({ kind }) => kind === 'file taken in')
      .flatMap((event) =>
        event.files.map((file) => [keyOf(event.sequence, event.exhibit, file), { event, file }]),
      ),
  );
  const kept = new Map(
    rows.map((row) => [keyOf(row.eventSequence, numberOf.get(row.exhibitId), row), row]),
  );
  const lost = [...recorded].flatMap(([key, { event, file }]): LedgerFinding[] => {
    const message = `The row of file "${file.name}" (event ${event.sequence}) was removed or changed.`;
    return kept.has(key) ? [] : [{ code: 'columns-differ', sequence: event.sequence, message }];
  });
  const forged = [...kept].flatMap(([key, row]): LedgerFinding[] => {
    const message = `The row of file "${row.name}" does not say what event ${row.eventSequence} says.`;
    return recorded.has(key)
      ? []
      : [{ code: 'columns-differ', sequence: row.eventSequence, message }];
  });
  return [...lost, ...forged];
}

type FileKey = Pick<ExhibitFileRecord, 'name' | 'size' | 'sha256' | 'sha512'>;

function grouped(events: readonly LedgerEvent[]): Map<string, LedgerEvent[]> {
  const groups = new Map<string, LedgerEvent[]>();
  for (const event of events) {
    if (event.exhibit === null) continue;
    const group = groups.get(event.exhibit);
    if (group) group.push(event);
    else groups.set(event.exhibit, [event]);
  }
  return groups;
}

const differs = (
  events: ReadonlyMap<string, LedgerEvent[]>,
  number: string,
  message: string,
): LedgerFinding => ({
  code: 'columns-differ',
  sequence: events.get(number)?.at(-1)?.sequence ?? null,
  message,
});
