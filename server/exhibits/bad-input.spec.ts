import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import { startTestApi, type TestApi } from '../testing/api';
import { openTestCase, type TestCase } from '../testing/factories';
import { registerTestExhibit, sendTestFile, takeInTestFile } from './testing';

/** The samples of evidence-samples/bad-input, each wrong in one way (its README says which). */
const samples = join(import.meta.dirname, '../../evidence-samples');
const sample = (name: string): Buffer => readFileSync(join(samples, 'bad-input', name));
const scene = (n: number): Buffer =>
  readFileSync(join(samples, `spin-on-a-bend/photographs/photograph-0${n}.jpg`));

let api: TestApi;
let open: TestCase;
let exhibit: Exhibit;
beforeAll(async () => {
  api = await startTestApi();
  open = await openTestCase(api, { incidentOn: '2026-10-17' });
  exhibit = await registerTestExhibit(open.investigator, open.id, { kind: 'photographs' });
});
afterAll(() => api.stop());

const send = (name: string, content = sample(name)) =>
  sendTestFile(open.investigator, open.id, exhibit.id, content, name);

const takeIn = (name: string, content = sample(name)): Promise<ExhibitFile> =>
  takeInTestFile(open.investigator, open.id, exhibit.id, content, name);

const doubtsOf = (file: ExhibitFile): string[] =>
  (file.picture?.doubts ?? []).map(({ code }) => code);

describe('the samples of bad input', () => {
  it.each([
    ['photograph-empty.jpg', /empty/],
    ['photograph-truncated.jpg', /damaged or cut short/],
    ['archive-named.jpg', /ends in ".jpg" but the content is application\/zip/],
    ['page-named.png', /ends in ".png" but the content is text\/html/],
    ['pixels-60000.png', /60000 × 60000 pixels/],
    ['survey-binary-junk.csv', /ends in ".csv" but the content is of no known kind/],
  ])('refuses %s and says why', async (name, reason) => {
    const answer = await send(name).expect(422);
    expect(answer.body.detail).toMatch(reason);
  });

  it.each([
    ['survey-bad-rows.csv', 'text/csv'],
    ['survey-decimal-commas.csv', 'text/csv'],
    ['survey-formulas.csv', 'text/csv'],
    ['survey-windows-1252.csv', 'text/csv'],
    ['survey-wrong-columns.csv', 'text/csv'],
    ['traversal-names.zip', 'application/zip'],
    ['drawing-with-script.svg', 'image/svg+xml'],
  ])('keeps %s as it is, with nothing to show in the page', async (name, mediaType) => {
    const file = await takeIn(name);
    expect(file).toMatchObject({ mediaType, hasThumbnail: false, size: sample(name).length });
  });

  it('reads a table in Windows-1252 and says so', async () => {
    const name = 'survey-windows-1252.csv';
    const other = await registerTestExhibit(open.investigator, open.id);
    const file = await takeInTestFile(open.investigator, open.id, other.id, sample(name), name);
    const path = `/api/cases/${open.id}/exhibits/${other.id}/files/${file.id}/text`;
    const answer = await open.investigator.get(path).expect(200);
    expect(answer.body.encoding).toBe('Windows-1252');
    expect(answer.body.text).not.toContain('\ufffd');
  });

  it('takes in pictures of the scene without a doubt, and points out those that differ', async () => {
    for (const n of [1, 2, 3, 4])
      expect(doubtsOf(await takeIn(`scene-${n}.jpg`, scene(n)))).toEqual([]);
    expect(doubtsOf(await takeIn('photograph-edited.jpg'))).toEqual(['edited']);
    expect(doubtsOf(await takeIn('photograph-far-away.jpg'))).toEqual(['far-away']);
    expect(doubtsOf(await takeIn('photograph-wrong-clock.jpg'))).toEqual(['before-incident']);
  });
});
