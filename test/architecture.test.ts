/** The shape of the project, kept: layers, cycles, exact mathematics, file sizes, counted debts. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { layerOf, openToAll, packageHomes } from './architecture/layers';
import {
  importCycles,
  impurities,
  inexactMathematics,
  layerBreaches,
  packageBreaches,
  suppressions,
} from './architecture/rules';
import {
  listSources,
  parseSource,
  projectFolder,
  readSource,
  type SourceFile,
} from './architecture/source-files';

/** Lines of a file at most. */
const longest = 300;
/** Files that may be longer: the number of their lines, which only goes down, and why. */
const longFiles: Readonly<Record<string, { readonly lines: number; readonly reason: string }>> = {
  'src/science/numeric/elementary.ts': {
    lines: 662,
    reason: 'one algorithm after the other with its table of coefficients, read top to bottom',
  },
};

/** Silenced tools in the whole project. A number here only goes down: lower it when one is gone. */
const debts = { 'biome-ignore': 0, '@ts-expect-error': 0, 'as unknown as': 0 };

const readProjectFile = (path: string): string => readFileSync(join(projectFolder, path), 'utf8');
const homes = packageHomes(readProjectFile('DEVELOPERS.md'));
const productPaths = listSources('src', 'workers');
const known = new Set(productPaths);
const product = productPaths.map((path) => readSource(path, known));
const tests = listSources('test').map((path) => readSource(path, known));

describe('layers', () => {
  it('import only what stands below them', () => {
    expect(product.flatMap(layerBreaches)).toEqual([]);
  });

  it('have every source file in one of them', () => {
    const homeless = productPaths.filter((path) => layerOf(path) === '' && path !== openToAll);
    expect(homeless).toEqual([]);
  });

  it('leave Node to the files that only Node runs, and packages to their folders', () => {
    expect(product.flatMap((file) => packageBreaches(file, homes))).toEqual([]);
  });

  it('have errors.ts below them all, importing nothing', () => {
    expect(product.find(({ path }) => path === openToAll)?.imports).toEqual([]);
  });

  it('import no file that is not there', () => {
    const styles = /\.(css|svg|json)$/;
    const missing = product.flatMap(({ path, imports }) =>
      imports
        .filter(({ target }) => target !== null && !known.has(target) && !styles.test(target))
        .map(({ specifier }) => `${path}: ${specifier}`),
    );
    expect(missing).toEqual([]);
  });
});

describe('files', () => {
  it('form no import cycles', () => {
    expect(importCycles(product)).toEqual([]);
  });

  it('have no default exports', () => {
    const found = [...product, ...tests].filter(({ hasDefaultExport }) => hasDefaultExport);
    expect(found.map(({ path }) => path)).toEqual([]);
  });

  it('are never mere lists of other files’ exports', () => {
    expect(product.filter(({ isBarrel }) => isBarrel).map(({ path }) => path)).toEqual([]);
  });

  it(`have at most ${longest} lines, but for those with a reason`, () => {
    const tooLong = [...product, ...tests].filter(
      ({ path, lines }) => lines > (longFiles[path]?.lines ?? longest),
    );
    expect(tooLong.map(({ path, lines }) => `${path}: ${lines}`)).toEqual([]);
  });

  it('lose their leave to be long when they need it no more', () => {
    const lengths = new Map(product.map(({ path, lines }) => [path, lines]));
    const needless = Object.entries(longFiles).filter(
      ([path, { lines }]) => lengths.get(path) !== lines || lines <= longest,
    );
    expect(needless).toEqual([]);
  });
});

describe('numbers', () => {
  it('have the same bits everywhere: science and workers use no inexact mathematics of the engine', () => {
    const ours = product.filter(({ path }) => /^(src\/science|workers)\//.test(path));
    expect(ours.flatMap(inexactMathematics)).toEqual([]);
  });

  it('depend on arguments only: science has no screen, clock, console or chance of its own', () => {
    const science = product.filter(({ path }) => layerOf(path) === 'science');
    expect(science.flatMap(impurities)).toEqual([]);
  });
});

describe('debts', () => {
  it('only go down', () => {
    const total = { 'biome-ignore': 0, '@ts-expect-error': 0, 'as unknown as': 0 };
    for (const file of [...product, ...tests]) {
      const found = suppressions(file);
      for (const kind of Object.keys(total) as (keyof typeof total)[]) total[kind] += found[kind];
    }
    expect(total).toEqual(debts);
  });
});

describe('documentation', () => {
  it('has a line for every package the product uses', () => {
    const { dependencies } = JSON.parse(readProjectFile('package.json')) as {
      readonly dependencies: Readonly<Record<string, string>>;
    };
    expect([...homes.keys()].sort()).toEqual(Object.keys(dependencies).sort());
  });
});

describe('these rules', () => {
  const files = new Set(['src/science/a.ts', 'src/io/b.ts', 'src/views/c.tsx', 'workers/d.ts']);
  const made = (path: string, text: string): SourceFile => parseSource(path, text, files);

  it('see an import that goes up, of types as well', () => {
    const up = made('src/science/a.ts', "import type { B } from '../io/b';");
    expect(layerBreaches(up)).toEqual(['src/science/a.ts imports types of src/io/b.ts']);
    const lazy = made('src/io/b.ts', "const c = await import('../views/c');");
    expect(layerBreaches(lazy)).toEqual(['src/io/b.ts imports values of src/views/c.tsx']);
  });

  it('let a view know a type of the workers, and no value', () => {
    const types = made('src/views/c.tsx', "import { type D, type E } from '../../workers/d';");
    const values = made('src/views/c.tsx', "import { type D, e } from '../../workers/d';");
    expect(layerBreaches(types)).toEqual([]);
    expect(layerBreaches(values)).toEqual(['src/views/c.tsx imports values of workers/d.ts']);
  });

  it('see a cycle of three files once', () => {
    const circle = [
      made('src/io/b.ts', "export { c } from '../views/c';"),
      made('src/views/c.tsx', "import { d } from '../../workers/d';"),
      made('workers/d.ts', "import { B } from '../src/io/b';"),
    ];
    expect(importCycles(circle)).toEqual([
      'src/io/b.ts → src/views/c.tsx → workers/d.ts → src/io/b.ts',
    ]);
    const types = made('workers/d.ts', "import type { B } from '../src/io/b';");
    expect(importCycles([...circle.slice(0, 2), types])).toEqual([]);
  });

  it('see Node in a shared file and a package outside of its folder', () => {
    const table = packageHomes('| `@noble/hashes` | `src/recipe`, `workers` | hashes |');
    const breaches = (path: string, text: string) => packageBreaches(made(path, text), table);
    expect(breaches('src/io/b.ts', "import { open } from 'node:fs';")).toHaveLength(1);
    expect(breaches('src/io/node-source.ts', "import 'node:fs';")).toEqual([]);
    expect(breaches('src/io/b.ts', "import '@noble/hashes/sha2.js';")).toHaveLength(1);
    expect(breaches('workers/d.ts', "import '@noble/hashes/sha2.js';")).toEqual([]);
    expect(breaches('src/recipe/a.ts', "import 'd3-array';")).toHaveLength(1);
  });

  it('see inexact mathematics in code, not in comments and texts', () => {
    const used = made('src/science/a.ts', 'const a = Math.exp(2 ** 3); const { log } = Math;');
    expect(inexactMathematics(used)).toHaveLength(3);
    const hidden = made('src/science/a.ts', "const m = Math; const a = Math['exp'](1);");
    expect(inexactMathematics(hidden)).toHaveLength(2);
    const told = made(
      'src/science/a.ts',
      "// Math.exp\nconst a = 'Math.pow'; const b = Math.sqrt(2);",
    );
    expect(inexactMathematics(told)).toEqual([]);
  });

  it('see what reaches outside, not a field of that name', () => {
    const reached = made('src/science/a.ts', 'export const a = Math.random() + Date.now();');
    expect(impurities(reached)).toHaveLength(2);
    const named = made(
      'src/science/a.ts',
      'const d = { document: 1 }; export const e = d.document;',
    );
    expect(impurities(named)).toEqual([]);
  });

  it('see default exports, barrels and doubtful casts', () => {
    expect(made('src/io/b.ts', 'export default 1;').hasDefaultExport).toBe(true);
    expect(made('src/io/b.ts', "export * from '../science/a';").isBarrel).toBe(true);
    expect(made('src/io/b.ts', 'export const b = 1;').isBarrel).toBe(false);
    const cast = made('src/io/b.ts', 'export const b = 1 as unknown as string;');
    expect(suppressions(cast)).toMatchObject({ 'as unknown as': 1 });
  });
});
