import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import { QueryTypes, type Sequelize } from 'sequelize';
import { now } from '../clock';
import { AccessEventRecord } from '../database/models/access-event';

/** What happened, as the caller tells it. */
export interface AccessEvent {
  readonly actor: { readonly id: string; readonly name: string } | null;
  /** A verb in plain words: "signed in", "opened exhibit", "downloaded file", "refused". */
  readonly action: string;
  readonly caseId: string | null;
  /** The thing that it was done to, as people know it: "2026-014/3", "release 2". */
  readonly subject: string;
  readonly detail?: string;
}

interface Waiting {
  readonly event: AccessEvent;
  readonly done: () => void;
  readonly failed: (error: unknown) => void;
}

const mostAtOnce = 500;

/**
 * The laboratory's access log: one hash chain over everything that people did. Events that arrive
 * while a batch is being written go together into the next one, so that many readers at once cost
 * one locked append and not one each. `record` resolves when the event is on disk.
 */
export class AccessLog {
  private waiting: Waiting[] = [];
  private writing: Promise<void> | null = null;

  constructor(private readonly sequelize: Sequelize) {}

  record(event: AccessEvent): Promise<void> {
    return new Promise((done, failed) => {
      this.waiting.push({ event, done, failed });
      this.writing ??= this.drain();
    });
  }

  /** Resolves when nothing waits any more. */
  async idle(): Promise<void> {
    while (this.writing) await this.writing;
  }

  private async drain(): Promise<void> {
    while (this.waiting.length > 0) {
      const batch = this.waiting.splice(0, mostAtOnce);
      try {
        await this.append(batch.map((item) => item.event));
        for (const item of batch) item.done();
      } catch (error) {
        for (const item of batch) item.failed(error);
      }
    }
    this.writing = null;
  }

  private async append(events: readonly AccessEvent[]): Promise<void> {
    await this.sequelize.transaction(async (transaction) => {
      const [head] = await this.sequelize.query<{ sequence: number; hash: string }>(
        'SELECT sequence, hash FROM access_head WHERE id = 1 FOR UPDATE',
        { type: QueryTypes.SELECT, transaction },
      );
      let sequence = Number(head.sequence);
      let previous = head.hash;
      const rows = events.map((event) => {
        sequence += 1;
        const canonical = canonicalText(event, sequence, previous);
        previous = createHash('sha256').update(canonical).digest('hex');
        return {
          sequence,
          caseId: event.caseId,
          actorId: event.actor?.id ?? null,
          action: event.action,
          canonical,
          hash: previous,
        };
      });
      await AccessEventRecord.bulkCreate(rows, { transaction });
      await this.sequelize.query('UPDATE access_head SET sequence = ?, hash = ? WHERE id = 1', {
        type: QueryTypes.UPDATE,
        replacements: [sequence, previous],
        transaction,
      });
    });
  }
}

function canonicalText(event: AccessEvent, sequence: number, previous: string): string {
  const text = canonicalize({
    format: 'centrode.access-event/1',
    sequence,
    at: now(),
    actor: event.actor ? { id: event.actor.id, name: event.actor.name } : null,
    action: event.action,
    caseId: event.caseId,
    subject: event.subject,
    detail: event.detail ?? '',
    previous,
  });
  if (text === undefined) throw new Error('An access event cannot be written as JSON');
  return text;
}
