import * as z from 'zod';
import { id, line } from './common';
import { endpoint } from './endpoint';

export const accountRoles = ['laboratory-lead', 'investigator', 'attorney'] as const;
export type AccountRole = (typeof accountRoles)[number];

export const account = z.object({
  id,
  name: z.string(),
  email: z.email(),
  role: z.enum(accountRoles),
  active: z.boolean(),
});
export type Account = z.infer<typeof account>;

export const session = z.object({
  /** null: nobody is signed in. */
  account: account.nullable(),
  /** Sent back in `X-CSRF-Token` with every request that changes something. */
  csrfToken: z.string(),
});
export type Session = z.infer<typeof session>;

export const password = z.string().min(12, 'must have at least 12 characters').max(200);

export const readSession = endpoint({
  method: 'GET',
  path: '/api/session',
  summary: 'Who is signed in, and the token for changes',
  access: 'public',
  response: session,
});

export const signIn = endpoint({
  method: 'POST',
  path: '/api/session',
  summary: 'Sign in with e-mail address and password',
  access: 'public',
  body: z.strictObject({ email: z.string().min(1).max(320), password: z.string().min(1).max(200) }),
  response: session,
});

export const signOut = endpoint({
  method: 'DELETE',
  path: '/api/session',
  summary: 'Sign out',
  access: 'signed-in',
  response: null,
});

export const listAccounts = endpoint({
  method: 'GET',
  path: '/api/accounts',
  summary: 'Accounts of the laboratory and of the attorneys known to it',
  access: 'staff',
  response: z.object({ items: z.array(account) }),
});

export const addAccount = endpoint({
  method: 'POST',
  path: '/api/accounts',
  summary: 'Add an account',
  access: 'lead',
  body: z.strictObject({
    name: line(120),
    email: z.email().max(320),
    role: z.enum(accountRoles),
    password,
  }),
  response: account,
  status: 201,
});
