import { spawnSync } from 'node:child_process';
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ensureFolder, writeAtomically } from '../../src/cli/write-atomic';

let folder = '';

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rimlight-write-'));
});
afterAll(() => rm(folder, { recursive: true }));

async function freshFolder(name: string): Promise<string> {
  const path = join(folder, name);
  await mkdir(path);
  return path;
}

describe('writeAtomically', () => {
  it('writes texts, bytes, and texts made one after the other', async () => {
    const place = await freshFolder('kinds');
    await writeAtomically(join(place, 'a.txt'), 'µm\n');
    await writeAtomically(join(place, 'b.bin'), Uint8Array.of(0, 1, 255));
    function* rows() {
      for (let row = 0; row < 300_000; row++) yield `${row},${row * 2}\n`;
    }
    await writeAtomically(join(place, 'c.csv'), rows());
    expect(await readFile(join(place, 'a.txt'), 'utf8')).toBe('µm\n');
    expect([...(await readFile(join(place, 'b.bin')))]).toEqual([0, 1, 255]);
    const lines = (await readFile(join(place, 'c.csv'), 'utf8')).split('\n');
    expect([lines.length, lines[0], lines[299_999]]).toEqual([300_001, '0,0', '299999,599998']);
    expect((await readdir(place)).sort()).toEqual(['a.txt', 'b.bin', 'c.csv']);
  });

  it('keeps what was there when the content cannot be made', async () => {
    const place = await freshFolder('broken');
    const path = join(place, 'maps.csv');
    await writeAtomically(path, 'before');
    function* broken() {
      yield 'x'.repeat(3 << 20);
      throw new Error('the maps are gone');
    }
    await expect(writeAtomically(path, broken())).rejects.toThrow('the maps are gone');
    expect(await readFile(path, 'utf8')).toBe('before');
    expect(await readdir(place)).toEqual(['maps.csv']);
  });

  it('leaves nothing behind when stopped', async () => {
    const place = await freshFolder('stopped');
    const stopper = new AbortController();
    function* stopping() {
      yield 'x'.repeat(3 << 20);
      stopper.abort();
      yield 'y'.repeat(3 << 20);
    }
    const writing = writeAtomically(join(place, 'a'), stopping(), stopper.signal);
    await expect(writing).rejects.toMatchObject({ kind: 'cancelled' });
    expect(await readdir(place)).toEqual([]);
  });

  it('says where and why it cannot write', async () => {
    const place = await freshFolder('refused');
    const path = join(place, 'missing', 'a.npy');
    await expect(writeAtomically(path, 'x')).rejects.toMatchObject({
      kind: 'usage',
      what: 'it cannot be written: there is no such file',
      where: path,
    });
    await writeFile(join(place, 'file'), '');
    await expect(ensureFolder(join(place, 'file', 'maps'))).rejects.toMatchObject({
      kind: 'usage',
    });
  });
});

describe('ensureFolder', () => {
  it('puts away what a process that runs no more left behind', async () => {
    const place = await freshFolder('leftovers');
    const { pid } = spawnSync(process.execPath, ['--version']);
    await writeFile(join(place, `.pixels.csv.${pid}.tmp`), 'half a ro');
    await writeFile(join(place, 'pixels.csv'), 'whole');
    await ensureFolder(place);
    expect(await readdir(place)).toEqual(['pixels.csv']);
  });

  it('leaves alone what a running process is writing, and files that are not ours', async () => {
    const place = await freshFolder('others');
    const kept = [`.maps.h5.${process.pid}.tmp`, '.notes.tmp', 'a.tmp', 'maps.h5'];
    for (const name of kept) await writeFile(join(place, name), '');
    await ensureFolder(place);
    expect((await readdir(place)).sort()).toEqual(kept.sort());
  });
});
