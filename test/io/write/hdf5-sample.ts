/** A tree with everything `writeHdf5` can write; hdf5-check.py expects exactly this. */
import type { Hdf5Group, Hdf5Node } from '../../../src/io/write/hdf5';

export const cubeShape = [30, 40, 50] as const;

/** The same numbers as hdf5-check.py makes. */
export function cubeValues(): Uint16Array {
  return Uint16Array.from({ length: 60_000 }, (_, i) => (i * 7919) % 65_521);
}

export function sampleTree(): Hdf5Group {
  const cube = cubeValues();
  const shape = [...cubeShape];
  const many: Record<string, Hdf5Node> = {};
  for (let i = 0; i < 300; i++) {
    many[`map ${i}`] = { kind: 'dataset', data: i, attributes: { units: `unit ${i}` } };
  }
  return {
    kind: 'group',
    attributes: {
      default: 'entry',
      three: 3,
      names: ['y', '', 'é × λ'],
      pair: [1.5, -2],
      indices: Int32Array.of(2),
    },
    children: {
      entry: {
        kind: 'group',
        attributes: { NX_class: 'NXentry' },
        children: {
          packed: {
            kind: 'dataset',
            data: cube,
            shape,
            gzip: 4,
            shuffle: true,
            attributes: { units: 'counts' },
          },
          ragged: { kind: 'dataset', data: cube, shape, chunks: [4, 7, 9], gzip: 6 },
          tiny: { kind: 'dataset', data: cube, shape, chunks: [1, 1, 7] },
          shuffled: { kind: 'dataset', data: cube, shape, chunks: [30, 40, 50], shuffle: true },
          plain: { kind: 'dataset', data: Float32Array.from(cube), shape },
          doubles: { kind: 'dataset', data: Float64Array.of(1.25, Number.NaN, -0) },
          bytes: { kind: 'dataset', data: Uint8Array.of(0, 255) },
          'signed-bytes': { kind: 'dataset', data: Int8Array.of(-128, 127) },
          shorts: { kind: 'dataset', data: Int16Array.of(-32768, 32767) },
          words: { kind: 'dataset', data: Int32Array.of(-2147483648, 2147483647) },
          'unsigned-words': { kind: 'dataset', data: Uint32Array.of(0, 4294967295) },
          scalar: { kind: 'dataset', data: 594.1, attributes: { units: 'nm' } },
          text: { kind: 'dataset', data: 'Tent field, λ' },
          texts: { kind: 'dataset', data: ['a', '', 'b'] },
          long: { kind: 'dataset', data: 'recipe '.repeat(300_000) },
          empty: { kind: 'dataset', data: new Float64Array(0), shape: [0, 3], gzip: 4 },
          many: { kind: 'group', children: many },
        },
      },
    },
  };
}
