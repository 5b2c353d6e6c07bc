import {
  answerHandOver,
  handOver,
  listReceivers,
  readLedger,
  recordCustody,
  verifyLedger,
  type LedgerReport,
} from '#shared/contracts/custody';
import type { CaseScope } from '../cases/scope';
import { CustodyEventRecord, CustodyHeadRecord } from '../database/models/custody';
import { implement, type Route } from '../http/route';
import type { Services } from '../services';
import { answer, offer } from './hand-over';
import { withLedger } from './ledger';
import { presentEntry, presentHead } from './presenter';
import { receiversOf } from './receivers';
import { recordEvent } from './record';
import { verifyCase } from './verify-case';
import { zoneOf } from './zone';

const log = (
  { accessLog }: Services,
  { account, caseId }: CaseScope,
  action: string,
  subject: string,
  detail = '',
): Promise<void> => accessLog.record({ actor: account, action, caseId, subject, detail });

export const custodyRoutes: Route[] = [
  implement(readLedger, async ({ scope, query, services }) => {
    const { caseId } = scope;
    await log(services, scope, 'opened custody ledger', query.exhibit ?? scope.caseNumber);
    const [entries, head] = await Promise.all([
      CustodyEventRecord.findAll({
        where: query.exhibit === undefined ? { caseId } : { caseId, exhibit: query.exhibit },
        order: [['sequence', 'ASC']],
        attributes: ['canonical', 'hash'],
        raw: true,
      }),
      CustodyHeadRecord.findOne({ where: { caseId }, order: [['sequence', 'DESC']] }),
    ]);
    return { entries: entries.map(presentEntry), head: head && presentHead(head, scope) };
  }),

  implement(listReceivers, async ({ scope }) => ({
    items: (await receiversOf(scope)).map(({ id, name }) => ({ id, name })),
  })),

  implement(handOver, async ({ scope, params, body, request, services, remember }) => {
    const zone = zoneOf(request);
    const entry = await offer(services, scope, params.exhibitId, body, zone, remember);
    const { exhibit, receivedBy } = entry.event;
    await log(services, scope, 'offered hand-over', exhibit ?? '', `to ${receivedBy}`);
    return entry;
  }),

  implement(answerHandOver, async ({ scope, params, body, request, services, remember }) => {
    const zone = zoneOf(request);
    const entry = await answer(services, scope, params.exhibitId, body, zone, remember);
    const { exhibit, kind, releasedBy } = entry.event;
    await log(services, scope, `${kind} hand-over`, exhibit ?? '', `from ${releasedBy}`);
    return entry;
  }),

  implement(recordCustody, async ({ scope, params, body, request, services, remember }) => {
    const zone = zoneOf(request);
    const entry = await recordEvent(services, scope, params.exhibitId, body, zone, remember);
    await log(services, scope, 'recorded custody', entry.event.exhibit ?? '', body.kind);
    return entry;
  }),

  implement(verifyLedger, async ({ scope, services }) => {
    const report = await verifyCase(services, scope);
    await recordCheck(services, scope, report);
    return report;
  }),
];

/** A check is itself an event; what it found is also an alarm in the access log. */
async function recordCheck(
  services: Services,
  scope: CaseScope,
  { events, files, findings }: LedgerReport,
): Promise<void> {
  const checked = `${events} events and ${files} files checked`;
  const result = findings.length === 0 ? 'nothing differs' : `${findings.length} differences`;
  const action = findings.length === 0 ? 'verified ledger' : 'integrity alarm';
  const told = findings.map((finding) => finding.message).join(' ');
  await log(services, scope, action, scope.caseNumber, `${checked}: ${result}. ${told}`.trim());
  if (findings.length > 0) return;
  await withLedger(services, scope, (ledger) =>
    ledger.append({
      kind: 'integrity checked',
      exhibit: null,
      purpose: 'verification on demand',
      note: `${checked}: ${result}`,
    }),
  );
}
