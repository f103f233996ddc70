/** Pictures of the main states in both themes and sizes, to be looked at; each state is also checked by axe-core. */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { expect, type Page, test } from '@playwright/test';
import { digits, search, verdict } from './walk.ts';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const sizes = [
  { name: '1440', width: 1440, height: 900 },
  { name: '390', width: 390, height: 844 },
];
const themes = ['light', 'dark'] as const;

/** What axe-core objects to, as "rule: element" lines. */
async function objections(page: Page): Promise<string[]> {
  await page.evaluate(axe);
  return page.evaluate(async () => {
    const { violations } = await (
      globalThis as unknown as { axe: { run(): Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> } }
    ).axe.run();
    return violations.flatMap((v) => v.nodes.map((n) => `${v.id}: ${n.html.slice(0, 160)}`));
  });
}

for (const size of sizes) {
  for (const theme of themes) {
    test(`every state, ${size.name} ${theme}`, async ({ page }) => {
      const look = async (name: string): Promise<void> => {
        await page.evaluate(() => scrollTo(0, 0));
        await page.screenshot({ path: `test-results/screens/${name}-${size.name}-${theme}-fold.png` });
        // The whole page in a window of its own height, so that what keeps to the window's foot is in its place.
        const height = await page.evaluate(() => document.documentElement.scrollHeight);
        await page.setViewportSize({ width: size.width, height });
        await page.screenshot({ path: `test-results/screens/${name}-${size.name}-${theme}.png` });
        await page.setViewportSize(size);
        expect(await objections(page)).toEqual([]);
        const sideways = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
        expect(sideways).toBeLessThanOrEqual(0);
      };
      const open = (name: RegExp) => page.locator('.value-button').filter({ hasText: name }).click();
      await page.setViewportSize(size);
      await page.emulateMedia({ colorScheme: theme });
      await page.goto('/');
      await expect(page.locator('.chip .katex')).toHaveCount(12);
      await look('first');
      await search(page).click();
      await expect(verdict(page)).toContainText('Holds');
      await page.waitForSelector('.expression .katex');
      await look('holds');
      await page.getByLabel('Trusted digits').fill('100');
      await expect(page.getByText('belongs to an earlier state')).toBeVisible();
      await look('stale');
      await open(/Plover/);
      await search(page).click();
      await expect(verdict(page)).toContainText('Excluded');
      await look('excluded');
      await open(/Dunlin/);
      await search(page).click();
      await expect(verdict(page)).toContainText('look wrong');
      await look('wrong-tail');
      await page.getByRole('button', { name: 'New value' }).click();
      await digits(page).fill('0.12345x');
      await look('bad-input');
      await page.getByRole('button', { name: 'Keys' }).click();
      await look('keys');
    });
  }
}

test('the theme switch overrides the system and survives a reload', async ({ page }) => {
  const ground = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
  await page.emulateMedia({ colorScheme: 'light' });
  await page.goto('/');
  const light = await ground();
  await page.getByLabel('Theme').selectOption('dark');
  const dark = await ground();
  expect(dark).not.toBe(light);
  await page.reload();
  expect(await ground()).toBe(dark);
  await page.getByLabel('Theme').selectOption('system');
  expect(await ground()).toBe(light);
});
