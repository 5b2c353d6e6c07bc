import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { enter, open, troubles, watched, type Who } from './people';

/**
 * Every screen, light and dark, at 1280 and 820: no error in the console, no sideways scrolling of the
 * page; a picture of each goes to test-results/screens to be looked at. Axe, which takes most of the
 * time, looks at each colour scheme and each width once, and must find nothing serious.
 */
const looks = [
  { name: 'light-1280', scheme: 'light', width: 1280, height: 800, axe: true },
  { name: 'dark-1280', scheme: 'dark', width: 1280, height: 800, axe: false },
  { name: 'light-820', scheme: 'light', width: 820, height: 1180, axe: false },
  { name: 'dark-820', scheme: 'dark', width: 820, height: 1180, axe: true },
] as const;
type Look = (typeof looks)[number];

const sections = [
  'brief',
  'exhibits',
  'custody',
  'survey',
  'motion',
  'findings',
  'disclosure',
  'log',
];

async function check(page: Page, screen: string, look: Look): Promise<void> {
  const name = `${screen}-${look.name}`;
  await page.waitForLoadState('networkidle');
  await page.evaluate(() => document.fonts.ready);
  // The engine answers in a worker, and the plan draws after its data: wait for what says so.
  await expect(page.locator('[role=status]', { hasText: /…$/ })).toHaveCount(0);
  await page.screenshot({ path: `test-results/screens/${name}.png`, fullPage: true });
  if (look.axe) await lookWithAxe(page, name);
  expect.soft(troubles(page), name).toEqual([]);
  const sideways = await page.evaluate(
    () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
  );
  expect.soft(sideways, `${name} scrolls sideways`).toBeLessThanOrEqual(0);
}

async function lookWithAxe(page: Page, name: string): Promise<void> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
    .analyze();
  const serious = violations.filter((v) => v.impact === 'serious' || v.impact === 'critical');
  expect
    .soft(
      serious.map((v) => `${v.id}: ${v.nodes.map((node) => node.target.join(' ')).join('; ')}`),
      name,
    )
    .toEqual([]);
}

async function caseId(page: Page, number: string): Promise<string> {
  const answer = await page.request.get('/api/cases');
  const { items } = (await answer.json()) as { items: { id: string; number: string }[] };
  const found = items.find((item) => item.number === number);
  if (!found) throw new Error(`no case ${number}`);
  return found.id;
}

for (const look of looks) {
  test(`the screens, ${look.name}`, async ({ browser }) => {
    test.setTimeout(600_000);
    const stranger = await watched(await open(browser, look));
    await stranger.goto('/');
    await check(stranger, 'sign-in', look);

    const lead = await enter(browser, 'lead', look);
    for (const path of ['cases', 'laboratory']) {
      await lead.goto(`/${path}`);
      await check(lead, `lead-${path}`, look);
    }
    for (const [who, number] of [
      ['varo', '2026-014'],
      ['varo', '2026-011'],
      ['oduya', '2026-013'],
    ] as [Who, string][]) {
      const page = await enter(browser, who, look);
      const id = await caseId(page, number);
      for (const section of number === '2026-014' ? sections : ['survey', 'motion']) {
        await page.goto(`/cases/${id}/${section}`);
        await check(page, `${number}-${section}`, look);
      }
      await page.context().close();
    }

    const attorney = await enter(browser, 'thorne', look);
    await attorney.goto('/disclosures');
    await check(attorney, 'attorney-disclosures', look);
    await attorney.getByRole('link', { name: /Spin on Marl Lane bend/ }).click();
    await expect(attorney).toHaveURL(/disclosures\/.+/);
    await check(attorney, 'attorney-summary', look);
  });
}
