/** The app as a user meets it: opened, pointed at, read from the screen. */
import { expect, type Locator, type Page } from '@playwright/test';
import { fitted, place } from '../../src/views/canvas/camera';

export interface Watched {
  /** console errors, failed policies, exceptions */
  readonly faults: readonly string[];
  /** addresses asked for */
  readonly requests: readonly string[];
}

/** Listens to what must not happen; call before the page is opened. */
export function watch(page: Page): Watched {
  const faults: string[] = [];
  const requests: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(message.text());
  });
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('request', (request) => requests.push(request.url()));
  return { faults, requests };
}

/** Opens the app and waits until its scan and the band maps are on screen. */
export async function openDemo(page: Page): Promise<void> {
  await page.goto('/');
  await expect(scanLine(page)).toContainText('tent-field.h5');
  await expect(valueShown(page, 'band.2LA.centroid')).toBeVisible();
}

export function scanLine(page: Page): Locator {
  return page.getByTestId('scan-line');
}

export function leadMap(page: Page): Locator {
  return page.getByRole('application').first();
}

export function blendMap(page: Page): Locator {
  return page.getByRole('application').nth(1);
}

/** "41662 ± 53 counts": what the values column says of a map. */
export function valueShown(page: Page, map: string): Locator {
  return page.locator(`[data-map="${map}"] dd`);
}

/** Middle of a pixel of the demo's maps (square pixels), in CSS pixels within the map's stage. */
export async function placeOfPixel(
  stage: Locator,
  pixel: { readonly x: number; readonly y: number },
  { nx, ny } = { nx: 64, ny: 64 },
): Promise<{ x: number; y: number }> {
  const box = await stage.boundingBox();
  if (box === null) throw new Error('the map is not on screen');
  const viewport = { widthPx: box.width, heightPx: box.height };
  const { leftPx, topPx, columnPx, rowPx } = place(fitted, { nx, ny, aspect: 1 }, viewport);
  return { x: leftPx + (pixel.x + 0.5) * columnPx, y: topPx + (pixel.y + 0.5) * rowPx };
}

export async function pointAt(page: Page, stage: Locator, pixel: { x: number; y: number }) {
  const position = await placeOfPixel(stage, pixel);
  await stage.hover({ position });
  await expect(page.getByRole('heading', { name: `Pixel ${pixel.x}, ${pixel.y}` })).toBeVisible();
}

/** Red, green, blue drawn in the middle of a pixel of a map. */
export async function colourAt(
  stage: Locator,
  pixel: { readonly x: number; readonly y: number },
): Promise<readonly number[]> {
  const { x, y } = await placeOfPixel(stage, pixel);
  return stage
    .locator('canvas')
    .first()
    .evaluate(
      (canvas: HTMLCanvasElement, at) => {
        const ratio = canvas.width / canvas.getBoundingClientRect().width;
        const data = canvas
          .getContext('2d')
          ?.getImageData(Math.round(at.x * ratio), Math.round(at.y * ratio), 1, 1).data;
        return [...(data ?? [])].slice(0, 3);
      },
      { x, y },
    );
}

/** Takes hold of an element and pulls it sideways. */
export async function dragBy(page: Page, handle: Locator, byPx: number): Promise<void> {
  const box = await handle.boundingBox();
  if (box === null) throw new Error('the handle is not on screen');
  const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
  await page.mouse.move(x, y);
  await page.mouse.down();
  for (let step = 1; step <= 5; step++) await page.mouse.move(x + (byPx * step) / 5, y);
  await page.mouse.up();
}

/** The recipe as the user saves it. */
export async function savedRecipe(page: Page): Promise<{ name: string; text: string }> {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: 'Save recipe' }).click(),
  ]);
  const stream = await download.createReadStream();
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(Buffer.from(chunk));
  return { name: download.suggestedFilename(), text: Buffer.concat(chunks).toString('utf8') };
}

/** Waits until the browser keeps this recipe for the next visit. */
export async function keptForNextVisit(page: Page, recipeText: string): Promise<void> {
  const kept = (): Promise<string | undefined> =>
    page.evaluate(
      () =>
        new Promise<string | undefined>((resolve, reject) => {
          const opening = indexedDB.open('keyval-store');
          opening.onerror = () => reject(opening.error);
          opening.onsuccess = () => {
            const reading = opening.result
              .transaction('keyval')
              .objectStore('keyval')
              .get('last-work');
            reading.onerror = () => reject(reading.error);
            reading.onsuccess = () => resolve(reading.result?.recipeText);
          };
        }),
    );
  await expect.poll(kept).toBe(recipeText);
}
