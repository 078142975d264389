/** The files of one scan's results, each complete or absent. */
import { readdir, rm } from 'node:fs/promises';
import { join, resolve, sep } from 'node:path';
import { RimlightError } from '../errors';
import { csvPieces } from '../io/write/csv';
import { writeHdf5 } from '../io/write/hdf5';
import { encodeNpy } from '../io/write/npy';
import { parseMapName } from '../recipe/map-names';
import type { DerivedMap } from '../science/scan';
import { type MapsFile, mapsTree } from './maps-hdf5';
import { pixelColumns } from './pixel-table';
import type { ResultPart } from './run-request';
import { asWriteError, ensureFolder, type FileContent, writeAtomically } from './write-atomic';

/** The summary is written last and taken away first: where it is, the rest is of the same run. */
export class ResultFolder {
  constructor(
    readonly path: string,
    private readonly parts: ReadonlySet<ResultPart>,
    private readonly signal: AbortSignal,
  ) {}

  /** Makes the folder, and puts away what another recipe or a killed run left in it. */
  async prepare(maps: readonly DerivedMap[]): Promise<void> {
    await ensureFolder(this.path);
    if (this.parts.has('summary')) await rm(join(this.path, 'summary.json'), { force: true });
    if (!this.parts.has('maps')) return;
    const folder = join(this.path, 'maps');
    await ensureFolder(folder);
    const wanted = new Set(npyFiles(maps).map(({ name }) => name));
    for (const name of await readdir(folder)) {
      if (isMapFile(name) && !wanted.has(name)) await rm(join(folder, name), { force: true });
    }
  }

  async writeMaps(maps: readonly DerivedMap[]): Promise<void> {
    if (!this.parts.has('maps')) return;
    for (const { name, values, shape } of npyFiles(maps)) {
      await this.write(join('maps', name), encodeNpy(values, shape));
    }
  }

  async writeHdf5(file: MapsFile): Promise<void> {
    if (!this.parts.has('h5')) return;
    await this.write('maps.h5', await writeHdf5(mapsTree(file), { signal: this.signal }));
  }

  async writePixels({ meta, maps }: MapsFile): Promise<void> {
    if (this.parts.has('pixels'))
      await this.write('pixels.csv', csvPieces(pixelColumns(meta, maps)));
  }

  /** @param encode - makes the picture; null where the recipe has none */
  async writeBlend(encode: (() => Uint8Array) | null): Promise<void> {
    const path = join(this.path, 'blend.png');
    if (!this.parts.has('blend')) return;
    if (encode === null) await rm(path, { force: true });
    else await this.write('blend.png', encode());
  }

  async writeSummary(text: () => string): Promise<void> {
    if (this.parts.has('summary')) await this.write('summary.json', text());
  }

  /** Names come from recipes, whose rules allow none that leads out of the folder; looked at once more all the same. */
  private async write(name: string, content: FileContent): Promise<void> {
    const path = join(this.path, name);
    if (!resolve(path).startsWith(resolve(this.path) + sep)) throw leadsOut(name);
    try {
      await writeAtomically(path, content, this.signal);
    } catch (error) {
      throw asWriteError(error, path);
    }
  }
}

function npyFiles(maps: readonly DerivedMap[]) {
  return maps.flatMap(({ name, ny, nx, values, errors }) => {
    const shape = [ny, nx];
    const file = { name: `${name}.npy`, values, shape };
    return errors === null ? [file] : [file, { name: `${name}.err.npy`, values: errors, shape }];
  });
}

function isMapFile(name: string): boolean {
  return name.endsWith('.npy') && parseMapName(name.slice(0, -'.npy'.length)) !== null;
}

function leadsOut(name: string): RimlightError {
  return new RimlightError('fault', {
    what: `a result called "${name}" would be written outside its folder`,
    where: '',
    hint: 'Please report this with the recipe.',
  });
}
