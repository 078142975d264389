/** The project's sources, parsed: what each file imports, exports, calls and asks the tools to overlook. */
import { readdirSync, readFileSync } from 'node:fs';
import { posix, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseSync } from 'vite';

export const projectFolder = fileURLToPath(new URL('../..', import.meta.url));

export interface ImportOf {
  /** as written: '../scan', 'react', 'node:fs' */
  readonly specifier: string;
  /** project path of the file meant ("src/science/scan.ts"); null for a package */
  readonly target: string | null;
  /** nothing of it is left after compilation */
  readonly isType: boolean;
}

export interface SourceFile {
  /** "src/science/scan.ts" */
  readonly path: string;
  readonly text: string;
  readonly lines: number;
  readonly imports: readonly ImportOf[];
  readonly hasDefaultExport: boolean;
  /** nothing in it but what it passes on from other files */
  readonly isBarrel: boolean;
  /** every node of the syntax tree, parents first */
  readonly nodes: readonly SyntaxNode[];
}

export interface SyntaxNode {
  readonly type: string;
  readonly [field: string]: unknown;
}

/** Scripts under the folders, as project paths. */
export function listSources(...folders: readonly string[]): readonly string[] {
  return folders.flatMap((folder) =>
    readdirSync(posix.join(projectFolder, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && /(?<!\.d)\.tsx?$/.test(entry.name))
      .map((entry) => relative(projectFolder, posix.join(entry.parentPath, entry.name)))
      .sort(),
  );
}

/** @param known - project paths an import may lead to */
export function readSource(path: string, known: ReadonlySet<string>): SourceFile {
  return parseSource(path, readFileSync(posix.join(projectFolder, path), 'utf8'), known);
}

export function parseSource(path: string, text: string, known: ReadonlySet<string>): SourceFile {
  const { program, errors } = parseSync(path, text);
  if (errors[0] !== undefined) throw new Error(`${path} cannot be parsed: ${errors[0].message}`);
  const nodes = [...walk(program)];
  return {
    path,
    text,
    lines: text.split('\n').length - 1,
    imports: nodes.flatMap((node) => importOf(node, path, known)),
    hasDefaultExport: nodes.some(isDefaultExport),
    isBarrel: program.body.length > 0 && program.body.every(isPassedOn),
    nodes,
  };
}

function* walk(node: unknown): Generator<SyntaxNode> {
  if (Array.isArray(node)) {
    for (const entry of node) yield* walk(entry);
    return;
  }
  if (typeof node !== 'object' || node === null) return;
  if ('type' in node && typeof node.type === 'string') yield node as SyntaxNode;
  for (const child of Object.values(node)) yield* walk(child);
}

const importing = [
  'ImportDeclaration',
  'ExportNamedDeclaration',
  'ExportAllDeclaration',
  'ImportExpression',
  'TSImportType',
];

function importOf(node: SyntaxNode, path: string, known: ReadonlySet<string>): ImportOf[] {
  if (!importing.includes(node.type)) return [];
  const source = node.source as { readonly value?: unknown } | null | undefined;
  if (typeof source?.value !== 'string') return [];
  const specifier = source.value;
  return [{ specifier, target: resolved(specifier, path, known), isType: isTypeOnly(node) }];
}

/** `import type`, `export type`, or every name in the braces marked so; a bare import is none. */
function isTypeOnly(node: SyntaxNode): boolean {
  if (node.type === 'TSImportType') return true;
  if (node.importKind === 'type' || node.exportKind === 'type') return true;
  const names = node.specifiers;
  if (!Array.isArray(names) || names.length === 0) return false;
  return names.every(
    (name: SyntaxNode) => name.importKind === 'type' || name.exportKind === 'type',
  );
}

function resolved(specifier: string, path: string, known: ReadonlySet<string>): string | null {
  if (!specifier.startsWith('.')) return null;
  const [plain = ''] = specifier.split('?', 1);
  const target = posix.join(posix.dirname(path), plain);
  const candidates = [target, `${target}.ts`, `${target}.tsx`, `${target}/index.ts`];
  return candidates.find((candidate) => known.has(candidate)) ?? target;
}

function isDefaultExport(node: SyntaxNode): boolean {
  if (node.type === 'ExportDefaultDeclaration') return true;
  const exported = node.exported as { readonly name?: unknown } | undefined;
  return node.type === 'ExportSpecifier' && exported?.name === 'default';
}

function isPassedOn(node: { readonly type: string }): boolean {
  const isExport = node.type === 'ExportNamedDeclaration' || node.type === 'ExportAllDeclaration';
  return isExport && 'source' in node && node.source !== null;
}
