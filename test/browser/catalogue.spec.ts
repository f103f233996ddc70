/** The catalogue: search by words and by first digits, values to many digits, rewriting into a space. */
import { readFileSync } from 'node:fs';
import { expect, test } from '@playwright/test';

const { constants } = JSON.parse(readFileSync('test/reference/constants.json', 'utf8')) as {
  constants: { id: string; digits: string }[];
};
const reference = (id: string): string => constants.find((c) => c.id === id)?.digits as string;

test('a constant is found by its first digits, by weight and by family', async ({ page }) => {
  await page.goto('/#catalogue');
  const search = page.getByLabel('Name, symbol, weight, family, or first digits');
  await search.fill('0.91596');
  await expect(page.locator('.constants')).toContainText('catalan', { timeout: 30_000 });
  await search.fill('weight 3 clausen');
  await expect(page.locator('.constants li').first()).toContainText('Cl(3,');
  await page.getByLabel('Family', { exact: true }).selectOption({ label: 'Bessel moments' });
  await search.fill('');
  await expect(page.locator('.constants li').first()).toContainText('bessel(');
});

test('1,000 digits of a typed constant, right to the last one (reference tables), copied and added to the basis', async ({
  page,
}) => {
  await page.goto('/#catalogue');
  const constant = page.getByLabel('Constant', { exact: true });
  await constant.fill('zeta(-5,-3)');
  await page.getByLabel('Digits', { exact: true }).fill('1000');
  const shown = async () => (await page.locator('.card-digits').textContent())?.replace(/\s/g, '');
  await expect.poll(shown, { timeout: 30_000 }).toBe(reference('zeta(-5,-3)'));
  await page.getByRole('button', { name: 'Copy digits' }).click();
  await expect(page.getByRole('button', { name: /Copied/ })).toBeVisible();
  expect(await page.evaluate(() => navigator.clipboard.readText())).toBe(reference('zeta(-5,-3)'));
  await page.getByRole('button', { name: 'Add to the basis' }).click();
  await expect(page.getByRole('button', { name: 'In the basis' })).toBeDisabled();
  await constant.fill('zeta(2,1)');
  await page.getByLabel('Write in the space').selectOption({ label: 'Multiple zeta values' });
  await expect(page.locator('.rewrite .katex')).toBeVisible({ timeout: 30_000 });
  await constant.fill('zeta(1)');
  await expect(page.getByRole('alert').first()).toContainText(/zeta/);
});
