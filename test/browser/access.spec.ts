import { readFileSync } from 'node:fs';
import { AxeBuilder } from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { demoRecipe, replay } from './command-line';
import { openDemo, valueShown } from './workbench-page';

async function seriousFindings(page: Page): Promise<readonly string[]> {
  const { violations, passes } = await new AxeBuilder({ page }).analyze();
  expect(passes.length).toBeGreaterThan(10);
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .flatMap(({ id, nodes }) => nodes.map(({ html }) => `${id}: ${html.slice(0, 160)}`));
}

for (const theme of ['dark', 'light'] as const) {
  test(`nothing serious stands in the way of a screen reader, ${theme}`, async ({ page }) => {
    await openDemo(page);
    if (theme === 'light') await page.keyboard.press('t');
    await expect(page.locator('html')).toHaveAttribute('data-theme', theme);
    expect(await seriousFindings(page)).toEqual([]);
    await page.keyboard.press('?');
    await expect(page.getByRole('dialog')).toBeVisible();
    expect(await seriousFindings(page)).toEqual([]);
    await page.keyboard.press('Escape');
    await page.getByTestId('file-input').setInputFiles('sample-data/twin-layer.h5');
    await expect(page.getByRole('img', { name: /^Mean spectrum/ })).toBeVisible();
    expect(await seriousFindings(page)).toEqual([]);
  });
}

/** Presses Tab until what has the focus bears this name. */
async function tabTo(page: Page, name: RegExp): Promise<void> {
  const focused = (): Promise<string> =>
    page.evaluate(() => {
      const element = document.activeElement;
      return element?.getAttribute('aria-label') ?? element?.textContent ?? '';
    });
  for (let press = 0; press < 150; press++) {
    await page.keyboard.press('Tab');
    if (name.test(await focused())) return;
  }
  throw new Error(`no ${name} within 150 presses of Tab`);
}

test('all of it goes by keys alone: point, pin, move a band, undo, save', async ({ page }) => {
  await openDemo(page);
  const map = 'band.tail.integral';
  const original = replay(demoRecipe());
  await tabTo(page, /^Sum of all channels/);
  const heading = page.getByRole('heading', { name: /^Pixel/ });
  await page.keyboard.press('ArrowRight');
  const [x = 0, y = 0] = ((await heading.textContent()) ?? '').match(/\d+/g)?.map(Number) ?? [];
  const pixel = { x, y };
  await expect(valueShown(page, map)).toHaveText(original.shown(map, pixel, 'counts'));
  await page.keyboard.press('Enter');
  const pins = page.getByRole('region', { name: 'Pins' }).getByRole('listitem');
  await expect(pins.last()).toContainText(`${x}, ${y}`);
  await tabTo(page, /^Upper end of band tail$/);
  for (let press = 0; press < 8; press++) await page.keyboard.press('ArrowRight');
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.keyboard.press('Control+s'),
  ]);
  const text = readFileSync(await download.path(), 'utf8');
  const { bands, pins: saved } = JSON.parse(text);
  expect(saved.at(-1)).toMatchObject(pixel);
  expect(bands.find(({ name }: { name: string }) => name === 'tail').to).toBeGreaterThan(1.926);
  const moved = replay(text);
  expect(moved.value(map, pixel)).toBeGreaterThan(original.value(map, pixel));
  await expect(valueShown(page, map)).toHaveText(moved.shown(map, pixel, 'counts'));
  // Each press of an arrow is a step of its own; the pin was before them.
  for (let press = 0; press < 8; press++) await page.keyboard.press('Control+z');
  await expect(valueShown(page, map)).toHaveText(original.shown(map, pixel, 'counts'));
  await expect(pins).toHaveCount(4);
  await page.keyboard.press('Control+z');
  await expect(pins).toHaveCount(3);
});

test('the sheet of keys tells the truth: lead map, counts on a logarithmic scale', async ({
  page,
}) => {
  await openDemo(page);
  const lead = page.getByRole('application').first();
  const name = async (): Promise<string> => (await lead.getAttribute('aria-label')) ?? '';
  const first = await name();
  await page.keyboard.press(']');
  await expect.poll(name).not.toBe(first);
  await page.keyboard.press('[');
  await expect.poll(name).toBe(first);
  const counts = (): Promise<readonly string[]> =>
    page.getByTestId('spectrum-plot').locator('.ytick text').allTextContents();
  await expect.poll(async () => (await counts()).length).toBeGreaterThan(2);
  const even = await counts();
  await page.keyboard.press('l');
  await expect.poll(counts).not.toEqual(even);
  // Ticks of a logarithmic axis are powers of ten.
  for (const text of await counts()) expect(text.replace(/[\s,.\u2009]/g, '')).toMatch(/^0*10*k?$/);
  await page.keyboard.press('l');
  await expect.poll(counts).toEqual(even);
});

test('the screen holds at 1024 × 768: nothing lies outside it', async ({ page }) => {
  await page.setViewportSize({ width: 1024, height: 768 });
  await openDemo(page);
  const overflow = await page.evaluate(() => ({
    x: document.documentElement.scrollWidth - window.innerWidth,
    y: document.documentElement.scrollHeight - window.innerHeight,
  }));
  expect(overflow).toEqual({ x: 0, y: 0 });
  for (const name of ['Open scan or recipe', 'Save recipe', 'Undo']) {
    const box = await page.getByRole('button', { name, exact: true }).boundingBox();
    expect((box?.x ?? 2000) + (box?.width ?? 0)).toBeLessThanOrEqual(1024);
  }
});
