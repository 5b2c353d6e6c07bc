import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import { handSolution } from '../../test/fixtures/archive';
import { startTestApi, type TestApi } from '../testing/api';
import { recordTestComputation } from '../testing/computations';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

jest.setTimeout(30_000);

let api: TestApi;
let opened: TestCase;
let path: string;
let computation: string;

beforeAll(async () => {
  api = await startTestApi();
  opened = await openTestCase(api);
  path = `/api/cases/${opened.id}/findings`;
  computation = await recordTestComputation(opened.id, opened.investigator.id, handSolution(3));
}, 60_000);
afterAll(() => api.stop());

const entry = (over: object = {}) => ({
  answers: [{ questionNumber: 1, text: 'About 6 m/s.' }],
  figures: [{ computation, quantity: 'speed', body: 'arm', point: 'tip' }],
  dependsOn: 'The pin.',
  against: 'The film.',
  ...over,
});

const messages = ({ body }: { body: { errors: { field: string; message: string }[] } }) =>
  body.errors.map(({ field, message }) => `${field} ${message}`);

describe('findings', () => {
  it('when nothing was written yet, then every question stands there unanswered', async () => {
    const { body } = await opened.lead.get(path).expect(200);
    expect(body).toMatchObject({
      answers: [{ questionNumber: 1, question: 'How fast was the car?', text: '' }],
      figures: [],
      version: 1,
      changedAt: null,
    });
  });

  it('when figures are chosen, then value and range are read from the computation', async () => {
    const figures = [
      { computation, quantity: 'speed', body: 'arm', point: 'tip' },
      { computation, quantity: 'acceleration', body: 'arm', point: 'tip' },
      { computation, quantity: 'angular-velocity', body: 'arm', point: null },
    ];
    const { body } = await opened.investigator.put(path, entry({ figures }), 1).expect(200);
    expect(body.version).toBe(2);
    // By hand: omega = 3 ± 0.5 rad/s, v = 6 ± 1 m/s, a = 18 ± 6 m/s²; 95 % is ± 1.960 sigma.
    const near = (value: number, sigma: number) => ({
      value,
      low: expect.closeTo(value - 1.96 * sigma, 3),
      high: expect.closeTo(value + 1.96 * sigma, 3),
    });
    expect(body.figures).toEqual([
      expect.objectContaining({
        ...near(6, 1),
        title: 'Speed',
        pointName: 'tip, the arm',
        stationName: 'first mark',
        branch: 0,
      }),
      expect.objectContaining({ ...near(18, 6), title: 'Acceleration' }),
      expect.objectContaining({ ...near(3, 0.5), title: 'Rate of turning', pointName: 'the arm' }),
    ]);
    expect((await opened.lead.get(path).expect(200)).body).toEqual(body);
  });

  it('when a value is typed in, then it is refused', async () => {
    const figures = [{ computation, quantity: 'speed', body: 'arm', point: 'tip', value: 1 }];
    await opened.investigator.put(path, entry({ figures }), 2).expect(422);
  });

  it('when a figure cannot be read, then each is told why and nothing is saved', async () => {
    const other = await openTestCase(api);
    const foreign = await recordTestComputation(other.id, other.lead.id, handSolution(4));
    const free = handSolution(5);
    free.branches[0].points['arm.tip'].acceleration = null;
    free.branches[0].points['arm.tip'].sigma.speed = null;
    const loose = await recordTestComputation(opened.id, opened.lead.id, free, 2);
    const speed = { computation, quantity: 'speed', body: 'arm', point: 'tip' };
    const figures = [
      { ...speed, computation: foreign },
      { ...speed, body: 'leg' },
      { ...speed, branch: 1 },
      { ...speed, point: null },
      { ...speed, computation: loose, quantity: 'acceleration' },
      { ...speed, computation: loose },
    ];
    const answer = await opened.investigator.put(path, entry({ figures }), 2).expect(422);
    expect(messages(answer)).toEqual([
      'figures.0 This computation is not recorded in this case.',
      'figures.1 Speed of leg.tip: the computation does not fix it.',
      'figures.2 The computation has no such solution.',
      'figures.3 Say of which point: body and point.',
      'figures.4 Acceleration of arm.tip: the computation does not fix it.',
      expect.stringContaining('a figure without a range is not published'),
    ]);
    expect((await opened.lead.get(path)).body.version).toBe(2);
  });

  it('when a question does not exist or is answered twice, then it says which', async () => {
    const answers = [1, 1, 9].map((questionNumber) => ({ questionNumber, text: '' }));
    const answer = await opened.investigator.put(path, entry({ answers }), 2).expect(422);
    expect(messages(answer)).toEqual([
      'answers.1.questionNumber Question 1 is answered twice.',
      'answers.2.questionNumber There is no question 9.',
    ]);
  });

  it('when two save the same version at once, then one is told and sees what stands', async () => {
    const both = await Promise.all(
      ['First.', 'Second.'].map((dependsOn) =>
        opened.investigator.put(path, entry({ dependsOn }), 2),
      ),
    );
    expect(both.map(({ status }) => status).sort()).toEqual([200, 412]);
    const won = both.find(({ status }) => status === 200);
    const lost = both.find(({ status }) => status === 412);
    expect(lost?.body.current).toEqual(won?.body);
    await opened.investigator.call('put', path, entry()).expect(428);
  });

  it('lets readers read, and only those who work in the case write', async () => {
    const reviewer = await api.as('investigator');
    await reviewer.get(path).expect(404);
    await assignTo(opened.lead, opened.id, reviewer, 'technical-reviewer');
    await reviewer.get(path).expect(200);
    await reviewer.put(path, entry(), 3).expect(403);
    await opened.lead.put(path, entry(), 3).expect(403);
    await (await api.as('attorney')).get(path).expect(404);
    await (await api.nobody().signIn()).get(path).expect(401);
  });
});
