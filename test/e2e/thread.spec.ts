import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, readdirSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { expect, test, type Locator, type Page } from '@playwright/test';
import { enter, password, troubles } from './people';

/**
 * The whole thread on a sample scene, as people would walk it: the lead opens a case and assigns; the
 * investigator takes exhibits in, hands one over, imports the survey, fits and solves a station and
 * records it, writes findings; the lead releases; the attorney reads; the archive proves itself.
 */
const samples = resolve(import.meta.dirname, '../../evidence-samples/spin-on-a-bend');
const title = `Spin, walked through at ${new Date().toISOString().slice(11, 19)}`;

interface Sample {
  reconstruction: {
    bodies: { points: Record<string, { at: [number, number]; sigma: [number, number] }> }[];
    stations: {
      id: string;
      marks: { survey: string; point: string }[];
      knowns: { magnitude?: number; sigma: { magnitude?: number } }[];
    }[];
  };
}
const sample = JSON.parse(readFileSync(join(samples, 'scene.json'), 'utf8')) as Sample;
const truth = JSON.parse(readFileSync(join(samples, 'truth.json'), 'utf8')) as {
  stations: { id: string; omega: number; speed: number }[];
};

async function choose(page: Page, label: string | RegExp, option: string | RegExp): Promise<void> {
  await page.getByRole('combobox', { name: label }).click();
  await page.getByRole('option', { name: option }).first().click();
}

/** The open dialog, once it has moved the focus into itself; typing earlier would land elsewhere. */
async function dialogOf(page: Page): Promise<Locator> {
  const dialog = page.getByRole('dialog');
  await expect(dialog.locator(':focus')).toHaveCount(1);
  return dialog;
}

async function openCase(page: Page): Promise<void> {
  await page.goto('/cases');
  await page.getByRole('link', { name: title }).click();
  await expect(page.getByRole('heading', { name: title })).toBeVisible();
}

const section = (page: Page, name: string) =>
  page
    .getByRole('navigation')
    .getByRole('link', { name: new RegExp(`^${name}`) })
    .click();

async function assign(page: Page, role: RegExp, person: RegExp, party?: RegExp): Promise<void> {
  await page.getByRole('button', { name: 'Assign a person' }).click();
  const dialog = await dialogOf(page);
  await choose(page, 'Role in the case', role);
  await choose(page, 'Person', person);
  if (party) await choose(page, 'Acts for', party);
  await dialog.getByRole('radio', { name: 'None' }).check();
  await dialog.getByLabel('In their words').fill('No connection with any party.');
  await dialog.getByRole('button', { name: 'Assign', exact: true }).click();
  await expect(dialog).toBeHidden();
}

test.describe.serial('the whole thread', () => {
  test('the lead opens a case, asks a question, names a party and assigns people', async ({
    browser,
  }) => {
    const lead = await enter(browser, 'lead');
    await lead.getByRole('button', { name: 'Open a case' }).click();
    await (await dialogOf(lead)).getByLabel('Title').fill(title);
    await choose(lead, 'Kind of incident', 'road, one vehicle');
    await lead.getByRole('button', { name: 'Open the case' }).click();
    await expect(lead.getByRole('heading', { name: title })).toBeVisible();

    await lead.getByRole('button', { name: 'Add a question' }).click();
    await lead
      .getByLabel('Question', { exact: true })
      .fill('How fast was the car at the first gap in its marks?');
    await lead.getByRole('button', { name: 'Add the question' }).click();
    await lead.getByRole('button', { name: 'Add a party' }).click();
    await lead.getByLabel('Name', { exact: true }).fill('The claimant');
    await lead.getByLabel(/^Role, for example/).fill('claimant');
    await lead.getByRole('button', { name: 'Add the party' }).click();
    await expect(lead.getByText('The claimant').first()).toBeVisible();

    await assign(lead, /lead investigator/i, /E\. Varo/);
    await assign(lead, /custodian/i, /R\. Amadi/);
    await assign(lead, /attorney/i, /A\. Thorne/, /The claimant/);
    await expect(lead.getByText('No conflict declared').first()).toBeVisible();
    expect(troubles(lead)).toEqual([]);
  });

  test('the investigator registers exhibits and takes files in; a hand-over waits until it is accepted', async ({
    browser,
  }) => {
    const varo = await enter(browser, 'varo');
    await openCase(varo);
    await section(varo, 'Exhibits');
    await varo.getByRole('link', { name: 'Register an exhibit' }).click();
    await choose(varo, 'Kind', 'survey data');
    await varo.getByLabel('What it is').fill('Total-station survey of the bend');
    await varo.getByLabel('Collected by').fill('E. Varo');
    await varo.getByRole('button', { name: 'Register', exact: true }).click();
    await varo
      .getByLabel('Files of this exhibit')
      .setInputFiles([join(samples, 'survey.csv'), join(samples, 'photographs/photograph-01.jpg')]);
    const way = varo.getByRole('list', { name: 'Files on their way' });
    await expect(way.getByText('taken in', { exact: true })).toHaveCount(2);
    await expect(varo.getByRole('img', { name: /photograph-01\.jpg/ })).toBeVisible();

    await varo.getByRole('button', { name: 'Hand over …' }).click();
    await dialogOf(varo);
    await choose(varo, 'To', /R\. Amadi/);
    await varo.getByLabel('Purpose').fill('Storage');
    await varo
      .getByRole('dialog')
      .getByRole('button', { name: /^Hand over|^Offer/ })
      .click();
    await expect(varo.getByText(/offered it to R\. Amadi/)).toBeVisible();

    const amadi = await enter(browser, 'amadi');
    await openCase(amadi);
    await section(amadi, 'Exhibits');
    await amadi
      .getByText(/offers you/)
      .getByRole('link')
      .click();
    await amadi.getByRole('button', { name: 'Accept …' }).click();
    const dialog = await dialogOf(amadi);
    await dialog.getByLabel('Your password').fill('not the password');
    await dialog.getByRole('button', { name: 'Accept', exact: false }).last().click();
    await expect(dialog.getByText(/password is not right/)).toBeVisible();
    await amadi.getByLabel('Your password').fill(password);
    await dialog.getByRole('button', { name: 'Accept', exact: false }).last().click();
    await expect(amadi.getByText(/Held by R\. Amadi/)).toBeVisible();

    await section(amadi, 'Custody');
    await amadi.getByRole('button', { name: /^Verify/ }).click();
    await expect(amadi.getByText('Everything is as it was written.')).toBeVisible();
    expect(troubles(varo)).toEqual([]);
    expect(troubles(amadi)).toEqual([]);
  });

  test('the survey is imported: columns are guessed, rows are shown, nothing is lost', async ({
    browser,
  }) => {
    const varo = await enter(browser, 'varo');
    await openCase(varo);
    await section(varo, 'Survey');
    await varo.getByRole('button', { name: 'Import a file' }).click();
    await varo.getByLabel('File', { exact: true }).selectOption({ index: 1 });
    await expect(varo.getByRole('button', { name: 'Import the accepted rows' })).toBeEnabled();
    await varo.getByRole('button', { name: 'Import the accepted rows' }).click();
    await expect(varo.getByText('324 marks', { exact: true })).toBeVisible();
    expect(troubles(varo)).toEqual([]);
  });

  test('a car is fitted to its four marks and solved at the first gap; the record is the server’s', async ({
    browser,
  }) => {
    test.setTimeout(240_000);
    const varo = await enter(browser, 'varo', { height: 1000 });
    await openCase(varo);
    await section(varo, 'Motion');
    await varo.getByRole('button', { name: 'Begin a reconstruction' }).click();

    const panel = varo.locator('app-panel');
    const tool = async (name: string): Promise<void> => {
      const button = varo.getByRole('toolbar').getByRole('button', { name });
      if ((await button.getAttribute('aria-pressed')) !== 'true') await button.click();
      await expect(button).toHaveAttribute('aria-pressed', 'true');
    };
    await tool('Bodies');
    await panel.getByRole('button', { name: 'Add a body' }).click();
    const [body] = sample.reconstruction.bodies;
    for (const [name, { at, sigma }] of Object.entries(body.points)) {
      await panel.getByRole('button', { name: 'Add a point' }).click();
      await varo.getByLabel('Short name, used in the equations').fill(name);
      await varo.getByLabel('Name of the point').fill(`point ${name}`);
      await varo.getByLabel('x forward').fill(`${at[0]} m`);
      await varo.getByLabel('y to the left').fill(`${at[1]} m`);
      await varo.getByLabel('± x (standard)').fill(`${sigma[0]} m`);
      await varo.getByLabel('± y (standard)').fill(`${sigma[1]} m`);
      await varo.getByLabel('± y (standard)').press('Tab');
    }
    await tool('Stations');
    await panel.getByRole('button', { name: 'Add a station' }).click();
    await varo.getByLabel('What happened then').fill('First gap in all four marks');

    await tool('Marks');
    const station = sample.reconstruction.stations[1];
    for (const { survey, point } of station.marks) {
      await choose(varo, 'Mark', new RegExp(`^${survey},`));
      await choose(varo, 'Made by the point', new RegExp(`point ${point}\\b`));
      await varo.getByRole('checkbox', { name: /The direction in which it moved/ }).check();
    }
    await tool('Knowns');
    await panel.getByRole('button', { name: 'Add a known' }).click();
    await choose(varo, /^Point$/, /point G\b/);
    await choose(varo, 'How much is known', /magnitude only/i);
    const speed = station.knowns.find((known) => known.magnitude !== undefined);
    await varo.getByLabel('Speed', { exact: true }).fill(`${speed?.magnitude ?? ''} m/s`);
    await varo.getByLabel('Standard uncertainty (±)').fill(`${speed?.sigma.magnitude ?? ''} m/s`);
    await varo.getByLabel('On what basis').fill('Recorder of the car, read out.');
    await varo.getByLabel('On what basis').press('Tab');

    const sheet = varo.getByRole('region', { name: 'Calculation sheet' });
    await expect(sheet.getByText(/over-determined/i).first()).toBeVisible({ timeout: 30_000 });
    await varo.getByRole('button', { name: 'Record computation' }).click();
    await expect(varo.getByText(/^Recorded: /)).toBeVisible({ timeout: 30_000 });
    expect(troubles(varo)).toEqual([]);

    // What the server recorded holds the truth that the scene was made from.
    const id = /cases\/([0-9a-f-]+)/.exec(varo.url())?.[1] ?? '';
    const list = (await (await varo.request.get(`/api/cases/${id}/computations`)).json()) as {
      items: { hash: string }[];
    };
    const record = (await (
      await varo.request.get(`/api/cases/${id}/computations/${list.items[0].hash}`)
    ).json()) as {
      result: {
        solution: {
          branches: { bodies: Record<string, { omega: number; sigma: { omega: number } }> }[];
        };
      };
    };
    const [solved] = Object.values(record.result.solution.branches[0].bodies);
    const actual = truth.stations[1].omega;
    expect(Math.abs(solved.omega - actual)).toBeLessThan(2 * solved.sigma.omega);
  });

  test('findings pick their figures from the record; the lead releases to the claimant', async ({
    browser,
  }) => {
    const varo = await enter(browser, 'varo');
    await openCase(varo);
    await section(varo, 'Findings');
    await varo.getByRole('button', { name: 'Edit the findings' }).click();
    await varo.getByLabel('Answer to question 1').fill('About 61 km/h at the centre of gravity.');
    await varo.getByRole('button', { name: 'Pick figures from a computation' }).click();
    await varo.getByRole('checkbox', { name: /^Speed of point G/ }).check();
    await varo.getByRole('button', { name: 'Take 1 figure' }).click();
    await varo.getByLabel('What these depend on most').fill('The speed that the recorder kept.');
    await varo
      .getByLabel('Strongest points against')
      .fill('The recorder was not calibrated after.');
    await varo.getByRole('button', { name: 'Save the findings' }).click();
    await expect(varo.getByRole('button', { name: 'Edit the findings' })).toBeVisible();

    const lead = await enter(browser, 'lead');
    await openCase(lead);
    await section(lead, 'Disclosure');
    await lead.getByRole('button', { name: 'Release to a party …' }).click();
    await choose(lead, 'Party', /The claimant/);
    await lead.getByRole('button', { name: 'Release all that are not sensitive' }).click();
    await lead.getByLabel('Your password').fill(password);
    await lead.getByRole('button', { name: 'Release', exact: true }).click();
    await expect(lead.getByRole('heading', { name: /Release 1 to The claimant/ })).toBeVisible();
    expect(troubles(varo)).toEqual([]);
    expect(troubles(lead)).toEqual([]);
  });

  test('the attorney reads the summary and downloads an archive that proves itself', async ({
    browser,
  }) => {
    const attorney = await enter(browser, 'thorne');
    await attorney.goto('/disclosures');
    await attorney.getByRole('link', { name: new RegExp(title) }).click();
    await expect(attorney.getByText('About 61 km/h')).toBeVisible();
    await expect(async () => {
      await attorney.reload();
      await expect(attorney.getByRole('link', { name: /Download the archive/ })).toBeVisible({
        timeout: 2000,
      });
    }).toPass({ timeout: 60_000 });
    const [download] = await Promise.all([
      attorney.waitForEvent('download'),
      attorney.getByRole('link', { name: /Download the archive/ }).click(),
    ]);
    const folder = mkdtempSync(join(tmpdir(), 'centrode-archive-'));
    const zip = join(folder, 'archive.zip');
    await download.saveAs(zip);
    expect(troubles(attorney)).toEqual([]);

    const run = (program: string, args: string[], cwd = folder): string =>
      execFileSync(program, args, { cwd, encoding: 'utf8', env: { PATH: process.env['PATH'] } });
    run('unzip', ['-tq', zip]);
    run('unzip', ['-q', zip]);
    const name = readdirSync(folder).find((one) => existsSync(join(folder, one, 'bagit.txt')));
    if (name === undefined) throw new Error('The archive holds no bag.');
    const bag = join(folder, name);
    run('sha256sum', ['-c', '--quiet', '--strict', 'manifest-sha256.txt'], bag);
    run('python3', [resolve(import.meta.dirname, '../verify_bag.py'), bag]);
    run(process.execPath, ['data/tools/verify.mjs', '.'], bag);
    expect(run(process.execPath, ['data/tools/recompute.mjs', '.'], bag)).toMatch(/identical/i);
  });

  test('nothing else is open to the attorney', async ({ browser }) => {
    const castellane = await enter(browser, 'castellane');
    await castellane.goto('/disclosures');
    await expect(castellane.getByText(title)).toHaveCount(0);
  });
});
