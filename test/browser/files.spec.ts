import { existsSync } from 'node:fs';
import { expect, test } from '@playwright/test';
import { leadMap, openDemo, pointAt, scanLine, valueShown, watch } from './workbench-page';

test.beforeEach(async ({ page }) => openDemo(page));

const input = (page: import('@playwright/test').Page) => page.getByTestId('file-input');

/** A .npy of doubles (NEP 1), C order. */
function npy(shape: readonly number[], valueAt: (index: number) => number): Buffer {
  const count = shape.reduce((product, length) => product * length, 1);
  const text = `{'descr': '<f8', 'fortran_order': False, 'shape': (${shape.join(', ')},), }`;
  const header = `${text.padEnd(117)}\n`;
  const head = Buffer.from([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0, header.length, 0]);
  const values = Float64Array.from({ length: count }, (_, index) => valueAt(index));
  return Buffer.concat([head, Buffer.from(header), Buffer.from(values.buffer)]);
}

const asNpy = (name: string, buffer: Buffer) => ({
  name,
  mimeType: 'application/octet-stream',
  buffer,
});

test('another scan opens by way of the sheet, with what was guessed on it', async ({ page }) => {
  const { faults } = watch(page);
  await input(page).setInputFiles('sample-data/twin-layer.h5');
  const sheet = page.getByRole('dialog');
  await expect(sheet.getByRole('heading', { name: 'twin-layer.h5' })).toBeVisible();
  await expect(sheet.locator('[data-field="medium"]')).toContainText('air');
  await expect(sheet.locator('[data-field="pixel"]')).toContainText('units = “nm”');
  await expect(sheet.getByRole('img', { name: /^Mean spectrum/ })).toBeVisible();
  await sheet.getByRole('button', { name: 'Open' }).click();
  await expect(scanLine(page)).toContainText('twin-layer.h5');
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveCount(3);
  expect(faults).toEqual([]);
});

test('a file that does not say its axis is asked about, and opens with the answer', async ({
  page,
}) => {
  // Channel k of pixel (y, x) holds 100 y + 10 x + k; 2 rows, 3 columns, 40 channels.
  const cube = npy(
    [2, 3, 40],
    (i) => 100 * Math.floor(i / 120) + 10 * (Math.floor(i / 40) % 3) + (i % 40),
  );
  await input(page).setInputFiles(asNpy('bare.npy', cube));
  const sheet = page.getByRole('dialog');
  await expect(sheet.getByRole('alert').first()).toBeVisible();
  await expect(sheet.getByRole('button', { name: 'Open' })).toBeDisabled();
  const axis = sheet.locator('[data-field="axis"]');
  await axis.getByRole('textbox', { name: 'from' }).fill('600');
  await axis.getByRole('textbox', { name: 'to' }).fill('639');
  await axis.getByRole('textbox', { name: 'to' }).press('Enter');
  await expect(sheet.getByRole('button', { name: 'Open' })).toBeEnabled();
  await sheet.getByRole('button', { name: 'Open' }).click();
  await expect(scanLine(page)).toContainText('bare.npy · 3 × 2 px');
  await leadMap(page).focus();
  await page.keyboard.press('ArrowRight');
  const heading = page.getByRole('heading', { name: /^Pixel/ });
  const [x = 0, y = 0] = ((await heading.textContent()) ?? '').match(/\d+/g)?.map(Number) ?? [];
  // The sum over k of 100 y + 10 x + k is 40 (100 y + 10 x) + 780.
  const total = 40 * (100 * y + 10 * x) + 780;
  await expect(valueShown(page, 'scan.total')).toHaveText(new RegExp(`^${total}(\\.0+)? counts$`));
});

/** What is no scan, and what the sentence about it must name. */
const noScans = [
  ['notes.txt', Buffer.from('dear diary,\nno numbers today\n'), 'No row of numbers'],
  ['photo.h5', Buffer.from('GIF89a not a scan at all'), 'photo.h5'],
  ['four.npy', npy([2, 2, 2, 9], (i) => i), '4'],
  ['cut.npy', npy([4, 4, 50], (i) => i).subarray(0, 900), 'cut.npy'],
  ['empty.npy', Buffer.alloc(0), 'empty'],
] as const;

test('text, a picture, four axes, a cut or empty file: each gets a sentence, the scan stays', async ({
  page,
}) => {
  const { faults } = watch(page);
  await pointAt(page, leadMap(page), { x: 9, y: 9 });
  const before = (await valueShown(page, 'band.tail.integral').textContent()) ?? '';
  for (const [name, bytes, words] of noScans) {
    await test.step(name, async () => {
      await input(page).setInputFiles(asNpy(name, Buffer.from(bytes)));
      const said = page.getByRole('alert').first();
      await expect(said).toContainText(words);
      await expect(said).toContainText(/\. \S/);
      await page.keyboard.press('Escape');
      await expect(page.getByRole('dialog')).toHaveCount(0);
      const dismiss = page.getByRole('region', { name: 'Messages' }).getByRole('button');
      while ((await dismiss.count()) > 0) await dismiss.last().click();
      await expect(page.getByRole('alert')).toHaveCount(0);
      await expect(scanLine(page)).toContainText('tent-field.h5');
    });
  }
  await pointAt(page, leadMap(page), { x: 9, y: 9 });
  await expect(valueShown(page, 'band.tail.integral')).toHaveText(before);
  expect(faults).toEqual([]);
});

test('how the scan is read can be corrected, and that is undone like any edit', async ({
  page,
}) => {
  await pointAt(page, leadMap(page), { x: 5, y: 40 });
  const before = (await valueShown(page, 'band.tail.integral').textContent()) ?? '';
  await page.getByRole('button', { name: 'Correct how the scan is read' }).click();
  const sheet = page.getByRole('dialog');
  await sheet.locator('[data-field="order"]').getByRole('button').click();
  await page.getByRole('option', { name: /^xyk/ }).click();
  await sheet.getByRole('button', { name: 'Read again' }).click();
  await pointAt(page, leadMap(page), { x: 40, y: 5 });
  await expect(valueShown(page, 'band.tail.integral')).toHaveText(before);
  await page.keyboard.press('Control+z');
  await pointAt(page, leadMap(page), { x: 5, y: 40 });
  await expect(valueShown(page, 'band.tail.integral')).toHaveText(before);
});

const measured = '../shared/real-data';
if (existsSync(measured)) {
  test('a measured line of luminescence opens with its voltage as x', async ({ page }) => {
    await input(page).setInputFiles(`${measured}/pl-mose2ws2-gate-sweeps/density_sweep.npz`);
    await page.getByRole('dialog').getByRole('button', { name: 'Open' }).click();
    await expect(scanLine(page)).toContainText('density_sweep.npz · 261 × 1 px · 1340 ch');
    await leadMap(page).hover({ position: { x: 60, y: 30 } });
    await expect(page.getByTestId('place')).toContainText(/gate|volt/i);
  });

  test('a measured Raman map asks for its laser; its values are not counts', async ({ page }) => {
    await input(page).setInputFiles(`${measured}/raman-emulsion/emulsion_nxdata.h5`);
    const sheet = page.getByRole('dialog');
    await expect(sheet.locator('[data-field="noise"]')).toContainText('none');
    const laser = sheet.getByRole('textbox', { name: 'Laser' });
    await laser.fill('532');
    await laser.press('Enter');
    await sheet.getByRole('button', { name: 'Open' }).click();
    await expect(scanLine(page)).toContainText('60 × 60 px');
    await leadMap(page).hover({ position: { x: 60, y: 60 } });
    await expect(valueShown(page, 'band.low.integral')).not.toContainText('±');
  });
}
