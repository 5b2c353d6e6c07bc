import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import * as z from 'zod';

/** Everything that may differ between installations, by environment; checked once at the start. */
const environment = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('production'),
  HOST: z.string().default('127.0.0.1'),
  PORT: z.coerce.number().int().min(0).max(65_535).default(4300),
  /** The application's account: rows only, append-only where the table says so. */
  DATABASE_URL: z.string().regex(/^(mariadb|mysql):\/\//, 'must begin with mariadb://'),
  /** The account that migrates and grants; without it DATABASE_URL does both. */
  DATABASE_OWNER_URL: z
    .string()
    .regex(/^(mariadb|mysql):\/\//, 'must begin with mariadb://')
    .optional(),
  /** Stored files, keys and archives. */
  DATA_DIR: z.string().default('.data'),
  /** The built web application; empty: the API alone. */
  WEB_DIR: z.string().default('dist/web'),
  /** The archive's tools as built by scripts/bundle-tools.mjs. */
  TOOLS_DIR: z.string().default('dist/tools'),
  LABORATORY_NAME: z.string().default('Quellmere Reconstruction Laboratory'),
  MAX_UPLOAD_BYTES: z.coerce
    .number()
    .int()
    .positive()
    .default(2 * 1024 ** 3),
  /** "yes" behind a proxy that ends TLS: secure cookies, client address from the proxy. */
  BEHIND_TLS_PROXY: z.enum(['yes', 'no']).default('no'),
  /** "yes": load the invented demo laboratory when the database is empty. */
  DEMO: z.enum(['yes', 'no']).default('no'),
  DEMO_DIR: z.string().default('evidence-samples'),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'fatal', 'silent']).default('info'),
});

export interface Config {
  readonly production: boolean;
  readonly host: string;
  readonly port: number;
  readonly databaseUrl: string;
  readonly databaseOwnerUrl: string;
  readonly dataDir: string;
  readonly webDir: string;
  readonly toolsDir: string;
  readonly laboratory: string;
  readonly maxUploadBytes: number;
  readonly behindTlsProxy: boolean;
  readonly demo: boolean;
  readonly demoDir: string;
  readonly logLevel: string;
  readonly sessionSecret: string;
}

export function readConfig(env: NodeJS.ProcessEnv): Config {
  const parsed = environment.safeParse(env);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The configuration cannot be used:\n${lines.join('\n')}`);
  }
  const e = parsed.data;
  const dataDir = resolve(e.DATA_DIR);
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  return {
    production: e.NODE_ENV === 'production',
    host: e.HOST,
    port: e.PORT,
    databaseUrl: e.DATABASE_URL,
    databaseOwnerUrl: e.DATABASE_OWNER_URL ?? e.DATABASE_URL,
    dataDir,
    webDir: e.WEB_DIR === '' ? '' : resolve(e.WEB_DIR),
    toolsDir: resolve(e.TOOLS_DIR),
    laboratory: e.LABORATORY_NAME,
    maxUploadBytes: e.MAX_UPLOAD_BYTES,
    behindTlsProxy: e.BEHIND_TLS_PROXY === 'yes',
    demo: e.DEMO === 'yes',
    demoDir: resolve(e.DEMO_DIR),
    logLevel: e.LOG_LEVEL,
    sessionSecret: secretOf(dataDir),
  };
}

/** Made once and kept with the data, so that sessions outlive a restart. */
function secretOf(dataDir: string): string {
  const file = join(dataDir, 'session-secret');
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 });
  return readFileSync(file, 'utf8').trim();
}
