/** Cubes too large to hold are read again by blocks, and give the same numbers. */
import { describe, expect, it } from 'vitest';
import { textReader } from '../../../src/io/text/text-reader';
import { spySource } from '../spy-source';

const encoder = new TextEncoder();

describe('a cube of nine million values with a row per pixel', () => {
  const nx = 50;
  const ny = 60;
  const nk = 3000;
  const valueAt = (y: number, x: number, k: number): number => (k < 5 ? (y * nx + x + k) % 251 : 7);
  const rest = ',7'.repeat(nk - 5);
  const row = (y: number, x: number): string =>
    `${x},${y},${[0, 1, 2, 3, 4].map((k) => valueAt(y, x, k)).join(',')}${rest}`;
  const header = `x,y,${Array.from({ length: nk }, (_, k) => 600 + k).join(',')}`;
  const places = Array.from({ length: ny * nx }, (_, i) => [Math.floor(i / nx), i % nx] as const);

  it.each([
    ['by rows', places, 0.03],
    ['in any order', places.map((_, i) => places[(i * 1237 + 11) % places.length]), 0],
  ])('%s', async (_, order, mostReadAgain) => {
    const text = [header, ...order.map(([y, x]) => row(y, x))].join('\n');
    const source = spySource('scan.csv', encoder.encode(text));
    const file = await textReader.open(source);
    expect(file.entries[0]).toMatchObject({ path: 'counts', shape: [ny, nx, nk], type: 'uint8' });
    expect(source.seen.bytes).toBeLessThan(1.2 * source.size);
    const shares: number[] = [];
    const onProgress = (share: number) => shares.push(share);
    const block = await file.read('counts', [17, 3, 0], [2, 4, 6], { onProgress });
    expect(shares.at(-1)).toBe(1);
    expect(shares.every((share, i) => i === 0 || share > shares[i - 1])).toBe(true);
    let at = 0;
    for (const y of [17, 18]) {
      for (const x of [3, 4, 5, 6]) {
        for (const k of [0, 1, 2, 3, 4, 5]) expect(block[at++]).toBe(valueAt(y, x, k));
      }
    }
    const before = source.seen.bytes;
    const next = await file.read('counts', [ny - 1, nx - 1, 4], [1, 1, 2]);
    expect([...next]).toEqual([valueAt(ny - 1, nx - 1, 4), 7]);
    // In order, little is read for a pixel; in any order, as many as can be held were kept with the block.
    expect(source.seen.bytes - before).toBeLessThanOrEqual(mostReadAgain * source.size);
    const stop = new AbortController();
    stop.abort();
    const stopped = file.read('counts', [0, 0, 0], [1, nx, nk], { signal: stop.signal });
    await expect(stopped).rejects.toMatchObject({ kind: 'cancelled' });
  });

  it('reads only the part of the file that holds the rows asked for', async () => {
    const wide = places.map(([y, x]) => row(y, x).replaceAll(',7', ',7.5'));
    const source = spySource('scan.csv', encoder.encode([header, ...wide].join('\n')));
    const file = await textReader.open(source);
    expect(file.entries[0].type).toBe('float64');
    source.seen.bytes = 0;
    const last = await file.read('counts', [ny - 1, 0, 0], [1, nx, 6]);
    expect([last[0], last[5], last[6]]).toEqual([
      valueAt(ny - 1, 0, 0),
      7.5,
      valueAt(ny - 1, 1, 0),
    ]);
    expect(source.seen.bytes).toBeLessThan(0.1 * source.size);
  });
});

describe('three million long rows', () => {
  const channels = 3000;
  const points = 1000;
  const valueAt = (point: number, k: number): number => (point + 3 * k) % 97;

  it('become a cube that is read by blocks', async () => {
    const nx = 40;
    const lines: string[] = ['x,y,wavelength_nm,counts'];
    for (let point = 0; point < points; point++) {
      const place = `${point % nx},${Math.floor(point / nx)},`;
      for (let k = 0; k < channels; k++) lines.push(`${place}${600 + k},${valueAt(point, k)}`);
    }
    const source = spySource('scan.csv', encoder.encode(lines.join('\n')));
    const file = await textReader.open(source);
    expect(file.entries[0]).toMatchObject({
      path: 'counts',
      shape: [25, nx, channels],
      type: 'uint8',
    });
    source.seen.bytes = 0;
    const block = await file.read('counts', [24, 38, 2998], [1, 2, 2]);
    expect([...block]).toEqual([
      valueAt(998, 2998),
      valueAt(998, 2999),
      valueAt(999, 2998),
      valueAt(999, 2999),
    ]);
    expect(source.seen.bytes).toBeLessThan(0.1 * source.size);
  });
});
