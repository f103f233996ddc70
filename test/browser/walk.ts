/** Steps that every walk through the page is made of. */
import { readFileSync } from 'node:fs';
import { expect, type Locator, type Page } from '@playwright/test';

const { problems } = JSON.parse(readFileSync('test/reference/problems-open.json', 'utf8')) as {
  problems: { id: string; value: string; basis: string[] }[];
};

/** A value with its constants from the published problems in test/reference. */
export function problem(id: string): { value: string; basis: string[] } {
  const found = problems.find((p) => p.id === id);
  if (found === undefined) throw new Error(`no problem ${id}`);
  return found;
}

export const digits = (page: Page): Locator => page.getByLabel('Digits', { exact: true });
export const search = (page: Page): Locator => page.getByRole('button', { name: /^Search( again)?$/ });
export const verdict = (page: Page): Locator => page.locator('#verdict');
export const typed = (page: Page): Locator => page.locator('.typed');
export const saved = (page: Page): Promise<void> => expect(page.getByTestId('saving')).toHaveText('saved');

export async function freshValue(page: Page, text: string): Promise<void> {
  await page.goto('/');
  await page.getByRole('button', { name: 'New value' }).click();
  await digits(page).fill(text);
}

export async function readySpace(page: Page, weight: number): Promise<void> {
  await page
    .getByRole('group', { name: /up to weight/ })
    .getByRole('button', { name: `${weight}`, exact: true })
    .click();
}

export async function useBasis(page: Page, basis: readonly string[]): Promise<void> {
  const clear = page.getByRole('button', { name: 'Clear the basis' });
  if (await clear.isVisible()) await clear.click();
  const field = page.getByLabel('Type a constant');
  for (const text of basis) {
    await field.fill(text);
    await page.getByRole('button', { name: 'Add', exact: true }).click();
    await expect(field).toHaveValue('');
  }
  await expect(page.locator('.chip')).toHaveCount(basis.length);
}
