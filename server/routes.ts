import { accountRoutes } from './accounts/routes';
import { caseRoutes } from './cases/routes';
import { healthRoute } from './http/health';
import type { Route } from './http/route';

/** Every route of the API. Tests walk this table as every role. */
export const routes: readonly Route[] = [healthRoute, ...accountRoutes, ...caseRoutes];
