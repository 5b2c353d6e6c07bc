import {
  downloadDisclosure,
  downloadReleaseArchive,
  listDisclosures,
  listReleases,
  readDisclosure,
  releaseCase,
  withdrawRelease,
} from '#shared/contracts/disclosure';
import { implement, type Route } from '../http/route';
import { listOwnDisclosures, openArchive, openSummary } from './reading';
import { releaseToParty } from './release';
import { releaseOf, releasesOf, withdraw } from './releases';
import { sendArchive } from './send-archive';

export const disclosureRoutes: Route[] = [
  implement(listReleases, ({ scope }) => releasesOf(scope)),
  implement(releaseCase, ({ scope, body, services, remember }) =>
    releaseToParty(services, scope, body, remember),
  ),
  implement(withdrawRelease, ({ scope, params, body, services }) =>
    withdraw(services, scope, params.releaseId, body.reason),
  ),
  implement(downloadReleaseArchive, async ({ scope, params, services, request, response }) => {
    const release = await releaseOf(scope, params.releaseId);
    await services.accessLog.record({
      actor: scope.account,
      action: 'downloaded archive',
      caseId: scope.caseId,
      subject: `release ${release.number}`,
      detail: request.get('Range') ?? '',
    });
    await sendArchive(services, release, response);
  }),
  implement(listDisclosures, ({ party }) => listOwnDisclosures(party)),
  implement(readDisclosure, ({ party, params, services }) =>
    openSummary(services, party, params.releaseId),
  ),
  implement(downloadDisclosure, async ({ party, params, services, request, response }) => {
    const release = await openArchive(services, party, params.releaseId, request);
    await sendArchive(services, release, response);
  }),
];
