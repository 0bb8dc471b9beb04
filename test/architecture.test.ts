import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';

// The layout that the developers' page describes: what each folder may import, itself included.
const SRC = fileURLToPath(new URL('../src', import.meta.url));

/** Straight from the layout; what those folders may import follows. */
const ARROWS: Readonly<Record<string, readonly string[]>> = {
  numeric: [],
  chemistry: ['numeric'],
  firing: ['numeric'],
  archive: ['chemistry', 'firing'],
  model: ['archive', 'numeric'],
  predict: ['model'],
  render: ['predict'],
  cli: ['index.ts'],
};
/** `render` shows what others know: of these it may use functions, of the rest types only. */
const RENDER_VALUES = ['chemistry', 'firing', 'render', 'errors.ts'];

interface Import {
  readonly file: string;
  readonly from: string;
  readonly typeOnly: boolean;
}

const FILES = readdirSync(SRC, { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.ts') && !file.endsWith('.d.ts'))
  .map((file) => ({ file, text: readFileSync(join(SRC, file), 'utf8') }));
const IMPORTS = FILES.flatMap(({ file, text }) => importsOf(file, text));

function importsOf(file: string, text: string): Import[] {
  const found: Import[] = [];
  const add = (module: ts.Expression | undefined, typeOnly: boolean) => {
    if (module !== undefined && ts.isStringLiteral(module)) {
      found.push({ file, from: module.text, typeOnly });
    }
  };
  const visit = (node: ts.Node) => {
    if (ts.isImportDeclaration(node)) {
      const phase = node.importClause?.phaseModifier;
      add(node.moduleSpecifier, phase === ts.SyntaxKind.TypeKeyword || namesTypesOnly(node));
    }
    if (ts.isExportDeclaration(node)) add(node.moduleSpecifier, node.isTypeOnly);
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      add(node.arguments[0], false);
    }
    ts.forEachChild(node, visit);
  };
  visit(ts.createSourceFile(file, text, ts.ScriptTarget.ES2023, true));
  return found;
}

function namesTypesOnly({ importClause }: ts.ImportDeclaration): boolean {
  const names = importClause?.namedBindings;
  if (names === undefined || !ts.isNamedImports(names) || importClause?.name) return false;
  return names.elements.length > 0 && names.elements.every(({ isTypeOnly }) => isTypeOnly);
}

/** The folder of src that a path stands in; a file of src itself is its own. */
function part(path: string): string {
  return path.split('/')[0];
}

function target({ file, from }: Import): string {
  return part(relative(SRC, join(SRC, dirname(file), from)));
}

function reachable(folder: string): Set<string> {
  const all = new Set([folder, 'errors.ts']);
  const visit = (name: string) => {
    for (const next of ARROWS[name] ?? []) {
      if (all.has(next)) continue;
      all.add(next);
      visit(next);
    }
  };
  visit(folder);
  return all;
}

const inside = IMPORTS.filter(({ from }) => from.startsWith('.'));
const outside = IMPORTS.filter(({ from }) => !from.startsWith('.'));
const told = ({ file, from }: Import) => `${file} imports ${from}`;

describe('src', () => {
  it('is read here, and holds no folder without an arrow', () => {
    expect(FILES.length).toBeGreaterThan(50);
    expect(inside.length).toBeGreaterThan(100);
    const parts = [...new Set(FILES.map(({ file }) => part(file)))].sort();
    expect(parts).toEqual([...Object.keys(ARROWS), 'errors.ts', 'index.ts'].sort());
  });

  it('imports downward only', () => {
    const wrong = inside.filter((one) => {
      const folder = part(one.file);
      return folder !== 'index.ts' && !reachable(folder).has(target(one));
    });
    expect(wrong.map(told)).toEqual([]);
  });

  it('gives render types of the layers that answer, never their functions', () => {
    const wrong = inside.filter(
      (one) => part(one.file) === 'render' && !one.typeOnly && !RENDER_VALUES.includes(target(one)),
    );
    expect(wrong.map(told)).toEqual([]);
  });

  it('imports with .ts endings', () => {
    expect(inside.filter(({ from }) => !from.endsWith('.ts')).map(told)).toEqual([]);
  });

  it('touches files, streams and the process in cli only', () => {
    const allowed = (file: string, from: string) =>
      part(file) === 'cli' || (part(file) === 'archive' && from === 'node:crypto');
    const nodeModules = outside.filter(({ from }) => from.startsWith('node:'));
    expect(nodeModules.length).toBeGreaterThan(0);
    expect(nodeModules.filter(({ file, from }) => !allowed(file, from)).map(told)).toEqual([]);
    const globals = /\b(?:process|console|globalThis|setTimeout|setInterval)\b\s*[.(]/;
    expect(linesWith(globals, ({ file }) => part(file) !== 'cli')).toEqual([]);
  });

  it('reads no clock and draws no number without a seed', () => {
    expect(linesWith(/\bDate\.now\b|\bnew Date\(\)|\bMath\.random\b|\bperformance\b/)).toEqual([]);
  });

  it('opens no network, starts no program, runs no text as code', () => {
    const banned =
      /^(?:node:)?(?:net|tls|dgram|dns|http2?|https|child_process|cluster|worker_threads|vm|inspector)(?:\/|$)/;
    expect(outside.filter(({ from }) => banned.test(from)).map(told)).toEqual([]);
    const calls = /\beval\s*\(|\bnew Function\b|\bfetch\s*\(|\bWebSocket\b|\bXMLHttpRequest\b/;
    expect(linesWith(calls)).toEqual([]);
  });

  it('ends by process.exitCode, since process.exit cuts off output', () => {
    expect(linesWith(/process\.exit\s*\(/)).toEqual([]);
  });

  it('imports packages that package.json names, each heavy one in one file', () => {
    const text = readFileSync(new URL('../package.json', import.meta.url), 'utf8');
    const { dependencies } = JSON.parse(text) as { dependencies: Record<string, string> };
    const packages = outside.filter(({ from }) => !from.startsWith('node:'));
    const unknown = packages.filter(({ from }) => !Object.hasOwn(dependencies, part(from)));
    expect(unknown.map(told)).toEqual([]);
    for (const name of ['ml-regression', 'simple-statistics', 'csv-parse', 'string-width']) {
      const users = packages.filter(({ from }) => part(from) === name).map(({ file }) => file);
      expect([name, new Set(users).size]).toEqual([name, 1]);
    }
  });

  it('has named exports only, in files of at most 300 lines', () => {
    expect(linesWith(/^export default\b/)).toEqual([]);
    const long = FILES.filter(({ text }) => text.split('\n').length > 301);
    expect(long.map(({ file }) => file)).toEqual([]);
  });
});

/** Lines of code, comments left out, that a pattern finds: `file:line`. */
function linesWith(pattern: RegExp, of: (one: { file: string }) => boolean = () => true): string[] {
  return FILES.filter(of).flatMap(({ file, text }) => {
    const code = withoutComments(text).split('\n');
    return code.flatMap((line, i) => (pattern.test(line) ? [`${file}:${i + 1}`] : []));
  });
}

function withoutComments(text: string): string {
  return text
    .replace(/\/\*[\s\S]*?\*\//g, (comment) => comment.replace(/[^\n]/g, ' '))
    .replace(/^\s*\/\/.*$/gm, '');
}
