import type { AccountRole } from '#shared/contracts/accounts';

export const roleNames: Readonly<Record<AccountRole, string>> = {
  'laboratory-lead': 'laboratory lead',
  investigator: 'investigator',
  attorney: 'attorney',
};
