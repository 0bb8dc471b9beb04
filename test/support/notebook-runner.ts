import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import ts from 'typescript';

/** One output of a code cell, as nbformat 4.5 stores it. */
export type CellOutput =
  | { readonly name: 'stdout'; readonly output_type: 'stream'; readonly text: readonly string[] }
  | {
      readonly data: Readonly<Record<string, readonly string[]>>;
      readonly execution_count: number;
      readonly metadata: Record<string, never>;
      readonly output_type: 'execute_result';
    };

interface Cell {
  readonly cell_type: 'code' | 'markdown';
  execution_count?: number | null;
  outputs?: readonly CellOutput[];
  readonly source: readonly string[];
}

export interface Notebook {
  readonly cells: readonly Cell[];
}

/** Console lines and the last value of each cell, as they come up. */
interface Recorder {
  readonly show: (cell: number, value: unknown) => void;
  readonly log: (cell: number, ...values: readonly unknown[]) => void;
}

/**
 * Reads a notebook.
 *
 * @param path - of the .ipynb file
 * @returns its cells
 */
export function readNotebook(path: string): Notebook {
  return JSON.parse(readFileSync(path, 'utf8')) as Notebook;
}

/**
 * A notebook's code cells as one module: imports first, console and last values recorded by cell.
 *
 * @param notebook - cells
 * @returns TypeScript
 */
export function joinedCells({ cells }: Notebook): string {
  const imports: string[] = [];
  const bodies = cells.flatMap((cell, i) => {
    if (cell.cell_type !== 'code') return [];
    const text = cell.source.join('');
    const file = ts.createSourceFile(`cell-${i}.ts`, text, ts.ScriptTarget.ES2023, true);
    const statements = file.statements.filter((statement) => {
      if (!ts.isImportDeclaration(statement)) return true;
      imports.push(statement.getText());
      return false;
    });
    const last = statements.at(-1);
    const lines = statements.map((statement) =>
      statement === last && ts.isExpressionStatement(statement) && !isConsoleCall(statement)
        ? `recorder.show(${i}, await (${statement.expression.getText()}));`
        : statement.getText(),
    );
    return [`cell = ${i};`, ...lines];
  });
  return [
    ...imports,
    'declare const recorder: { show(cell: number, value: unknown): void; log(cell: number, ...values: unknown[]): void };',
    'let cell = 0;',
    'const console = { log: (...values: unknown[]) => { recorder.log(cell, ...values); } };',
    ...bodies,
    'void console;',
    'export {};',
    '',
  ].join('\n');
}

function isConsoleCall({ expression }: ts.ExpressionStatement): boolean {
  return ts.isCallExpression(expression) && expression.expression.getText().startsWith('console.');
}

/**
 * Runs a notebook's code.
 *
 * @param path - of the .ipynb file
 * @returns the outputs of every cell, by its place
 */
export async function runNotebook(
  path: string,
): Promise<ReadonlyMap<number, readonly CellOutput[]>> {
  const outputs = new Map<number, CellOutput[]>();
  const add = (cell: number, output: CellOutput) => {
    outputs.set(cell, [...(outputs.get(cell) ?? []), output]);
  };
  const numbers = executionCounts(readNotebook(path));
  const recorder: Recorder = {
    show: (cell, value) => {
      if (value === undefined) return;
      const data = displayed(value);
      const count = numbers.get(cell)!;
      add(cell, { data, execution_count: count, metadata: {}, output_type: 'execute_result' });
    },
    log: (cell, ...values) => {
      const text = linesOf(`${values.map(String).join(' ')}\n`);
      add(cell, { name: 'stdout', output_type: 'stream', text });
    },
  };
  // Beside the notebook, so that its relative imports and the package's own name resolve.
  const module = join(dirname(path), `.run-${basename(path, '.ipynb')}.mjs`);
  try {
    await bundle(path, module);
    Object.assign(globalThis, { recorder });
    await import(`${pathToFileURL(module).href}?${performance.now()}`);
  } finally {
    Reflect.deleteProperty(globalThis, 'recorder');
    rmSync(module, { force: true });
  }
  return outputs;
}

async function bundle(path: string, outfile: string): Promise<void> {
  const stdin = {
    contents: joinedCells(readNotebook(path)),
    resolveDir: dirname(path),
    loader: 'ts' as const,
  };
  const settings = { bundle: true, format: 'esm', platform: 'node', packages: 'external' } as const;
  await build({ ...settings, stdin, outfile, logLevel: 'silent' });
}

function displayed(value: unknown): Record<string, string[]> {
  const display = (value as Record<symbol, unknown>)[Symbol.for('Jupyter.display')];
  if (typeof display !== 'function') {
    throw new TypeError(`a cell must end with a table or a console call, got ${String(value)}`);
  }
  const data = (display as () => Record<string, string>)();
  return Object.fromEntries(Object.entries(data).map(([mime, text]) => [mime, linesOf(text)]));
}

/**
 * The number that Jupyter shows beside each code cell.
 *
 * @param notebook - cells
 * @returns numbers from 1, by the cell's place
 */
export function executionCounts({ cells }: Notebook): ReadonlyMap<number, number> {
  const code = cells.flatMap((cell, i) => (cell.cell_type === 'code' ? [i] : []));
  return new Map(code.map((cell, i) => [cell, i + 1]));
}

/** nbformat stores texts as lists of lines that keep their line ends. */
function linesOf(text: string): string[] {
  return text.match(/[^\n]*\n|[^\n]+$/g) ?? [];
}

/**
 * What the TypeScript compiler says of a notebook's joined cells.
 *
 * @param path - of the .ipynb file
 * @param root - folder of the project
 * @returns messages; none where the types hold
 */
export function typeFaults(path: string, root: string): string[] {
  const file = join(dirname(path), `.types-${basename(path, '.ipynb')}.mts`);
  writeFileSync(file, joinedCells(readNotebook(path)));
  try {
    const config = ts.readConfigFile(join(root, 'test/tsconfig.json'), (name) =>
      readFileSync(name, 'utf8'),
    );
    const { options } = ts.parseJsonConfigFileContent(config.config, ts.sys, join(root, 'test'));
    const program = ts.createProgram([file], options);
    return ts
      .getPreEmitDiagnostics(program)
      .map(({ messageText }) => ts.flattenDiagnosticMessageText(messageText, '\n'));
  } finally {
    rmSync(file, { force: true });
  }
}

/**
 * Stores outputs in a notebook.
 *
 * @param path - of the .ipynb file
 * @param outputs - by the cell's place
 */
export function storeOutputs(
  path: string,
  outputs: ReadonlyMap<number, readonly CellOutput[]>,
): void {
  const notebook = readNotebook(path);
  const counts = executionCounts(notebook);
  const cells = notebook.cells.map((cell, i) =>
    cell.cell_type === 'code'
      ? { ...cell, execution_count: counts.get(i)!, outputs: outputs.get(i) ?? [] }
      : cell,
  );
  writeFileSync(path, `${JSON.stringify({ ...notebook, cells }, null, 1)}\n`);
}
