import {
  addParty,
  addQuestion,
  assign,
  editBrief,
  endAssignment,
  listCases,
  moveStage,
  openCase,
  readCase,
} from '#shared/contracts/cases';
import { implement, type Route } from '../http/route';
import { presentCase } from './case-file';
import { scopeOf } from './scope';
import * as cases from './use-cases';

export const caseRoutes: Route[] = [
  implement(listCases, ({ account, query }) => cases.listCases(account, query)),
  implement(openCase, async ({ account, body, services }) =>
    presentCase(await cases.openNewCase(services, account, body)),
  ),
  implement(readCase, async ({ scope, services }) => {
    await services.accessLog.record({
      actor: scope.account,
      action: 'opened case file',
      caseId: scope.caseId,
      subject: scope.caseNumber,
    });
    return presentCase(scope);
  }),
  implement(editBrief, async ({ scope, version, body, services }) => {
    await cases.changeBrief(services, scope, version, body);
    return presentCase(scope);
  }),
  implement(addParty, ({ scope, body, services }) => cases.addCaseParty(services, scope, body)),
  implement(addQuestion, ({ scope, body, services }) =>
    cases.addCaseQuestion(services, scope, body.text),
  ),
  implement(assign, async ({ account, params, body, services }) =>
    cases.assignPerson(services, await scopeOf(account, params.caseId), body),
  ),
  implement(endAssignment, async ({ account, params, services }) =>
    cases.endCaseAssignment(services, await scopeOf(account, params.caseId), params.assignmentId),
  ),
  implement(moveStage, async ({ scope, version, body, services }) => {
    await cases.moveCaseStage(services, scope, version, body);
    return presentCase(scope);
  }),
];
