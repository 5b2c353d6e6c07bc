import { Op } from 'sequelize';
import * as z from 'zod';
import type { LoggedEvent } from '#shared/contracts/log';
import type { CaseScope } from '../cases/scope';
import { AccessEventRecord } from '../database/models/access-event';
import { badRequest } from '../http/problems';

/** What the kept text of an access event tells a reader of the case. */
const kept = z.object({
  sequence: z.int(),
  at: z.string(),
  actor: z.object({ name: z.string() }).nullable(),
  action: z.string(),
  subject: z.string(),
  detail: z.string(),
});

/** A page of what was done in a case, newest first; each is read from its hashed text. */
export async function eventsOf(
  scope: CaseScope,
  { after, limit }: { after?: string; limit: number },
): Promise<{ items: LoggedEvent[]; next: string | null }> {
  if (after !== undefined && !/^\d{1,15}$/.test(after)) {
    throw badRequest('"after" must be the number of an event.');
  }
  const records = await AccessEventRecord.findAll({
    where: {
      caseId: scope.caseId,
      ...(after === undefined ? {} : { sequence: { [Op.lt]: Number(after) } }),
    },
    attributes: ['canonical'],
    order: [['sequence', 'DESC']],
    limit: limit + 1,
    raw: true,
  });
  const items = records.slice(0, limit).map(({ canonical }) => {
    const { actor, ...event } = kept.parse(JSON.parse(canonical));
    return { ...event, actor: actor?.name ?? '' };
  });
  return { items, next: records.length > limit ? String(items.at(-1)?.sequence) : null };
}
