/** Who may import whom, as data. What is not listed is forbidden. */

interface Layer {
  /** layers whose functions and values it may use */
  readonly values: readonly string[];
  /** layers of which it may know the types as well */
  readonly types: readonly string[];
}

const layer = (values: readonly string[], types: readonly string[] = []): Layer => ({
  values,
  types,
});

export const layers: Readonly<Record<string, Layer>> = {
  science: layer([]),
  io: layer(['science']),
  recipe: layer(['science', 'io']),
  workers: layer(['science', 'io', 'recipe']),
  state: layer(['science', 'io', 'recipe', 'workers']),
  views: layer(['science', 'state'], ['io', 'recipe', 'workers']),
  app: layer(['science', 'io', 'recipe', 'workers', 'state', 'views']),
  cli: layer(['science', 'io', 'recipe', 'workers']),
};

/** Open to every layer; imports nothing itself. */
export const openToAll = 'src/errors.ts';

/** What the outermost layers may import besides: the program's own version. */
export const packageFile = 'package.json';

/** "src/io/npy.ts" → "io", "workers/engine.ts" → "workers"; "" for a file of no layer. */
export function layerOf(path: string): string {
  const [first = '', second = ''] = path.split('/');
  if (first === 'workers') return first;
  return first === 'src' && Object.hasOwn(layers, second) ? second : '';
}

/** A row of DEVELOPERS.md's table of packages: | `name` | `folder`, `folder` | why | */
const packageRow = /^\| `([^`]+)` \| ([^|]+) \| [^|]+ \|$/gm;

/** From DEVELOPERS.md: the folders that may import each package. */
export function packageHomes(developers: string): ReadonlyMap<string, readonly string[]> {
  return new Map(
    [...developers.matchAll(packageRow)].map(([, name = '', folders = '']) => [
      name,
      [...folders.matchAll(/`([^`]+)`/g)].map(([, folder = '']) => folder),
    ]),
  );
}

/** Files that may use Node's own modules: the same engine runs in browsers, which have none. */
export function mayUseNode(path: string): boolean {
  return (
    path === 'src/io/node-source.ts' ||
    path.startsWith('src/cli/') ||
    /^workers\/node-[^/]+\.ts$/.test(path)
  );
}
