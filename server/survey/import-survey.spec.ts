import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import type { SurveyMapping } from '#shared/contracts/survey';
import { startTestApi, type TestApi } from '../testing/api';
import { openTestCase, type TestCase } from '../testing/factories';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

const mapping: SurveyMapping = {
  delimiter: ',',
  decimal: '.',
  unit: 'm',
  sigmaUnit: 'mm',
  label: 'Pt No',
  x: 'X loc [m]',
  y: 'Y loc [m]',
  height: 'H [m]',
  sigmaX: 's(X) [mm]',
  sigmaY: 's(Y) [mm]',
  sigma: null,
  code: 'Code',
  trace: 'String',
  order: 'Seq',
  note: 'Remark',
  kinds: { CP: 'control point', TM: 'tyre mark' },
};
const header =
  'Pt No,Code,String,Seq,X loc [m],Y loc [m],H [m],s(X) [mm],s(Y) [mm],s(H) [mm],Remark\r\n';
const good = '101,TM,T1,1,1.500,-2.250,,20,30,,start\r\n';
const bad = '102,TM,T1,2,1.9,-2.3,,,,,\r\n';

/** An exhibit of the case with one file of this text. */
async function survey(test: TestCase, text: string | Buffer, name = 'survey.csv') {
  const exhibit = await test.investigator
    .post(`/api/cases/${test.id}/exhibits`, { kind: 'survey data', description: 'Total station' })
    .expect(201);
  const file = await test.investigator
    .post(`/api/cases/${test.id}/exhibits/${exhibit.body.id}/files`)
    .attach('file', Buffer.from(text), name)
    .expect(201);
  return {
    exhibitId: exhibit.body.id as string,
    number: exhibit.body.number as string,
    fileId: file.body.id as string,
  };
}
const importing = (
  test: TestCase,
  { exhibitId, fileId }: { exhibitId: string; fileId: string },
  over: object = {},
) =>
  test.investigator.post(`/api/cases/${test.id}/survey-imports`, {
    exhibitId,
    fileId,
    mapping,
    strict: false,
    ...over,
  });
const marksOf = async (test: TestCase) =>
  (await test.lead.get(`/api/cases/${test.id}/marks`).expect(200)).body;

describe('importing a survey', () => {
  it('when a file is imported, then its good rows stand and each knows its row word for word', async () => {
    const test = await openTestCase(api);
    const file = await survey(test, header + good + bad);
    const answer = await importing(test, file).expect(201);
    expect(answer.body).toMatchObject({
      exhibitNumber: file.number,
      fileName: 'survey.csv',
      by: test.investigator.account?.name,
      accepted: 1,
      rejected: [{ row: 3, field: 's(X) [mm]', message: 'has no uncertainty' }],
    });
    const { items, imports } = await marksOf(test);
    expect(imports).toEqual([answer.body]);
    expect(items).toMatchObject([
      {
        label: '101',
        kind: 'tyre mark',
        at: [1.5, -2.25],
        trace: 'T1',
        order: 1,
        note: 'start',
        source: {
          kind: 'import',
          importId: answer.body.id,
          exhibitNumber: file.number,
          row: 2,
          raw: good.trimEnd(),
        },
      },
    ]);
  });

  it('when the measured scene of the samples is imported, then every row of it stands', async () => {
    const test = await openTestCase(api);
    const text = readFileSync('evidence-samples/spin-on-a-bend/survey.csv', 'utf8');
    const file = await survey(test, text);
    const answer = await importing(test, file, { strict: true }).expect(201);
    expect(answer.body.accepted).toBe(text.trimEnd().split('\n').length - 1);
  });

  it('when all rows or none are asked for, then one bad row stops the import', async () => {
    const test = await openTestCase(api);
    const file = await survey(test, header + good + bad);
    const answer = await importing(test, file, { strict: true }).expect(422);
    expect(answer.body.errors).toEqual([
      { field: 'row 3, s(X) [mm]', message: 'has no uncertainty' },
    ]);
    expect(await marksOf(test)).toEqual({ items: [], imports: [] });
  });

  it('when a label stands in the case already, then its row is rejected', async () => {
    const test = await openTestCase(api);
    const file = await survey(test, header + good);
    await importing(test, file).expect(201);
    const again = await importing(test, file).expect(422);
    expect(again.body.errors[0].message).toMatch(/has the label "101" already/);
    expect((await marksOf(test)).items).toHaveLength(1);
  });

  it('when the same act is sent twice, then it is done once and answered alike', async () => {
    const test = await openTestCase(api);
    const file = await survey(test, header + good);
    const key = 'the-same-act-of-a-person';
    const answers = await Promise.all(
      [1, 2, 3].map(() => importing(test, file).set('Idempotency-Key', key)),
    );
    expect(answers.map((answer) => answer.status)).toEqual([201, 201, 201]);
    expect(new Set(answers.map((answer) => answer.body.id)).size).toBe(1);
    expect((await marksOf(test)).imports).toHaveLength(1);
  });

  it('when the mapping does not fit the file, then the answer names its part', async () => {
    const test = await openTestCase(api);
    const file = await survey(test, header + good);
    const wrong = await importing(test, file, { mapping: { ...mapping, x: 'Easting' } }).expect(
      422,
    );
    expect(wrong.body.errors[0].field).toBe('mapping.x');
    expect(wrong.body.errors[0].message).toMatch(/no column "Easting"/);
    const bytes = await survey(test, Buffer.from([0, 1, 2, 3, 255]), 'dump.bin');
    await importing(test, bytes).expect(422);
  });

  it('when the file or the case is not open to somebody, then it does not exist', async () => {
    const test = await openTestCase(api);
    const other = await openTestCase(api);
    const file = await survey(other, header + good);
    await importing(test, file).expect(404);
    const stranger = await api.as('investigator');
    await stranger
      .post(`/api/cases/${test.id}/survey-imports`, { ...file, mapping, strict: false })
      .expect(404);
  });
});
