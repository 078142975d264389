import { expect, test } from '@playwright/test';
import { demoRecipe, replay } from './command-line';
import { blendMap, colourAt, openDemo, savedRecipe } from './workbench-page';

const pixels = [
  { x: 5, y: 5 },
  { x: 20, y: 40 },
  { x: 12, y: 9 },
  { x: 50, y: 30 },
];

test.beforeEach(async ({ page }) => openDemo(page));

test('the blend on screen is the picture the command line writes', async ({ page }) => {
  const results = replay(demoRecipe());
  for (const pixel of pixels) {
    expect(await colourAt(blendMap(page), pixel)).toEqual(results.blendAt(pixel));
  }
});

test('gamma by keys and mixing by click change the picture as the recipe says', async ({
  page,
}) => {
  // On the bright rim, where the first channel gives most of the light.
  const pixel = { x: 31, y: 40 };
  const before = await colourAt(blendMap(page), pixel);
  const gamma = page.getByRole('slider', { name: /gamma/i }).first();
  await gamma.focus();
  for (let press = 0; press < 5; press++) await page.keyboard.press('ArrowRight');
  await page.getByText('screen', { exact: true }).click();
  await expect.poll(() => colourAt(blendMap(page), pixel)).not.toEqual(before);
  const { text } = await savedRecipe(page);
  const { mode, channels } = JSON.parse(text).blend;
  expect(mode).toBe('screen');
  expect(channels[0].gamma).toBeGreaterThan(1);
  const results = replay(text);
  for (const place of pixels) {
    expect(await colourAt(blendMap(page), place)).toEqual(results.blendAt(place));
  }
});

test('a channel is added, taken out, and brought back by undo', async ({ page }) => {
  interface Channel {
    readonly source: string;
    readonly colour: string;
  }
  const saved = async (): Promise<{ text: string; channels: readonly Channel[] }> => {
    const { text } = await savedRecipe(page);
    return { text, channels: JSON.parse(text).blend.channels };
  };
  const { channels: three } = await saved();
  await page.getByRole('button', { name: 'Add channel' }).click();
  const { text: withFourth, channels: four } = await saved();
  expect(four.slice(0, 3)).toEqual(three);
  expect(three.map(({ source }) => source)).not.toContain(four[3]?.source);
  expect(three.map(({ colour }) => colour)).not.toContain(four[3]?.colour);
  await page.getByRole('button', { name: /^Remove channel 1/ }).click();
  const { text: withoutFirst, channels: left } = await saved();
  expect(left).toEqual(four.slice(1));
  // What is drawn is what is left, then all four again.
  const holdAgainst = async (recipeText: string): Promise<void> => {
    const results = replay(recipeText);
    for (const pixel of pixels) {
      await expect.poll(() => colourAt(blendMap(page), pixel)).toEqual([...results.blendAt(pixel)]);
    }
  };
  await holdAgainst(withoutFirst);
  await page.keyboard.press('Control+z');
  expect((await saved()).text).toBe(withFourth);
  await holdAgainst(withFourth);
  await page.keyboard.press('Control+z');
  expect((await saved()).channels).toEqual(three);
});
