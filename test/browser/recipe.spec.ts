import { expect, test } from '@playwright/test';
import { demoRecipe } from './command-line';
import {
  dragBy,
  keptForNextVisit,
  leadMap,
  openDemo,
  pointAt,
  savedRecipe,
  scanLine,
  valueShown,
} from './workbench-page';

test.beforeEach(async ({ page }) => openDemo(page));

const asFile = (name: string, text: string) => ({
  name,
  mimeType: 'application/json',
  buffer: Buffer.from(text),
});

test('a reload brings the work back', async ({ page }) => {
  await dragBy(page, page.getByRole('slider', { name: 'Upper end of band tail' }), 25);
  await pointAt(page, leadMap(page), { x: 30, y: 30 });
  const shown = (await valueShown(page, 'band.tail.integral').textContent()) ?? '';
  const { text } = await savedRecipe(page);
  await keptForNextVisit(page, text);
  await page.reload();
  await expect(scanLine(page)).toContainText('tent-field.h5');
  await pointAt(page, leadMap(page), { x: 30, y: 30 });
  await expect(valueShown(page, 'band.tail.integral')).toHaveText(shown);
  expect((await savedRecipe(page)).text).toBe(text);
});

test('a scan of the user’s own comes back after a reload, with what was done to it', async ({
  page,
}) => {
  await page.getByTestId('file-input').setInputFiles('sample-data/twin-layer.h5');
  await page.getByRole('dialog').getByRole('button', { name: 'Open' }).click();
  await expect(scanLine(page)).toContainText('twin-layer.h5');
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveCount(3);
  await dragBy(page, page.getByRole('slider', { name: 'Upper end of band high' }), -30);
  const { text } = await savedRecipe(page);
  const high = JSON.parse(text).bands.at(-1);
  expect(high.name).toBe('high');
  await keptForNextVisit(page, text);
  await page.reload();
  await expect(scanLine(page)).toContainText('twin-layer.h5');
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveCount(3);
  expect((await savedRecipe(page)).text).toBe(text);
});

test('a saved recipe opens again, as one step that can be undone', async ({ page }) => {
  await dragBy(page, page.getByRole('slider', { name: 'Upper end of band tail' }), 25);
  const moved = await savedRecipe(page);
  expect(moved.name).toBe('tent-field.recipe.json');
  await page.keyboard.press('Control+z');
  const original = await savedRecipe(page);
  expect(original.text).not.toBe(moved.text);
  await page.getByTestId('file-input').setInputFiles(asFile(moved.name, moved.text));
  await expect(page.getByText('tent-field.recipe.json is in use.')).toBeVisible();
  expect((await savedRecipe(page)).text).toBe(moved.text);
  await page.keyboard.press('Control+z');
  expect((await savedRecipe(page)).text).toBe(original.text);
});

test('a recipe with a mistake is refused in one sentence, and nothing changes', async ({
  page,
}) => {
  const before = await savedRecipe(page);
  const wrong = demoRecipe().replace('"bands"', '"bnads"');
  await page.getByTestId('file-input').setInputFiles(asFile('wrong.json', wrong));
  await expect(page.getByRole('alert')).toContainText('wrong.json was not opened');
  await expect(page.getByRole('alert')).toContainText('bnads');
  await expect(page.getByRole('alert')).toContainText('bands');
  expect((await savedRecipe(page)).text).toBe(before.text);
});

test('a block this build cannot run is said on its card, never skipped in silence', async ({
  page,
}) => {
  const recipe = { ...JSON.parse(demoRecipe()), features: { source: 'scan.height' } };
  await page
    .getByTestId('file-input')
    .setInputFiles(asFile('features.json', JSON.stringify(recipe)));
  const card = page.getByRole('complementary', { name: 'Recipe' }).getByText('cannot run it yet');
  await expect(card).toHaveCount(1);
});
