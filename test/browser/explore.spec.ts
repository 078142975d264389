import { expect, test } from '@playwright/test';
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
  expect(await drawn()).toBe(0);
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
  const pixel = { x: 16, y: 16 };
  await pointAt(page, leadMap(page), pixel);
  await page.mouse.wheel(0, -600);
  await expect(page.getByRole('heading', { name: 'Pixel 16, 16' })).toBeVisible();
  const zoomed = await leadMap(page).screenshot();
  await page.mouse.move(5, 5);
  await page.keyboard.press('0');
  await expect.poll(async () => (await leadMap(page).screenshot()).equals(zoomed)).toBe(false);
  await pointAt(page, leadMap(page), { x: 60, y: 60 });
});

test('a pin is named, and its name comes with the pixel', async ({ page }) => {
  const label = page.getByRole('textbox', { name: 'Label of pin A' });
  await label.fill('far from any tent');
  await label.press('Enter');
  await pointAt(page, leadMap(page), { x: 42, y: 59 });
  await expect(page.getByTestId('values')).toContainText('A far from any tent');
});
