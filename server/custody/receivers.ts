import { Op } from 'sequelize';
import type { CaseScope } from '../cases/scope';
import { AccountRecord } from '../database/models/account';
import { AssignmentRecord } from '../database/models/case';

/** Who may be given an item of the case: its people and the laboratory leads, but not oneself. */
export async function receiversOf({ caseId, account }: CaseScope): Promise<AccountRecord[]> {
  const assignments = await AssignmentRecord.findAll({
    where: { caseId, endedAt: { [Op.is]: null }, role: { [Op.ne]: 'attorney' } },
    attributes: ['accountId'],
  });
  return AccountRecord.findAll({
    where: {
      active: true,
      id: { [Op.ne]: account.id },
      [Op.or]: [
        { role: 'laboratory-lead' },
        { id: assignments.map((assignment) => assignment.accountId), role: 'investigator' },
      ],
    },
    order: [['name', 'ASC']],
  });
}
