import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import { v7 as newId } from 'uuid';
import type { AccessRule } from '#shared/contracts/endpoint';
import { routes } from '#server/routes';
import { startTestApi, type TestApi, type TestPerson } from '#server/testing/api';
import { assignTo, openTestCase } from '#server/testing/factories';

/**
 * Every route of the table, as every kind of person. The expectations below are written out from the
 * rules of the contract, not computed from the code that enforces them; a route with a new rule fails
 * to compile here until somebody has said what each person gets.
 */
type Persona =
  | 'nobody'
  | 'laboratory lead'
  | 'lead investigator'
  | 'investigator'
  | 'custodian'
  | 'reviewer'
  | 'stranger'
  | 'attorney of the case'
  | 'other attorney';

const attorneys = { 'attorney of the case': 404, 'other attorney': 404 } as const;
const staffOfCase = {
  'laboratory lead': 'in',
  'lead investigator': 'in',
  investigator: 'in',
  custodian: 'in',
  reviewer: 'in',
} as const;

const expected: Record<AccessRule, Record<Persona, 401 | 403 | 404 | 'in'>> = {
  public: {
    nobody: 'in',
    ...staffOfCase,
    stranger: 'in',
    'attorney of the case': 'in',
    'other attorney': 'in',
  },
  'signed-in': {
    nobody: 401,
    ...staffOfCase,
    stranger: 'in',
    'attorney of the case': 'in',
    'other attorney': 'in',
  },
  lead: {
    nobody: 401,
    'laboratory lead': 'in',
    'lead investigator': 403,
    investigator: 403,
    custodian: 403,
    reviewer: 403,
    stranger: 403,
    ...attorneys,
  },
  staff: { nobody: 401, ...staffOfCase, stranger: 'in', ...attorneys },
  'case-read': { nobody: 401, ...staffOfCase, stranger: 404, ...attorneys },
  'case-work': {
    nobody: 401,
    'laboratory lead': 403,
    'lead investigator': 'in',
    investigator: 'in',
    custodian: 403,
    reviewer: 403,
    stranger: 404,
    ...attorneys,
  },
  'case-custody': {
    nobody: 401,
    'laboratory lead': 403,
    'lead investigator': 'in',
    investigator: 'in',
    custodian: 'in',
    reviewer: 403,
    stranger: 404,
    ...attorneys,
  },
  'case-direct': {
    nobody: 401,
    'laboratory lead': 'in',
    'lead investigator': 'in',
    investigator: 403,
    custodian: 403,
    reviewer: 403,
    stranger: 404,
    ...attorneys,
  },
  party: {
    nobody: 401,
    'laboratory lead': 404,
    'lead investigator': 404,
    investigator: 404,
    custodian: 404,
    reviewer: 404,
    stranger: 404,
    'attorney of the case': 'in',
    'other attorney': 'in',
  },
};

let api: TestApi;
let caseId: string;
const people = new Map<Persona, TestPerson>();

beforeAll(async () => {
  api = await startTestApi();
  const { lead, investigator, file, id } = await openTestCase(api);
  caseId = id;
  people.set('nobody', await api.nobody().signIn());
  people.set('laboratory lead', lead);
  people.set('lead investigator', investigator);
  for (const [persona, role] of [
    ['investigator', 'investigator'],
    ['custodian', 'evidence-custodian'],
    ['reviewer', 'technical-reviewer'],
  ] as const) {
    const person = await api.as('investigator');
    await assignTo(lead, id, person, role);
    people.set(persona, person);
  }
  people.set('stranger', await api.as('investigator'));
  const attorney = await api.as('attorney');
  await assignTo(lead, id, attorney, 'attorney', file.parties[0].id);
  people.set('attorney of the case', attorney);
  people.set('other attorney', await api.as('attorney'));
});
afterAll(() => api.stop());

/** The path with this case's id, and ids of nothing for whatever else it names. */
function pathOf(template: string): string {
  return template
    .replace(':caseId', caseId)
    .replace(':hash', 'a'.repeat(64))
    .replace(/:\w+/g, () => newId());
}

describe('every route as everybody', () => {
  // Signing out ends the session that the other requests need: it has a test of its own.
  const walked = routes.filter(({ endpoint }) => endpoint.path !== '/api/session');

  it.each(walked.map(({ endpoint }) => [`${endpoint.method} ${endpoint.path}`, endpoint] as const))(
    '%s',
    async (_name, endpoint) => {
      for (const [persona, person] of people) {
        const wanted = expected[endpoint.access][persona];
        const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete';
        const answer = await person.call(method, pathOf(endpoint.path));
        const got = `${persona}: ${answer.status}`;
        if (wanted === 'in') {
          // Past the door the empty request may fail, but not for who asks or for the case.
          const detail = String(answer.body?.detail ?? '');
          const shut =
            [401, 403].includes(answer.status) ||
            answer.status >= 500 ||
            /^This (case )?does not exist/.test(detail);
          expect(shut ? `${got} ${detail}` : 'in').toBe('in');
        } else {
          expect(got).toBe(`${persona}: ${wanted}`);
          expect(answer.type).toBe('application/problem+json');
        }
      }
    },
  );

  it('walks as many routes as the API describes', async () => {
    const described = await people.get('nobody')?.get('/api/openapi.json');
    const operations = Object.values(described?.body.paths as Record<string, object>).flatMap(
      (path) => Object.keys(path),
    );
    expect(operations).toHaveLength(routes.length);
    expect(walked.length).toBeGreaterThan(routes.length - 4);
  });
});

describe('another case', () => {
  it('when a member of one case asks for another with their own rights, then it does not exist', async () => {
    const other = await openTestCase(api);
    const member = people.get('lead investigator');
    if (!member) throw new Error('no member');
    for (const { endpoint } of routes) {
      if (!endpoint.access.startsWith('case-')) continue;
      const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete';
      const path = pathOf(endpoint.path.replace(':caseId', other.id));
      const answer = await member.call(method, path);
      expect(`${endpoint.method} ${endpoint.path} ${answer.status}`).toBe(
        `${endpoint.method} ${endpoint.path} 404`,
      );
    }
  });
});
