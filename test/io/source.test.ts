import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { blobSource, memorySource, readExactly } from '../../src/io/byte-source';
import { pathSource } from '../../src/io/node-source';
import { expectScanError, outcomeOf } from './check-reader';

const folder = mkdtempSync(join(tmpdir(), 'rimlight-source-'));
afterAll(() => rmSync(folder, { recursive: true }));
const path = join(folder, 'scan.bin');
const bytes = Uint8Array.from({ length: 1000 }, (_, i) => i & 0xff);
writeFileSync(path, bytes);

const sources = {
  memory: async () => memorySource('scan.bin', bytes),
  blob: async () => blobSource('scan.bin', new Blob([bytes])),
  path: () => pathSource(path),
};

describe.each(Object.entries(sources))('a %s source', (_, open) => {
  it('knows its name and size and gives any range', async () => {
    const source = await open();
    expect(source.name).toBe('scan.bin');
    expect(source.size).toBe(1000);
    expect(await source.read(10, 14)).toEqual(Uint8Array.of(10, 11, 12, 13));
    expect(await source.read(0, 0)).toHaveLength(0);
    source.close?.();
  });

  it('gives fewer bytes only at its end', async () => {
    const source = await open();
    expect(await source.read(998, 2000)).toEqual(bytes.slice(998));
    expect(await source.read(1000, 2000)).toHaveLength(0);
    expect(await source.read(5000, 6000)).toHaveLength(0);
    source.close?.();
  });

  it('gives bytes of one’s own, that may be changed', async () => {
    const source = await open();
    (await source.read(0, 10)).fill(99);
    expect(await source.read(0, 3)).toEqual(Uint8Array.of(0, 1, 2));
    source.close?.();
  });

  it('reads the same without waiting, where it can', async () => {
    const source = await open();
    if (source.readSync !== undefined) {
      expect(source.readSync(300, 310)).toEqual(await source.read(300, 310));
      expect(source.readSync(998, 2000)).toEqual(bytes.slice(998));
    }
    source.close?.();
  });
});

describe('reading exactly', () => {
  it('says where the file ends', async () => {
    const { error } = await outcomeOf(() => readExactly(memorySource('a.bin', bytes), 990, 1010));
    expectScanError(error);
    expect(error.message).toBe(
      'the file ends at byte 1000 where at least 1010 bytes are needed (a.bin). It was cut off: copy it again, or repeat the export.',
    );
  });
});

describe('a path that is no file', () => {
  it.each([
    [join(folder, 'missing.h5'), 'there is no such file'],
    [folder, 'this is not a file but a folder or a device'],
    ['/dev/zero', 'this is not a file but a folder or a device'],
    [join(path, 'inside'), 'there is no such file'],
  ])('%s is refused', async (given, what) => {
    const { error } = await outcomeOf(() => pathSource(given));
    expectScanError(error);
    expect(error.what).toBe(what);
    expect(error.where).toBe(given);
  });
});

describe('a file that shrinks while it is read', () => {
  it('is refused as cut off', async () => {
    const changing = join(folder, 'changing.bin');
    writeFileSync(changing, bytes);
    const source = await pathSource(changing);
    writeFileSync(changing, bytes.slice(0, 100));
    const { error } = await outcomeOf(() => readExactly(source, 50, 200));
    expectScanError(error);
    expect(error.what).toMatch(/ends at byte 100/);
    source.close?.();
  });
});
