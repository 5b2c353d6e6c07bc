import { promisify } from 'node:util';
import type { Request } from 'express';
import { addAccount, listAccounts, readSession, signIn, signOut } from '#shared/contracts/accounts';
import { AccountRecord } from '../database/models/account';
import { HttpProblem } from '../http/problems';
import { implement, type Route } from '../http/route';
import { createAccount, presentAccount } from './accounts';
import { authenticate, csrfTokenOf } from './sign-in';

/** A new session at every sign-in, so that a session id planted before is worth nothing. */
async function enter(request: Request, account: AccountRecord): Promise<void> {
  const login = promisify<AccountRecord, void>((user, done) => request.logIn(user, done));
  // passport regenerates the session in logIn.
  await login(account);
}

export const accountRoutes: Route[] = [
  implement(readSession, ({ account, request }) => ({
    account: account ? presentAccount(account) : null,
    csrfToken: csrfTokenOf(request),
  })),

  implement(signIn, async ({ body, request, services }) => {
    const account = await authenticate(body.email.trim().toLowerCase(), body.password);
    if (!account) {
      await services.accessLog.record({
        actor: null,
        action: 'sign-in failed',
        caseId: null,
        subject: 'session',
      });
      throw new HttpProblem(401, 'Not signed in', 'The address or the password is not right.');
    }
    await enter(request, account);
    await services.accessLog.record({
      actor: account,
      action: 'signed in',
      caseId: null,
      subject: 'session',
    });
    return { account: presentAccount(account), csrfToken: csrfTokenOf(request, true) };
  }),

  implement(signOut, async ({ account, request, services }) => {
    await promisify((done: (error?: unknown) => void) => request.session.destroy(done))();
    await services.accessLog.record({
      actor: account,
      action: 'signed out',
      caseId: null,
      subject: 'session',
    });
  }),

  implement(listAccounts, async () => ({
    items: (await AccountRecord.findAll({ order: [['name', 'ASC']] })).map(presentAccount),
  })),

  implement(addAccount, async ({ account, body, services }) => {
    const added = await createAccount(body);
    await services.accessLog.record({
      actor: account,
      action: 'added account',
      caseId: null,
      subject: added.name,
      detail: added.role,
    });
    return presentAccount(added);
  }),
];
