import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex } from '@noble/hashes/utils.js';
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../../src/io/byte-source';
import { hdf5Reader } from '../../../src/io/hdf5';
import { type Hdf5Node, writeHdf5 } from '../../../src/io/write/hdf5';
import { outcomeOf, readWhole } from '../check-reader';
import { cubeShape, cubeValues, sampleTree } from './hdf5-sample';

describe('a file we wrote', () => {
  it('is read back by the HDF5 library as it was given', async () => {
    const container = await hdf5Reader.open(memorySource('a.h5', await writeHdf5(sampleTree())));
    const cube = cubeValues();
    for (const name of ['packed', 'ragged', 'tiny', 'shuffled', 'plain']) {
      const entry = container.entries.find(({ path }) => path === `/entry/${name}`)!;
      expect(entry.shape).toEqual([...cubeShape]);
      expect(Array.from(await readWhole(container, entry))).toEqual(Array.from(cube));
    }
    const doubles = await container.read('/entry/doubles', [0], [3]);
    expect(Array.from(doubles)).toEqual([1.25, Number.NaN, -0]);
    expect(container.groups.find(({ path }) => path === '/')?.attributes).toEqual({
      default: 'entry',
      three: 3,
      names: ['y', '', 'é × λ'],
      pair: [1.5, -2],
      indices: [2],
    });
    expect(container.facts).toMatchObject({
      '/entry/scalar': '594.1 nm',
      '/entry/text': 'Tent field, λ',
      '/entry/texts': 'a, , b',
      '/entry/many/map 299': '299 unit 299',
    });
    expect(container.notes).toEqual([]);
    container.close();
  });

  it('has the bytes that h5py 3.7 (HDF5 1.10.8) opened, checked and added to', async () => {
    // Recorded after hdf5-check.py agreed; where Python has h5py it is asked again below.
    const bytes = await writeHdf5(sampleTree());
    expect(bytesToHex(sha256(bytes))).toBe(
      'ba36d3cab87e15ad61e1eb922ffdd0060442512e80ed45dcfcbfece59d92959b',
    );
    const python = '/usr/bin/python3';
    const canAsk = spawnSync(python, ['-c', 'import h5py']).status === 0;
    if (!canAsk) return;
    const folder = mkdtempSync(join(tmpdir(), 'rimlight-hdf5-'));
    try {
      const path = join(folder, 'sample.h5');
      writeFileSync(path, bytes);
      const script = fileURLToPath(new URL('hdf5-check.py', import.meta.url));
      const said = spawnSync(python, [script, path], { encoding: 'utf8' });
      expect(`${said.stdout}${said.stderr}`).toBe('as expected\n');
    } finally {
      rmSync(folder, { recursive: true });
    }
  });

  it('has the same bytes every time', async () => {
    const [first, second] = [await writeHdf5(sampleTree()), await writeHdf5(sampleTree())];
    expect(Buffer.compare(first, second)).toBe(0);
  });

  it('may have any shape and chunks', async () => {
    for (const [shape, chunks] of [
      [[7], [3]],
      [
        [5, 6],
        [5, 6],
      ],
      [
        [5, 6],
        [2, 100],
      ],
      [
        [2, 3, 4, 5],
        [1, 2, 3, 4],
      ],
      [
        [300, 2],
        [1, 1],
      ], // 600 chunks: a tree of two levels
      [
        [70, 70],
        [1, 1],
      ], // 4900 chunks: of three
    ]) {
      const total = shape.reduce((product, length) => product * length, 1);
      const data = Int32Array.from({ length: total }, (_, i) => i * 1_000_003);
      const bytes = await writeHdf5({
        kind: 'group',
        children: {
          a: { kind: 'dataset', data, shape, chunks, shuffle: true },
          b: { kind: 'dataset', data },
        },
      });
      const container = await hdf5Reader.open(memorySource('a.h5', bytes));
      for (const entry of container.entries) {
        expect(await readWhole(container, entry)).toEqual(data);
      }
      expect(container.entries[0].shape).toEqual(shape);
      container.close();
    }
  });
});

describe('what cannot be written', () => {
  const write = (node: Hdf5Node, name = 'a') =>
    outcomeOf(() => writeHdf5({ kind: 'group', children: { [name]: node } }));

  it('is a fault of the program', async () => {
    const data = new Uint8Array(6);
    for (const outcome of [
      await write({ kind: 'dataset', data, shape: [4] }),
      await write({ kind: 'dataset', data, shape: [2, 3], chunks: [2] }),
      await write({ kind: 'dataset', data, shape: [2, 3], chunks: [0, 3] }),
      await write({ kind: 'dataset', data }, 'a/b'),
      await write({ kind: 'dataset', data }, ''),
      await write({ kind: 'dataset', data, attributes: { long: new Float64Array(10_000) } }),
    ]) {
      expect(outcome.error).toMatchObject({ kind: 'fault' });
    }
  });
});

describe('writing a large file', () => {
  const large = (): Hdf5Node => ({
    kind: 'dataset',
    data: new Uint16Array(20 << 20),
    shape: [20, 1024, 1024],
    gzip: 1,
  });

  it('says how far it is and stops when asked', async () => {
    const controller = new AbortController();
    const shares: number[] = [];
    const { error } = await outcomeOf(() =>
      writeHdf5(
        { kind: 'group', children: { a: large() } },
        {
          signal: controller.signal,
          onProgress(share) {
            shares.push(share);
            if (share > 0.4) controller.abort();
          },
        },
      ),
    );
    expect(error).toMatchObject({ kind: 'cancelled' });
    expect(shares.length).toBeGreaterThan(1);
    expect(shares.at(-1)).toBeLessThan(0.9);
  });
});
