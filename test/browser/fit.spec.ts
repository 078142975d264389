import { expect, type Page, test } from '@playwright/test';
import { demoRecipe, replay } from './command-line';
import { dragBy, leadMap, openDemo, pointAt, savedRecipe, valueShown } from './workbench-page';

test.beforeEach(async ({ page }) => openDemo(page));

/** The exciton alone, on its own few channels: quick to fit everywhere. */
const quickModel = {
  window: [1.985, 2.028],
  components: [
    { name: 'floor', shape: 'flat' },
    { name: 'A', role: 'exciton', shape: 'gaussian', centre: 2.007, fwhm: 0.035 },
  ],
};

/** Without one, the recipe has no model. */
async function useModel(page: Page, model?: object): Promise<string> {
  const text = JSON.stringify({ ...JSON.parse(demoRecipe()), model });
  const file = { name: 'model.json', mimeType: 'application/json', buffer: Buffer.from(text) };
  await page.getByTestId('file-input').setInputFiles(file);
  await expect(page.getByText('model.json is in use.')).toBeVisible();
  await page.getByRole('button', { name: 'Settings of the peak model' }).click();
  return text;
}

const settings = (page: Page) => page.getByRole('region', { name: /^Settings of/ });

test('every pixel is fitted, to what the command line computes', async ({ page }) => {
  const text = await useModel(page, quickModel);
  await page.getByRole('button', { name: 'Fit all pixels' }).click();
  await expect(page.getByRole('button', { name: 'All pixels fitted' })).toBeVisible({
    timeout: 40_000,
  });
  const results = replay(text, { withModel: true });
  for (const pixel of [
    { x: 42, y: 59 },
    { x: 5, y: 8 },
    { x: 20, y: 40 },
  ]) {
    await pointAt(page, leadMap(page), pixel);
    for (const [map, unit] of [
      ['fit.A.centre', 'eV'],
      ['fit.A.fwhm', 'eV'],
      ['fit.A.area', 'counts'],
    ] as const) {
      await expect(valueShown(page, map)).toHaveText(results.shown(map, pixel, unit));
    }
  }
  const converged = [...Array(64 * 64).keys()].filter(
    (i) => results.value('fit.status', { x: i % 64, y: Math.floor(i / 64) }) === 1,
  ).length;
  await expect(settings(page)).toContainText(`${converged} px converged`);
});

test('a fit that is stopped keeps what is done, and goes on from there', async ({ page }) => {
  await useModel(page, {
    components: [
      { name: 'floor', shape: 'parabola' },
      { name: 'A', shape: 'gaussian', centre: 2.007, fwhm: 0.04 },
      { name: 'low', shape: 'gaussian', centre: 1.93, fwhm: 0.05, optional: true },
    ],
  });
  await page.getByRole('button', { name: 'Fit all pixels' }).click();
  await page.getByRole('button', { name: 'Stop', exact: true }).click();
  await expect(page.getByRole('button', { name: 'Go on fitting' })).toBeVisible({
    timeout: 20_000,
  });
  await expect(settings(page)).toContainText('px not fitted');
});

test('a peak is added by a click, moved by its handle, and undone', async ({ page }) => {
  await useModel(page);
  await page.getByRole('button', { name: 'Add peak' }).click();
  const ground = page.getByTestId('band-ground');
  await ground.click({ position: { x: 60, y: 60 } });
  const added = JSON.parse((await savedRecipe(page)).text).model.components;
  expect(added).toHaveLength(2);
  const handle = page.getByRole('slider', { name: 'Centre of peak' });
  const before = Number(await handle.getAttribute('aria-valuenow'));
  expect(added[1].centre).toBeCloseTo(before, 4);
  await dragBy(page, handle, 50);
  expect(Number(await handle.getAttribute('aria-valuenow'))).toBeGreaterThan(before + 0.005);
  await page.keyboard.press('Control+z');
  expect(Number(await handle.getAttribute('aria-valuenow'))).toBeCloseTo(before, 9);
});

test('a model is suggested from the scan, with the exciton where it is', async ({ page }) => {
  await useModel(page);
  await page.getByRole('button', { name: 'Suggest' }).click();
  await expect(page.getByRole('slider', { name: /^Centre of exciton/ })).toBeVisible();
  const { components } = JSON.parse((await savedRecipe(page)).text).model;
  const exciton = components.find(({ role }: { role?: string }) => role === 'exciton');
  // The demo's exciton lies near 2.01 eV (its truth file).
  expect(exciton.centre.start).toBeGreaterThan(1.99);
  expect(exciton.centre.start).toBeLessThan(2.02);
});

test('bounds that cross are refused with a sentence; good ones go into the recipe', async ({
  page,
}) => {
  await useModel(page, quickModel);
  await settings(page).getByRole('button', { name: 'A exciton, gaussian' }).click();
  const least = page.getByRole('textbox', { name: 'min of centre' });
  await least.fill('2.5');
  await least.press('Enter');
  await expect(page.getByRole('alert')).toContainText('centre');
  await least.fill('1.99');
  await least.press('Enter');
  const { components } = JSON.parse((await savedRecipe(page)).text).model;
  expect(components[1].centre).toEqual({ start: 2.007, min: 1.99 });
});
