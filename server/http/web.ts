import { randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import express, { type Router } from 'express';
import expressStaticGzip from 'express-static-gzip';
import helmet from 'helmet';
import type { RequestHandler } from 'express';

/** Headers for every answer; each page gets a nonce of its own for scripts and styles. */
export function securityHeaders(secure: boolean): RequestHandler[] {
  return [
    (_request, response, next) => {
      response.locals['nonce'] = randomBytes(18).toString('base64');
      next();
    },
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          'default-src': ["'none'"],
          'script-src': ["'self'", (_q, r) => `'nonce-${nonceOf(r)}'`],
          'style-src': ["'self'", (_q, r) => `'nonce-${nonceOf(r)}'`],
          'font-src': ["'self'"],
          'img-src': ["'self'", 'data:', 'blob:'],
          'connect-src': ["'self'"],
          'worker-src': ["'self'"],
          'form-action': ["'self'"],
          // The page names its base so that deep addresses find the scripts; no other base may be set.
          'base-uri': ["'self'"],
          'object-src': ["'none'"],
          'frame-ancestors': ["'none'"],
          'require-trusted-types-for': ["'script'"],
          'trusted-types': ['angular', 'angular#bundler', 'centrode'],
          ...(secure ? { 'upgrade-insecure-requests': [] } : {}),
        },
      },
      referrerPolicy: { policy: 'no-referrer' },
      crossOriginResourcePolicy: { policy: 'same-origin' },
      strictTransportSecurity: secure ? undefined : false,
    }),
  ];
}

const nonceOf = (response: unknown): string =>
  String((response as { locals: Record<string, unknown> }).locals['nonce']);

/** The built application: immutable files by their hashed names, and its page with the nonce put in. */
export function webApplication(webDir: string): Router {
  const router = express.Router();
  const page = readFileSync(join(webDir, 'index.html'), 'utf8');
  router.use(
    expressStaticGzip(webDir, {
      enableBrotli: true,
      orderPreference: ['br', 'gz'],
      index: false,
      serveStatic: { index: false, maxAge: '1y', immutable: true, fallthrough: true },
    }),
  );
  router.get('/{*path}', (request, response, next) => {
    if (/\.\w+$/.test(request.path)) {
      next();
      return;
    }
    response
      .set('Cache-Control', 'no-store')
      .type('html')
      .send(page.replaceAll('CSP_NONCE', nonceOf(response)));
  });
  return router;
}
