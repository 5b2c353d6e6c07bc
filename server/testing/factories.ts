import type { CaseFile, CaseRole } from '#shared/contracts/cases';
import type { TestApi, TestPerson } from './api';

export interface TestCase {
  readonly lead: TestPerson;
  readonly investigator: TestPerson;
  readonly file: CaseFile;
  readonly id: string;
}

export const noConflict = { conflict: false, statement: 'No connection with any party.' };

/** A case opened by a laboratory lead, with a lead investigator, two parties and a question. */
export async function openTestCase(api: TestApi, over: object = {}): Promise<TestCase> {
  const lead = await api.as('laboratory-lead');
  const investigator = await api.as('investigator');
  const opened = await lead
    .post('/api/cases', { title: 'A test case', kind: 'road, one vehicle', ...over })
    .expect(201);
  const id = (opened.body as CaseFile).id;
  await lead
    .post(`/api/cases/${id}/parties`, { name: 'The claimant', role: 'claimant' })
    .expect(201);
  await lead
    .post(`/api/cases/${id}/parties`, { name: 'The defendant', role: 'defendant' })
    .expect(201);
  await lead.post(`/api/cases/${id}/questions`, { text: 'How fast was the car?' }).expect(201);
  await assignTo(lead, id, investigator, 'lead-investigator');
  const file = (await lead.get(`/api/cases/${id}`).expect(200)).body as CaseFile;
  return { lead, investigator, file, id };
}

export async function assignTo(
  lead: TestPerson,
  caseId: string,
  person: TestPerson,
  role: CaseRole,
  partyId: string | null = null,
): Promise<void> {
  await lead
    .post(`/api/cases/${caseId}/assignments`, {
      accountId: person.id,
      role,
      partyId,
      declaration: noConflict,
    })
    .expect(201);
}
