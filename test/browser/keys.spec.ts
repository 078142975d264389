import { expect, type Page, test } from '@playwright/test';
import { leadMap, openDemo } from './workbench-page';

test.beforeEach(async ({ page }) => openDemo(page));

const theme = (page: Page) => page.locator('html');
const leadChoice = (page: Page) => page.locator('main button[aria-haspopup="listbox"]').first();

test('a key on a closed list means what it means elsewhere, and chooses nothing', async ({
  page,
}) => {
  const before = (await leadChoice(page).textContent()) ?? '';
  await leadChoice(page).focus();
  // A list that takes letters for the beginning of a choice would find "Energy of …".
  await page.keyboard.press('e');
  await page.keyboard.press('t');
  await expect(theme(page)).toHaveAttribute('data-theme', 'light');
  await expect(leadChoice(page)).toHaveText(before);
});

test('a slider under the hand leaves the keys to the screen', async ({ page }) => {
  await page.locator('input[type="range"]').first().focus();
  await page.keyboard.press('ArrowRight');
  const undo = page.getByRole('button', { name: /^Undo: Set the limits/ });
  await expect(undo).toBeVisible();
  await page.keyboard.press('Control+z');
  await expect(undo).toHaveCount(0);
});

test('what is typed into a field stays there', async ({ page }) => {
  await page.getByRole('textbox').first().focus();
  await page.keyboard.press('t');
  await expect(theme(page)).toHaveAttribute('data-theme', 'dark');
});

test('Esc lets go of the selected band and leaves it in the recipe', async ({ page }) => {
  await page.locator('[data-band="tail"] [role="slider"]').first().focus();
  const settings = page.getByRole('heading', { name: /^Band/ });
  await expect(settings).toBeVisible();
  await page.keyboard.press('Escape');
  await expect(settings).toHaveCount(0);
  await page.keyboard.press('Delete');
  await expect(page.locator('[data-band="tail"]')).toBeAttached();
});

test('"p" over a map pins the pixel, and lets go of it again', async ({ page }) => {
  await leadMap(page).hover({ position: { x: 100, y: 100 } });
  await page.keyboard.press('p');
  await expect(page.getByRole('button', { name: /^Undo: Pin pixel/ })).toBeVisible();
  await page.keyboard.press('p');
  await expect(page.getByRole('button', { name: /^Undo: Let go of pin D/ })).toBeVisible();
});

test('a message over an open sheet is heard, and once dismissed the sheet has the keys again', async ({
  page,
}) => {
  await page.getByTestId('file-input').setInputFiles('sample-data/twin-layer.h5');
  const sheet = page.getByRole('dialog');
  await expect(sheet.getByRole('button', { name: 'Open' })).toBeFocused();
  await page
    .getByTestId('companion-input')
    .setInputFiles({ name: 'no.json', mimeType: 'application/json', buffer: Buffer.from('{}') });
  await expect(page.getByRole('alert')).toContainText('no.json was not opened');
  await page.getByRole('button', { name: 'Dismiss' }).click();
  await expect(page.getByRole('alert')).toHaveCount(0);
  await expect(sheet).toBeVisible();
  await page.keyboard.press('Escape');
  await expect(sheet).toHaveCount(0);
});
