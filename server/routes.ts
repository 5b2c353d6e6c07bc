import { accountRoutes } from './accounts/routes';
import { caseRoutes } from './cases/routes';
import { disclosureRoutes } from './disclosure/routes';
import { findingsRoutes } from './findings/routes';
import { healthRoute } from './http/health';
import { custodyRoutes } from './custody/routes';
import { exhibitRoutes } from './exhibits/routes';
import type { Route } from './http/route';
import { logRoutes } from './log/routes';
import { motionRoutes } from './motion/routes';
import { surveyRoutes } from './survey/routes';

/** Every route of the API. Tests walk this table as every role. */
export const routes: readonly Route[] = [
  healthRoute,
  ...accountRoutes,
  ...caseRoutes,
  ...exhibitRoutes,
  ...custodyRoutes,
  ...findingsRoutes,
  ...disclosureRoutes,
  ...logRoutes,
  ...surveyRoutes,
  ...motionRoutes,
];
