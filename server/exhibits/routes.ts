import {
  downloadFile,
  editExhibit,
  listExhibits,
  readExhibit,
  readText,
  registerExhibit,
  showPicture,
  uploadFile,
} from '#shared/contracts/exhibits';
import type { CaseScope } from '../cases/scope';
import { zoneOf } from '../custody/zone';
import { implement, type Route } from '../http/route';
import type { Services } from '../services';
import { presentExhibit, presentExhibits } from './presenter';
import { edit, exhibitOf, exhibitsOf, register } from './register';
import { fileOf, readTextOf, sendOriginal, sendPicture } from './serve-file';
import { takeIn } from './take-in';
import { receiveUpload } from './upload';

const log = (
  { accessLog }: Services,
  { account, caseId }: CaseScope,
  action: string,
  subject: string,
  detail = '',
): Promise<void> => accessLog.record({ actor: account, action, caseId, subject, detail });

export const exhibitRoutes: Route[] = [
  implement(listExhibits, async ({ scope, services }) => {
    await log(services, scope, 'opened exhibits', scope.caseNumber);
    return { items: await presentExhibits(await exhibitsOf(scope)) };
  }),

  implement(registerExhibit, async ({ scope, body, request, services, remember }) => {
    const exhibit = await register(services, scope, body, zoneOf(request), remember);
    await log(services, scope, 'registered exhibit', exhibit.number, exhibit.description);
    return exhibit;
  }),

  implement(readExhibit, async ({ scope, params, services }) => {
    const exhibit = await exhibitOf(scope, params.exhibitId);
    await log(services, scope, 'opened exhibit', exhibit.number);
    return presentExhibit(exhibit);
  }),

  implement(editExhibit, async ({ scope, params, version, body, request, services }) => {
    const zone = zoneOf(request);
    const exhibit = await edit(services, scope, params.exhibitId, version, body, zone);
    await log(services, scope, 'edited exhibit', exhibit.number, Object.keys(body).join(', '));
    return exhibit;
  }),

  implement(
    uploadFile,
    async ({ scope, params, body, request, services }) => {
      const stated = body.statedSha256 ?? null;
      const zone = zoneOf(request);
      const file = await takeIn(services, scope, params.exhibitId, request, stated, zone);
      const { number } = await exhibitOf(scope, params.exhibitId);
      await log(services, scope, 'took in file', number, `${file.name} ${file.sha256}`);
      return file;
    },
    ({ store, config }) => [receiveUpload(store, config.maxUploadBytes)],
  ),

  implement(downloadFile, async ({ scope, params, request, response, services }) => {
    const exhibit = await exhibitOf(scope, params.exhibitId);
    const file = await fileOf(scope, params.exhibitId, params.fileId);
    const range = request.get('Range') ?? 'whole';
    await log(services, scope, 'downloaded file', exhibit.number, `${file.name} (${range})`);
    await sendOriginal(services, file, request, response);
  }),

  implement(showPicture, async ({ scope, params, query, response, services }) => {
    const exhibit = await exhibitOf(scope, params.exhibitId);
    const file = await fileOf(scope, params.exhibitId, params.fileId);
    // Small pictures come with the list, which is recorded; sensitive ones are recorded one by one.
    if (query.size === 'screen' || (exhibit.sensitive && query.size === 'thumbnail')) {
      await log(
        services,
        scope,
        'looked at picture',
        exhibit.number,
        `${file.name} (${query.size})`,
      );
    }
    await sendPicture(services, file, query.size, response);
  }),

  implement(readText, async ({ scope, params, services }) => {
    const exhibit = await exhibitOf(scope, params.exhibitId);
    const file = await fileOf(scope, params.exhibitId, params.fileId);
    await log(services, scope, 'read text', exhibit.number, file.name);
    return readTextOf(services, file);
  }),
];
