import compression from 'compression';
import express, { type Express } from 'express';
import { pinoHttp } from 'pino-http';
import { signInHandlers } from './accounts/sign-in';
import { answerErrors, noSuchRoute } from './http/error-handler';
import { describeApi } from './http/openapi';
import { serveRoute } from './http/serve-route';
import { securityHeaders, webApplication } from './http/web';
import { routes } from './routes';
import type { Services } from './services';

/** The whole server as one Express application; it listens nowhere by itself. */
export function createApp(services: Services): Express {
  const { config } = services;
  const app = express();
  app.disable('x-powered-by');
  app.set('query parser', 'simple');
  // An ETag here is a version for If-Match (http/serve-route.ts), never a checksum of the answer.
  app.set('etag', false);
  if (config.behindTlsProxy) app.set('trust proxy', 1);
  app.use(
    pinoHttp({
      logger: services.log,
      // No headers, no query strings: they may hold what is nobody's business.
      serializers: {
        req: (request: { id: unknown; method: string; url: string }) => ({
          id: request.id,
          method: request.method,
          path: request.url.split('?')[0],
        }),
        res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      },
    }),
  );
  app.use(...securityHeaders(config.behindTlsProxy));

  const api = express.Router();
  api.use((_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  api.use(compression());
  api.get('/openapi.json', (_request, response) => {
    response.json(describeApi(routes));
  });
  api.use(express.json({ limit: '2mb' }));
  api.use(...signInHandlers(services));
  for (const route of routes) serveRoute(api, route, services);
  api.use(noSuchRoute);
  app.use('/api', api);

  if (config.webDir !== '') app.use(webApplication(config.webDir));
  app.use(answerErrors(services));
  return app;
}
