import { UniqueConstraintError } from 'sequelize';
import { v7 as newId } from 'uuid';
import type { Account, AccountRole } from '#shared/contracts/accounts';
import { AccountRecord } from '../database/models/account';
import { unprocessable } from '../http/problems';
import { hashPassword } from './passwords';

export const presentAccount = (account: AccountRecord): Account => ({
  id: account.id,
  name: account.name,
  email: account.email,
  role: account.role,
  active: Boolean(account.active),
});

export async function createAccount(entry: {
  name: string;
  email: string;
  role: AccountRole;
  password: string;
}): Promise<AccountRecord> {
  try {
    return await AccountRecord.create({
      id: newId(),
      email: entry.email.trim().toLowerCase(),
      name: entry.name,
      role: entry.role,
      passwordHash: await hashPassword(entry.password),
      active: true,
      createdAt: new Date(),
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw unprocessable('email', 'An account with this address exists already.');
    }
    throw error;
  }
}
