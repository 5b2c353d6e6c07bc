import {
  addReconstruction,
  editReconstruction,
  listComputations,
  listReconstructions,
  readComputation,
  recordComputation,
} from '#shared/contracts/motion';
import { implement, type Route } from '../http/route';
import * as computations from './computations';
import * as reconstructions from './reconstructions';

export const motionRoutes: Route[] = [
  implement(listReconstructions, ({ scope }) => reconstructions.listReconstructions(scope)),
  implement(addReconstruction, ({ scope, body, services }) =>
    reconstructions.beginReconstruction(services, scope, body),
  ),
  implement(editReconstruction, ({ scope, params, version, body, services }) =>
    reconstructions.saveReconstruction(services, scope, params.reconstructionId, version, body),
  ),
  implement(recordComputation, ({ scope, params, body, services }) =>
    computations.recordStation(services, scope, params.reconstructionId, body),
  ),
  implement(listComputations, ({ scope }) => computations.listComputations(scope)),
  implement(readComputation, async ({ scope, params, services, response }) => {
    const text = await computations.computationText(scope, params.hash);
    await services.accessLog.record({
      actor: scope.account,
      action: 'read computation',
      caseId: scope.caseId,
      subject: params.hash,
    });
    // The stored bytes as they are: parsing and writing them anew could not be told from tampering.
    response.status(200).type('application/json').send(text);
    return undefined;
  }),
];
