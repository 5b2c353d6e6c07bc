import type { CaseRole } from '#shared/contracts/cases';

export const caseRoleName = (role: CaseRole): string => role.replace('-', ' ');
