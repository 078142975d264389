/** The rules of the architecture; each gives one sentence for each breach. */
import { layerOf, layers, mayUseNode, openToAll, packageFile } from './layers';
import type { ImportOf, SourceFile, SyntaxNode } from './source-files';

export function layerBreaches(file: SourceFile): readonly string[] {
  const own = layerOf(file.path);
  return file.imports.flatMap((one) => {
    if (one.target === null || one.target === openToAll) return [];
    if (one.target === packageFile && ['app', 'cli'].includes(own)) return [];
    const other = layerOf(one.target);
    if (file.path !== openToAll && (other === own || mayImport(own, other, one))) return [];
    return [`${file.path} imports ${one.isType ? 'types' : 'values'} of ${one.target}`];
  });
}

function mayImport(own: string, other: string, { isType }: ImportOf): boolean {
  const { values = [], types = [] } = layers[own] ?? {};
  return values.includes(other) || (isType && types.includes(other));
}

/** Node's modules in files that browsers run too, and packages outside of the folders that are theirs. */
export function packageBreaches(
  file: SourceFile,
  homes: ReadonlyMap<string, readonly string[]>,
): readonly string[] {
  return file.imports.flatMap(({ specifier, target }) => {
    if (target !== null) return [];
    const folders = homes.get(packageOf(specifier)) ?? [];
    const isAllowed = specifier.startsWith('node:')
      ? mayUseNode(file.path)
      : folders.some((folder) => file.path.startsWith(`${folder}/`));
    return isAllowed ? [] : [`${file.path} imports ${specifier}`];
  });
}

/** "d3-array", "@noble/hashes" of "@noble/hashes/sha2.js" */
export function packageOf(specifier: string): string {
  return specifier.split('/', specifier.startsWith('@') ? 2 : 1).join('/');
}

/** Every file that imports itself in the end, by the shortest way from it; types are gone when the program runs. */
export function importCycles(files: readonly SourceFile[]): readonly string[] {
  const next = new Map(
    files.map(({ path, imports }) => [
      path,
      imports.flatMap(({ target, isType }) => (target === null || isType ? [] : [target])),
    ]),
  );
  const cycles = new Map<string, string>();
  for (const start of next.keys()) {
    const way = wayBack(start, next);
    const members = [...(way ?? [])].sort().join(' ');
    if (way !== null && !cycles.has(members)) cycles.set(members, [...way, start].join(' → '));
  }
  return [...cycles.values()];
}

function wayBack(start: string, next: ReadonlyMap<string, readonly string[]>): string[] | null {
  const cameFrom = new Map<string, string>();
  const queue = [start];
  for (let at = queue.shift(); at !== undefined; at = queue.shift()) {
    for (const target of next.get(at) ?? []) {
      if (target === start) {
        const way = [at];
        while (way[0] !== start) way.unshift(cameFrom.get(way[0] ?? '') ?? start);
        return way;
      }
      if (cameFrom.has(target)) continue;
      cameFrom.set(target, at);
      queue.push(target);
    }
  }
  return null;
}

/** Their bits differ between JavaScript engines; `src/science/numeric/elementary.ts` has its own. */
const inexact = new Set([
  ...['exp', 'expm1', 'log', 'log1p', 'log2', 'log10', 'pow', 'cbrt', 'hypot'],
  ...['sin', 'cos', 'tan', 'asin', 'acos', 'atan', 'atan2'],
  ...['sinh', 'cosh', 'tanh', 'asinh', 'acosh', 'atanh'],
]);

/** Everything of Math that is not exact, `**`, and Math used whole, which would hide the rest. */
export function inexactMathematics(file: SourceFile): readonly string[] {
  const told = new Set<unknown>();
  const used = file.nodes.flatMap((node) => {
    if (node.operator === '**' || node.operator === '**=') return ['**'];
    const names = namesTakenOfMath(node);
    if (names.length > 0) told.add(node.object ?? node.init);
    if (names.length > 0)
      return names.filter((name) => inexact.has(name)).map((name) => `Math.${name}`);
    const isWhole = isIdentifier(node, 'Math') && !told.has(node);
    return isWhole ? ['Math other than by name'] : [];
  });
  return used.map((what) => `${file.path} uses ${what}`);
}

/** `Math.exp` and `const { exp } = Math`: the names; empty for anything else. */
function namesTakenOfMath(node: SyntaxNode): readonly string[] {
  if (isNamedMember(node) && isIdentifier(node.object, 'Math')) return [nameOf(node.property)];
  if (node.type !== 'VariableDeclarator' || !isIdentifier(node.init, 'Math')) return [];
  const { properties = [] } = node.id as { readonly properties?: readonly SyntaxNode[] };
  return properties.map(({ key }) => nameOf(key));
}

/** What makes a result depend on more than its arguments, or speaks to the outside. */
const outside = [
  ...['window', 'document', 'navigator', 'globalThis', 'self', 'process', 'console'],
  ...['fetch', 'localStorage', 'indexedDB', 'performance', 'Date', 'crypto'],
  ...['setTimeout', 'setInterval', 'queueMicrotask', 'requestAnimationFrame'],
];

export function impurities(file: SourceFile): readonly string[] {
  const properties = new Set(
    file.nodes.flatMap((node) => {
      if (isNamedMember(node)) return [node.property];
      return node.type.includes('Property') || node.type.includes('Method') ? [node.key] : [];
    }),
  );
  return file.nodes.flatMap((node) => {
    if (
      isNamedMember(node) &&
      isIdentifier(node.object, 'Math') &&
      nameOf(node.property) === 'random'
    ) {
      return [`${file.path} uses Math.random`];
    }
    const name = outside.find((word) => isIdentifier(node, word));
    return name === undefined || properties.has(node) ? [] : [`${file.path} uses ${name}`];
  });
}

function isNamedMember(node: SyntaxNode): boolean {
  return node.type === 'MemberExpression' && node.computed === false;
}

function isIdentifier(node: unknown, name: string): boolean {
  return nameOf(node) === name;
}

function nameOf(node: unknown): string {
  if (typeof node !== 'object' || node === null || !('type' in node) || !('name' in node))
    return '';
  return node.type === 'Identifier' && typeof node.name === 'string' ? node.name : '';
}

/** Ways to silence a tool; each is a debt. */
export function suppressions({ path, text, nodes }: SourceFile): Readonly<Record<string, number>> {
  const comments = path.endsWith('architecture.test.ts') ? '' : text;
  return {
    'biome-ignore': count(comments, /(?:\/\/|\/\*|\{\/\*)\s*biome-ignore/g),
    '@ts-expect-error': count(comments, /(?:\/\/|\/\*)\s*@ts-(?:expect-error|ignore|nocheck)/g),
    'as unknown as': nodes.filter(isDoubtfulCast).length,
  };
}

function isDoubtfulCast({ type, expression }: SyntaxNode): boolean {
  if (type !== 'TSAsExpression' || typeof expression !== 'object' || expression === null)
    return false;
  const { typeAnnotation } = expression as { readonly typeAnnotation?: { readonly type?: string } };
  return typeAnnotation?.type === 'TSUnknownKeyword';
}

function count(text: string, pattern: RegExp): number {
  return text.match(pattern)?.length ?? 0;
}
