import { expect, type Locator, test } from '@playwright/test';
import { demoRecipe, type Results, replay } from './command-line';
import { blendMap, leadMap, openDemo, placeOfPixel, pointAt, valueShown } from './workbench-page';

let results: Results;
test.beforeAll(() => {
  results = replay(demoRecipe());
});

test.beforeEach(async ({ page }) => openDemo(page));

test('hovering shows the numbers the command line computes', async ({ page }) => {
  for (const pixel of [
    { x: 3, y: 5 },
    { x: 41, y: 37 },
    { x: 63, y: 0 },
  ]) {
    await pointAt(page, leadMap(page), pixel);
    for (const band of ['tail', 'shoulder', 'exciton']) {
      const counts = `band.${band}.integral`;
      await expect(valueShown(page, counts)).toHaveText(results.shown(counts, pixel, 'counts'));
      const centroid = `band.${band}.centroid`;
      await expect(valueShown(page, centroid)).toHaveText(results.shown(centroid, pixel, 'eV'));
    }
  }
});

test('the crosshair is one: pointing at the blend reads the same pixel', async ({ page }) => {
  const pixel = { x: 22, y: 48 };
  await pointAt(page, blendMap(page), pixel);
  const map = 'band.tail.integral';
  await expect(valueShown(page, map)).toHaveText(results.shown(map, pixel, 'counts'));
  await expect(page.getByTestId('place')).toHaveText('x 330 nm  y 720 nm');
});

test('the spectrum of the pixel is drawn over the plot', async ({ page }) => {
  const drawn = (): Promise<number> =>
    page.locator('canvas[class*="hover"]').evaluate((canvas: HTMLCanvasElement) => {
      const data = canvas.getContext('2d')?.getImageData(0, 0, canvas.width, canvas.height).data;
      return (data ?? []).filter((value: number, index: number) => index % 4 === 3 && value > 0)
        .length;
    });
  // With a model, the last pin's fit is drawn where nothing is pointed at.
  const text = JSON.stringify({ ...JSON.parse(demoRecipe()), model: undefined });
  const file = { name: 'bare.json', mimeType: 'application/json', buffer: Buffer.from(text) };
  await page.getByTestId('file-input').setInputFiles(file);
  await expect(page.getByText('bare.json is in use.')).toBeVisible();
  await expect.poll(drawn).toBe(0);
  await pointAt(page, leadMap(page), { x: 30, y: 12 });
  await expect.poll(drawn).toBeGreaterThan(500);
  await page.mouse.move(5, 5);
  await expect.poll(drawn).toBe(0);
});

test('a click pins a pixel, a second one lets go of it', async ({ page }) => {
  const pins = page.getByRole('region', { name: 'Pins' }).getByRole('listitem');
  await expect(pins).toHaveCount(3);
  const position = await placeOfPixel(leadMap(page), { x: 10, y: 50 });
  await leadMap(page).click({ position });
  await expect(pins).toHaveCount(4);
  await expect(pins.last()).toContainText('D');
  await expect(pins.last()).toContainText('10, 50');
  await leadMap(page).click({ position });
  await expect(pins).toHaveCount(3);
});

test('keys alone move the crosshair and pin', async ({ page }) => {
  await leadMap(page).focus();
  await page.keyboard.press('ArrowRight');
  const heading = page.getByRole('heading', { name: /^Pixel/ });
  const before = ((await heading.textContent()) ?? '').match(/\d+/g)?.map(Number) ?? [];
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('ArrowDown');
  const [x = 0, y = 0] = before;
  await expect(heading).toContainText(`Pixel ${x + 10}, ${y + 1}`);
  await page.keyboard.press('Enter');
  const pins = page.getByRole('region', { name: 'Pins' }).getByRole('listitem');
  await expect(pins.last()).toContainText(`${x + 10}, ${y + 1}`);
});

test('the wheel zooms both maps about the cursor, a key fits them again', async ({ page }) => {
  const heading = page.getByRole('heading', { name: /^Pixel/ });
  const pixelAt = async (map: Locator, x: number, y: number): Promise<readonly number[]> => {
    await map.hover({ position: await placeOfPixel(map, { x, y }) });
    return ((await heading.textContent()) ?? '').match(/\d+/g)?.map(Number) ?? [];
  };
  expect(await pixelAt(leadMap(page), 16, 16)).toEqual([16, 16]);
  await page.mouse.wheel(0, -600);
  // Where pixel 32, 16 was is now one nearer to the cursor's, on both maps the same.
  await expect.poll(async () => (await pixelAt(leadMap(page), 32, 16))[0]).toBeLessThan(30);
  const [x = 0, y = 0] = await pixelAt(leadMap(page), 32, 16);
  expect(x).toBeGreaterThan(16);
  expect(y).toBe(16);
  expect(await pixelAt(blendMap(page), 32, 16)).toEqual([x, y]);
  expect(await pixelAt(leadMap(page), 16, 16)).toEqual([16, 16]);
  await page.keyboard.press('0');
  await expect.poll(() => pixelAt(leadMap(page), 60, 60)).toEqual([60, 60]);
  expect(await pixelAt(blendMap(page), 3, 60)).toEqual([3, 60]);
});

test('a pin is named, and its name comes with the pixel', async ({ page }) => {
  const label = page.getByRole('textbox', { name: 'Label of pin A' });
  await label.fill('far from any tent');
  await label.press('Enter');
  await pointAt(page, leadMap(page), { x: 42, y: 59 });
  await expect(page.getByTestId('values')).toContainText('A far from any tent');
});
