import { expect, test } from '@playwright/test';
import { replay } from './command-line';
import { dragBy, leadMap, openDemo, pointAt, savedRecipe, valueShown } from './workbench-page';

test.beforeEach(async ({ page }) => openDemo(page));

const pixel = { x: 37, y: 37 };

test('a dragged edge takes the maps along, to what the command line computes', async ({ page }) => {
  await pointAt(page, leadMap(page), pixel);
  const before = await valueShown(page, 'band.tail.integral').textContent();
  await dragBy(page, page.getByRole('slider', { name: 'Upper end of band tail' }), 40);
  await pointAt(page, leadMap(page), pixel);
  await expect(valueShown(page, 'band.tail.integral')).not.toHaveText(before ?? '');
  const { text } = await savedRecipe(page);
  const moved = JSON.parse(text).bands.find(({ name }: { name: string }) => name === 'tail');
  expect(moved.from).toBe(1.865);
  expect(moved.to).toBeGreaterThan(1.93);
  const results = replay(text);
  await pointAt(page, leadMap(page), pixel);
  for (const [map, unit] of [
    ['band.tail.integral', 'counts'],
    ['band.tail.centroid', 'eV'],
  ] as const) {
    await expect(valueShown(page, map)).toHaveText(results.shown(map, pixel, unit));
  }
});

test('one drag is one undo, and redo brings it back', async ({ page }) => {
  const values = valueShown(page, 'band.exciton.integral');
  await pointAt(page, leadMap(page), pixel);
  const before = (await values.textContent()) ?? '';
  await dragBy(page, page.getByRole('slider', { name: 'Band exciton', exact: true }), -30);
  await pointAt(page, leadMap(page), pixel);
  await expect(values).not.toHaveText(before);
  const after = (await values.textContent()) ?? '';
  await page.keyboard.press('Control+z');
  await expect(values).toHaveText(before);
  await page.keyboard.press('Control+Shift+Z');
  await expect(values).toHaveText(after);
  await page.getByRole('button', { name: 'Undo: Move band exciton' }).click();
  await expect(page.getByRole('button', { name: 'Undo', exact: true })).toBeDisabled();
});

test('a drag across empty ground makes a band with its own map', async ({ page }) => {
  const ground = page.getByTestId('band-ground');
  const box = await ground.boundingBox();
  if (box === null) throw new Error('no spectrum on screen');
  const y = box.y + box.height / 2;
  await page.mouse.move(box.x + 20, y);
  await page.mouse.down();
  await page.mouse.move(box.x + 60, y, { steps: 4 });
  await page.mouse.move(box.x + 100, y, { steps: 4 });
  await page.mouse.up();
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveCount(6);
  const { text } = await savedRecipe(page);
  const made = JSON.parse(text).bands.at(-1);
  await pointAt(page, leadMap(page), pixel);
  const map = `band.${made.name}.integral`;
  await expect(valueShown(page, map)).toHaveText(replay(text).shown(map, pixel, 'counts'));
});

test('keys move an end by a thousandth of what is shown', async ({ page }) => {
  const end = page.getByRole('slider', { name: 'Lower end of band shoulder' });
  await end.focus();
  const before = Number(await end.getAttribute('aria-valuenow'));
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('ArrowRight');
  const after = Number(await end.getAttribute('aria-valuenow'));
  expect(after - before).toBeGreaterThan(0.0003);
  expect(after - before).toBeLessThan(0.0007);
});

test('a deleted band is gone from maps and blend, and comes back by one undo', async ({ page }) => {
  await page.getByRole('slider', { name: 'Band tail', exact: true }).focus();
  await page.keyboard.press('Delete');
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveCount(4);
  await expect(page.getByText('Band tail was deleted.')).toBeVisible();
  await page
    .getByRole('region', { name: 'Messages' })
    .getByRole('button', { name: 'Undo' })
    .click();
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveCount(5);
  const { text } = await savedRecipe(page);
  expect(JSON.parse(text).blend.channels).toHaveLength(3);
});

test('exact ends, another quantity and another floor are set in the column', async ({ page }) => {
  await page.getByRole('button', { name: 'A1', exact: true }).click();
  const from = page.getByRole('textbox', { name: 'from, cm⁻¹' });
  await from.fill('405.5');
  await from.press('Enter');
  await page.getByText('none', { exact: true }).click();
  await page.getByRole('button', { name: 'centroid', exact: true }).click();
  const { text } = await savedRecipe(page);
  const band = JSON.parse(text).bands.find(({ name }: { name: string }) => name === 'A1');
  expect(band).toMatchObject({ from: 405.5, to: 436, unit: 'cm-1', floor: 'none' });
  await expect(page.getByRole('application', { name: /Centroid of band A1/ })).toBeVisible();
});
