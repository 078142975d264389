import { AxeBuilder } from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { openDemo } from './workbench-page';

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

test('every key of the sheet that acts on the screen does', async ({ page }) => {
  await openDemo(page);
  const title = page.getByRole('application').first();
  const names = new Set<string>();
  for (let press = 0; press < 3; press++) {
    names.add((await title.getAttribute('aria-label')) ?? '');
    await page.keyboard.press(']');
    await expect(title).not.toHaveAttribute('aria-label', [...names].at(-1) ?? '');
  }
  expect(names.size).toBe(3);
  await page.keyboard.press('[');
  await page.keyboard.press('l');
  await page.keyboard.press('?');
  await expect(page.getByRole('dialog').getByText('Undo')).toBeVisible();
  await page.keyboard.press('Escape');
  await expect(page.getByRole('dialog')).toHaveCount(0);
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
