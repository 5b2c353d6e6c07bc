import { csrfSync } from 'csrf-sync';
import type { RequestHandler } from 'express';
import session from 'express-session';
import connectSessionSequelize from 'connect-session-sequelize';
import passport from 'passport';
import { Strategy as LocalStrategy } from 'passport-local';
import { DataTypes } from 'sequelize';
import { AccountRecord } from '../database/models/account';
import { HttpProblem } from '../http/problems';
import type { Services } from '../services';
import { passwordMatches } from './passwords';

declare global {
  // eslint-disable-next-line @typescript-eslint/no-namespace -- how Express types are extended
  namespace Express {
    // eslint-disable-next-line @typescript-eslint/no-empty-object-type
    interface User extends AccountRecord {}
  }
}

const hours = 60 * 60 * 1000;

/** Sessions in the database, accounts by passport-local, and a CSRF token for every change. */
export function signInHandlers(services: Services): RequestHandler[] {
  const { sequelize, config } = services;
  const Store = connectSessionSequelize(session.Store);
  sequelize.define(
    'session',
    {
      sid: { type: DataTypes.STRING(128), primaryKey: true },
      expires: DataTypes.DATE,
      data: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      updatedAt: DataTypes.DATE,
    },
    { tableName: 'sessions', timestamps: true },
  );
  const options = {
    db: sequelize,
    table: 'session',
    // Swept when a process starts (start.ts): a timer here would outlive tests.
    checkExpirationInterval: -1,
    expiration: 12 * hours,
    // A session ends twelve hours after its sign-in, and reading one costs no write.
    disableTouch: true,
  };
  const store = new Store(options);
  const sessions = session({
    name: config.behindTlsProxy ? '__Host-centrode' : 'centrode',
    secret: config.sessionSecret,
    store,
    resave: false,
    saveUninitialized: false,
    proxy: config.behindTlsProxy,
    cookie: {
      httpOnly: true,
      sameSite: 'strict',
      secure: config.behindTlsProxy,
      path: '/',
      maxAge: 12 * hours,
    },
  });

  const door = new passport.Passport();
  door.use(
    new LocalStrategy({ usernameField: 'email' }, (email, password, done) => {
      authenticate(email, password).then(
        (account) => done(null, account ?? false),
        (error: unknown) => done(error),
      );
    }),
  );
  door.serializeUser((account, done) => done(null, account.id));
  door.deserializeUser((id: string, done) => {
    // Read at every request, so that an account that was closed is out at once.
    AccountRecord.findOne({ where: { id, active: true } }).then(
      (account) => done(null, account ?? false),
      (error: unknown) => done(error),
    );
  });
  return [sessions, door.initialize() as RequestHandler, door.session() as RequestHandler, protect];
}

/** The account with this address and password, or null. */
export async function authenticate(email: string, password: string): Promise<AccountRecord | null> {
  const account = await AccountRecord.findOne({ where: { email, active: true } });
  const right = await passwordMatches(account?.passwordHash ?? null, password);
  return right ? account : null;
}

const csrf = csrfSync({
  getTokenFromRequest: (request) => request.get('X-CSRF-Token'),
  errorConfig: { statusCode: 403, code: 'CSRF' },
});

export const csrfTokenOf = csrf.generateToken;

const protect: RequestHandler = (request, response, next) => {
  csrf.csrfSynchronisedProtection(request, response, (error?: unknown) => {
    next(
      error
        ? new HttpProblem(
            403,
            'Not allowed',
            'The page is out of date: load it again, then repeat.',
          )
        : undefined,
    );
  });
};
