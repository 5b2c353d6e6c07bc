import { editFindings, readFindings } from '#shared/contracts/findings';
import { implement, type Route } from '../http/route';
import { findingsOf, saveFindings } from './use-cases';

export const findingsRoutes: Route[] = [
  implement(readFindings, ({ scope }) => findingsOf(scope)),
  implement(editFindings, ({ scope, version, body, services }) =>
    saveFindings(services, scope, version, body),
  ),
];
