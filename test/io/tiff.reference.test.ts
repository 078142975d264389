/** The same files read by geotiff.js (MIT), a reader written by others: every number must agree. */
import { fromArrayBuffer } from 'geotiff';
import { describe, expect, it } from 'vitest';
import { tiffReader } from '../../src/io/tiff';
import { readWhole } from './check-reader';
import { fixtureBytes, fixtureNames, openFixture } from './fixtures';

/**
 * Files geotiff.js 3.0.5 does not read right or counts otherwise: 64-bit integers, a reduced copy among the
 * pages, and, in big-endian files, predictors (it adds differences before turning the bytes) and BigTIFF
 * offsets (it reads them little-endian). For these, libtiff agrees with us: see check_with_pillow in make-binary.py.
 */
const beyondIt = /^(u8|i8)-|with-copy|^(differences-u[24]|bytewise-f[48]|big)-be/;

describe('geotiff.js', () => {
  it.each(fixtureNames('tiff').filter((name) => !beyondIt.test(name)))(
    'reads %s alike',
    async (name) => {
      const container = await openFixture(tiffReader, `tiff/${name}.tif`);
      const ours = Array.from(await readWhole(container, container.entries[0]));
      const file = await fromArrayBuffer(fixtureBytes(`tiff/${name}.tif`).slice().buffer);
      const theirs: number[] = [];
      for (let page = 0; page < (await file.getImageCount()); page++) {
        const image = await file.getImage(page);
        for (const sample of await image.readRasters({ interleave: false })) {
          theirs.push(...Array.from(sample as ArrayLike<number>));
        }
      }
      expect(ours).toEqual(theirs);
    },
  );
});
