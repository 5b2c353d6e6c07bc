import type { LedgerEvent } from '#shared/contracts/custody';
import { showMoment } from '../../ui/dates/dates';

/** What happened, in one sentence. */
export function sentenceOf(event: LedgerEvent): string {
  const { releasedBy, receivedBy, location, sealAfter, sealBefore } = event;
  switch (event.kind) {
    case 'collected':
      return `Collected${by(receivedBy)}${at(location)}`;
    case 'received':
      return `Received by ${receivedBy ?? event.recordedBy.name}${from(releasedBy)}`;
    case 'stored':
      return `Stored${at(location)}`;
    case 'handed over':
      return `Offered by ${releasedBy ?? event.recordedBy.name} to ${receivedBy ?? 'somebody'}`;
    case 'accepted':
      return `Accepted by ${receivedBy ?? event.recordedBy.name}${from(releasedBy)}`;
    case 'refused':
      return event.purpose === 'withdrawn by the giver'
        ? `Offer withdrawn by ${event.recordedBy.name}`
        : `Refused by ${event.recordedBy.name}; ${releasedBy ?? 'the giver'} goes on holding it`;
    case 'examined':
      return 'Examined';
    case 'sampled':
      return 'A sample was taken';
    case 'sealed':
      return `Sealed with ${sealAfter}`;
    case 'opened':
      return sealBefore === '' ? 'Opened' : `Seal ${sealBefore} opened`;
    case 'returned':
      return `Returned${receivedBy === null ? '' : ` to ${receivedBy}`}`;
    case 'disposed':
      return 'Disposed of';
    case 'transferred out':
      return `Left the laboratory${receivedBy === null ? '' : `, to ${receivedBy}`}`;
    case 'file taken in':
      return event.files.length === 1
        ? `File "${event.files[0]?.name ?? ''}" taken in`
        : `${event.files.length} files taken in`;
    case 'integrity checked':
      return 'Ledger and files checked';
    case 'released':
      return `Released${receivedBy === null ? '' : ` to ${receivedBy}`}`;
    case 'corrected':
      return event.refersTo === null ? 'Corrected' : `Correction of event ${event.refersTo}`;
  }
}

export interface EventFact {
  readonly name: string;
  readonly value: string;
}

/** What else was recorded with an event; only what was said. */
export function factsOf(event: LedgerEvent): EventFact[] {
  const facts: EventFact[] = [
    { name: 'Purpose', value: event.kind === 'refused' ? '' : event.purpose },
    { name: 'Condition', value: event.condition },
    { name: 'Seal', value: sealChange(event) },
    { name: 'Place', value: ['stored', 'collected'].includes(event.kind) ? '' : event.location },
    { name: 'By', value: event.method === 'none' || event.method === 'hand' ? '' : event.method },
    { name: 'Tracking', value: event.tracking },
    { name: 'Note', value: event.note },
  ];
  return facts.filter(({ value }) => value !== '');
}

/** A late entry says when it happened and by how much the record came later. */
export function latenessOf({ happenedAt, recordedAt }: LedgerEvent): string {
  if (happenedAt === null) return '';
  const hours = (Date.parse(recordedAt) - Date.parse(happenedAt)) / 3_600_000;
  const later =
    hours >= 48
      ? `${Math.round(hours / 24)} days`
      : hours >= 1
        ? `${Math.round(hours)} h`
        : `${Math.max(0, Math.round(hours * 60))} min`;
  return `Late entry: happened ${showMoment(happenedAt)}, recorded ${later} later`;
}

/** An acceptance is overdue when an offer has waited this long (our own choice). */
export const overdueHours = 48;

export const isOverdue = (offeredAt: string, now: number): boolean =>
  now - Date.parse(offeredAt) > overdueHours * 3_600_000;

function sealChange({ sealBefore, sealAfter, kind }: LedgerEvent): string {
  if (kind === 'sealed' || kind === 'opened' || sealBefore === sealAfter) return '';
  if (sealBefore === '') return sealAfter;
  return sealAfter === '' ? `${sealBefore} removed` : `${sealBefore} is now ${sealAfter}`;
}

const by = (name: string | null): string => (name === null ? '' : ` by ${name}`);
const from = (name: string | null): string => (name === null ? '' : ` from ${name}`);
const at = (place: string): string => (place === '' ? '' : `: ${place}`);
