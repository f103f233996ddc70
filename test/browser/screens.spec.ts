/** Pictures of the main states in both themes and sizes, to be looked at; each state is also checked by axe-core. */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { expect, type Page, test } from '@playwright/test';

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
    test(`first visit and result, ${size.name} ${theme}`, async ({ page }) => {
      await page.setViewportSize(size);
      await page.emulateMedia({ colorScheme: theme });
      await page.goto('/');
      await expect(page.getByRole('heading', { name: 'Value' })).toBeVisible();
      await page.waitForSelector('.chip .katex');
      const shot = (name: string) =>
        page.screenshot({ path: `test-results/screens/${name}-${size.name}-${theme}.png`, fullPage: true });
      await shot('first');
      expect(await objections(page)).toEqual([]);
      await page.getByRole('button', { name: 'Search', exact: true }).click();
      await expect(page.locator('.verdict')).toContainText('Holds');
      await page.waitForSelector('.expression .katex');
      await shot('holds');
      expect(await objections(page)).toEqual([]);
      await page
        .getByRole('button', { name: /Plover graph/ })
        .first()
        .click();
      await page.getByRole('button', { name: 'Search', exact: true }).click();
      await expect(page.locator('.verdict')).toContainText('Excluded below');
      await shot('excluded');
      await page
        .getByRole('button', { name: /Dunlin graph/ })
        .first()
        .click();
      await page.getByRole('button', { name: 'Search', exact: true }).click();
      await expect(page.locator('.verdict')).toContainText('look wrong');
      await shot('wrong-tail');
      expect(await objections(page)).toEqual([]);
      const sideways = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
      expect(sideways).toBeLessThanOrEqual(0);
    });
  }
}
