/** The whole path as a user walks it, with the built app, the real worker and the real IndexedDB. */
import { readFileSync } from 'node:fs';
import { expect, type Page, test } from '@playwright/test';

const { problems } = JSON.parse(readFileSync('test/reference/problems-open.json', 'utf8')) as {
  problems: { id: string; value: string; basis: string[] }[];
};
const problem = (id: string) => problems.find((p) => p.id === id) as { value: string; basis: string[] };

async function freshValue(page: Page, digits: string): Promise<void> {
  await page.goto('/');
  await page.getByRole('button', { name: 'New value' }).click();
  await page.getByLabel('Digits', { exact: true }).fill(digits);
}

async function useBasis(page: Page, basis: readonly string[]): Promise<void> {
  const clear = page.getByRole('button', { name: 'Clear all' });
  if (await clear.isVisible()) await clear.click();
  for (const text of basis) {
    await page.getByLabel('Add a constant').fill(text);
    await page.getByRole('button', { name: 'Add', exact: true }).click();
    await expect(page.getByLabel('Add a constant')).toHaveValue('');
  }
}

const search = (page: Page) => page.getByRole('button', { name: 'Search', exact: true });
const verdict = (page: Page) => page.locator('.verdict');
const saved = (page: Page) => expect(page.getByText('Saved in this browser')).toBeVisible();

test('a newcomer gets a result in one click', async ({ page }) => {
  await page.goto('/');
  await search(page).click();
  await expect(verdict(page)).toContainText('Holds');
  await expect(page.locator('.typed')).toHaveText(
    '131/54 - 11*pi^2/36 - pi^2*log(2)/3 + 7*zeta(3)/6 + 2*log(2)^4/9 + 16*Li(4,1/2)/3',
  );
  await expect(verdict(page)).toContainText('not a proof');
});

test('paste, choose a space, search, copy LaTeX, reload: still there', async ({ page }) => {
  await freshValue(page, problem('qed-two-loop').value);
  await page.getByRole('button', { name: /up to weight 4/ }).click();
  await search(page).click();
  await expect(verdict(page)).toContainText('Holds');
  await page.getByRole('button', { name: 'Copy LaTeX' }).click();
  await expect(page.getByRole('button', { name: '✓ Copied' })).toBeVisible();
  const latex = await page.evaluate(() => navigator.clipboard.readText());
  expect(latex).toBe(
    '\\frac{197}{144} + \\frac{1}{12}\\,\\pi^{2} - \\frac{1}{2}\\,\\pi^{2}\\,\\log(2) + \\frac{3}{4}\\,\\zeta(3)',
  );
  await saved(page);
  await page.reload();
  await expect(page.getByLabel('Digits', { exact: true })).toHaveValue(problem('qed-two-loop').value);
  await expect(verdict(page)).toContainText('Holds');
  await expect(page.locator('.expression .katex')).toBeVisible();
});

for (const id of ['qed-three-loop', 'massive-vacuum-log', 'euler-sum-quadratic']) {
  test(`published value ${id} from its digits and typed constants`, async ({ page }) => {
    const { value, basis } = problem(id);
    await freshValue(page, value);
    await useBasis(page, basis);
    await search(page).click();
    await expect(verdict(page)).toContainText('Holds');
  });
}

test('a value outside the basis is excluded with a bound', async ({ page }) => {
  await freshValue(page, '1.03692775514336992633136548645703416805708091950191281197419267790380358978628148456');
  await useBasis(page, ['1', 'pi^2', 'zeta(3)']);
  await search(page).click();
  await expect(verdict(page)).toContainText(/Excluded below [\d.]+ · 10[⁰¹²³⁴⁵⁶⁷⁸⁹]+/);
  await expect(verdict(page)).toContainText('provided that');
});

test('a dependent basis is named; one click drops a constant and goes on', async ({ page }) => {
  await freshValue(page, problem('euler-sum-quadratic').value);
  await useBasis(page, ['pi^4', 'zeta(4)', 'zeta(3)']);
  await search(page).click();
  await expect(verdict(page)).toContainText('Basis dependent');
  await page.getByRole('button', { name: 'Drop zeta(4) and search again' }).click();
  await expect(verdict(page)).toContainText('Holds');
  await expect(page.locator('.typed')).toHaveText('17*pi^4/360');
});

test('bad input: one sentence each, and nothing is lost', async ({ page }) => {
  await page.goto('/');
  const digits = page.getByLabel('Digits', { exact: true });
  const before = await digits.inputValue();
  const note = page.locator('.note.wrong[role="alert"]').first();
  for (const [text, said] of [
    ['abc', /“a” at line 1, column 1 is a letter/],
    ['1.2.3', /second decimal point/],
    ['NaN', /is not a number/],
    ['0,3284789', /comma/],
    ['0.0000', /zero/],
    ['1.2', /too little/],
  ] as const) {
    await digits.fill(text);
    await expect(note).toHaveText(said);
    await expect(search(page)).toBeDisabled();
  }
  await digits.evaluate((element, text) => {
    const setter = Object.getOwnPropertyDescriptor(HTMLTextAreaElement.prototype, 'value')?.set;
    setter?.call(element, text);
    element.dispatchEvent(new Event('input', { bubbles: true }));
  }, '7'.repeat(10_000_000));
  await expect(note).toHaveText(/longer than 200000 digits/);
  await digits.fill('');
  await expect(search(page)).toBeDisabled();
  for (let k = 0; k < 9 && (await digits.inputValue()) !== before; k++)
    await page.getByRole('button', { name: 'Undo' }).click();
  await expect(digits).toHaveValue(before);

  await page.getByLabel('Add a constant').fill('zetta(3)');
  await page.getByRole('button', { name: 'Add', exact: true }).click();
  await expect(page.getByText(/no constant or function called “zetta”.*zeta.*column 1/)).toBeVisible();
  await expect(page.getByLabel('Add a constant')).toHaveValue('zetta(3)');
});

test('few digits for the basis: warned before, no relation after', async ({ page }) => {
  await freshValue(page, '0.7391823');
  await page.getByRole('button', { name: /up to weight 4/ }).click();
  await expect(page.locator('.budget')).toContainText('Too few');
  await search(page).click();
  await expect(verdict(page)).toContainText(/Inconclusive|Excluded/);
});

test('a long search shows progress, can be cancelled, and never blocks the page', async ({ page }) => {
  const digits = Array.from({ length: 1500 }, (_, k) => (k * k * 7 + ((k * 31) % 17) + (k ** 3 % 13)) % 10).join('');
  await freshValue(page, `0.${digits}`);
  await page.getByText('Choose a space').click();
  await page.getByLabel('Weight').selectOption('6');
  await page.getByRole('button', { name: 'Use this space' }).click();
  await expect(page.locator('.chip .katex').first()).toBeVisible();
  await page.evaluate(() => {
    const seen: number[] = [];
    Object.assign(globalThis, { longTasks: seen });
    new PerformanceObserver((list) => seen.push(...list.getEntries().map((e) => e.duration))).observe({
      type: 'longtask',
    });
  });
  await search(page).click();
  await expect(page.getByText('Digits consumed')).toBeVisible();
  await expect(page.locator('.facts dd').filter({ hasText: '%' })).toBeVisible({ timeout: 30_000 });
  await page.waitForTimeout(800);
  const started = Date.now();
  await page.getByRole('button', { name: 'Cancel' }).click();
  await expect(search(page)).toBeVisible();
  expect(Date.now() - started).toBeLessThan(1500);
  const longTasks = await page.evaluate(() => (globalThis as unknown as { longTasks: number[] }).longTasks);
  expect(longTasks.filter((ms) => ms > 200)).toEqual([]);
  test
    .info()
    .annotations.push({ type: 'long tasks (ms)', description: longTasks.map(Math.round).join(', ') || 'none' });
});

test('a saved basis set serves another value after a reload', async ({ page }) => {
  await page.goto('/');
  await page.getByText('Basis sets').click();
  await page.getByLabel('Save the present basis as').fill('weight four');
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await saved(page);
  await page.reload();
  await page.getByRole('button', { name: 'New value' }).click();
  await page.getByRole('button', { name: 'Clear all' }).click();
  await page.getByText(/Basis sets/).click();
  await page
    .getByRole('button', { name: /weight four/ })
    .first()
    .click();
  await expect(page.locator('.chip')).toHaveCount(12);
});

test('a second tab cannot silently overwrite', async ({ page, context }) => {
  await page.goto('/');
  await page.getByLabel('Name', { exact: true }).fill('first tab');
  await saved(page);
  const other = await context.newPage();
  await other.goto('/');
  await other.getByLabel('Name', { exact: true }).fill('second tab');
  await expect(other.getByText('Saved in this browser')).toBeVisible();
  await page.getByLabel('Name', { exact: true }).fill('first tab again');
  await expect(page.getByText(/changed in another tab/)).toBeVisible();
  await page.getByRole('button', { name: 'Load the newer state' }).click();
  await expect(page.getByLabel('Name', { exact: true })).toHaveValue('second tab');
});

test('by keyboard alone: new value, digits, space, search, copy', async ({ page }) => {
  await page.goto('/');
  const press = async (name: RegExp | string, role: 'button' = 'button') => {
    await page.getByRole(role, { name }).first().focus();
    await page.keyboard.press('Enter');
  };
  await press('New value');
  await page.getByLabel('Digits', { exact: true }).focus();
  await page.keyboard.insertText(problem('qed-two-loop').value);
  await press(/up to weight 3/);
  await page.keyboard.press('Control+Enter');
  await expect(verdict(page)).toContainText('Holds');
  await press('Copy text');
  expect(await page.evaluate(() => navigator.clipboard.readText())).toContain('197/144');
  await expect(page.getByRole('status')).toHaveText(/copied/);
});

test('nothing is asked of any other host', async ({ page, baseURL }) => {
  const foreign: string[] = [];
  page.on('request', (request) => {
    if (!request.url().startsWith(baseURL as string) && !request.url().startsWith('data:')) foreign.push(request.url());
  });
  await page.goto('/');
  await search(page).click();
  await expect(verdict(page)).toContainText('Holds');
  expect(foreign).toEqual([]);
});
