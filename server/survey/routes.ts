import {
  addMark,
  editMark,
  importSurvey,
  listMarkChanges,
  listMarks,
  removeMark,
} from '#shared/contracts/survey';
import { implement, type Route } from '../http/route';
import { importMarks } from './import-survey';
import * as marks from './marks';

export const surveyRoutes: Route[] = [
  implement(listMarks, ({ scope }) => marks.listMarks(scope)),
  implement(addMark, ({ scope, body, services }) => marks.enterMark(services, scope, body)),
  implement(editMark, ({ scope, params, version, body, services }) =>
    marks.changeMark(services, scope, params.markId, version, body),
  ),
  implement(removeMark, ({ scope, params, version, query, services }) =>
    marks.withdrawMark(services, scope, params.markId, version, query.reason),
  ),
  implement(listMarkChanges, ({ scope }) => marks.listChanges(scope)),
  implement(importSurvey, ({ scope, body, services, remember }) =>
    importMarks(services, scope, body, remember),
  ),
];
