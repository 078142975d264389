/** Files are opened where they are dropped: anywhere on the page. */
import { readFileSync } from 'node:fs';
import { expect, type JSHandle, type Page, test } from '@playwright/test';
import { replay } from './command-line';
import { leadMap, openDemo, pointAt, savedRecipe, scanLine, valueShown } from './workbench-page';

interface Dropped {
  readonly name: string;
  readonly bytes: Buffer;
}

/** What a hand carries over the page. */
async function carried(page: Page, files: readonly Dropped[]): Promise<JSHandle<DataTransfer>> {
  const encoded = files.map(({ name, bytes }) => ({ name, base64: bytes.toString('base64') }));
  return page.evaluateHandle((all) => {
    const transfer = new DataTransfer();
    for (const { name, base64 } of all) {
      const bytes = Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0));
      transfer.items.add(new File([bytes], name));
    }
    return transfer;
  }, encoded);
}

const oneBand = {
  recipe: 1,
  bands: [{ name: 'rim', from: 1.88, to: 1.93, unit: 'eV' }],
  blend: { mode: 'additive', channels: [{ source: 'band.rim.integral', colour: '#40c0ff' }] },
};

test('a scan and its recipe dropped together open as the recipe says', async ({ page }) => {
  await openDemo(page);
  const text = JSON.stringify(oneBand);
  const dataTransfer = await carried(page, [
    { name: 'rim.recipe.json', bytes: Buffer.from(text) },
    { name: 'again.h5', bytes: readFileSync('sample-data/tent-field.h5') },
  ]);
  const says = page.getByText(/^Drop/);
  await page.dispatchEvent('body', 'dragenter', { dataTransfer });
  await expect(says).toBeVisible();
  await page.dispatchEvent('body', 'drop', { dataTransfer });
  await expect(says).toHaveCount(0);
  const sheet = page.getByRole('dialog');
  await expect(sheet.getByRole('heading', { name: 'again.h5' })).toBeVisible();
  await sheet.getByRole('button', { name: 'Open' }).click();
  await expect(scanLine(page)).toContainText('again.h5 · 64 × 64 px');
  await expect(page.getByRole('button', { name: /^Map of band/ })).toHaveText([/^rim/]);
  expect(JSON.parse((await savedRecipe(page)).text).bands).toMatchObject(oneBand.bands);
  const results = replay(text);
  for (const pixel of [
    { x: 20, y: 40 },
    { x: 50, y: 7 },
  ]) {
    await pointAt(page, leadMap(page), pixel);
    const counts = 'band.rim.integral';
    await expect(valueShown(page, counts)).toHaveText(results.shown(counts, pixel, 'counts'));
    const centroid = 'band.rim.centroid';
    await expect(valueShown(page, centroid)).toHaveText(results.shown(centroid, pixel, 'eV'));
  }
});

test('what is carried over the page and away again opens nothing', async ({ page }) => {
  await openDemo(page);
  const { text } = await savedRecipe(page);
  const dataTransfer = await carried(page, [{ name: 'a.csv', bytes: Buffer.from('1,2\n') }]);
  const says = page.getByText(/^Drop/);
  await page.dispatchEvent('body', 'dragenter', { dataTransfer });
  await expect(says).toBeVisible();
  await page.dispatchEvent('body', 'dragleave', { dataTransfer });
  await expect(says).toHaveCount(0);
  await expect(page.getByRole('dialog')).toHaveCount(0);
  expect((await savedRecipe(page)).text).toBe(text);
});
