import { compileFunction } from 'node:vm';
import ts from 'typescript';

/** One `@example` of a docstring, or one block of a page. */
export interface Example {
  /** `file:line` of its first line. */
  readonly place: string;
  readonly code: string;
}

/** A value that an example came to, and what it says it is. */
export interface Check {
  readonly place: string;
  readonly actual: unknown;
  /** As written: a JavaScript literal, or `~` and a number rounded to the digits shown. */
  readonly written: string;
}

/** The examples in the docstrings of a source text. An example ends at a blank line or a tag. */
export function docExamples(file: string, text: string): Example[] {
  const lines = text.split('\n');
  return lines.flatMap((line, at) => {
    if (!/^\s*\* @example\s*$/.test(line)) return [];
    const after = lines.slice(at + 1);
    const end = after.findIndex((next) => !/^\s*\* +[^@\s]/.test(next));
    const code = after.slice(0, end).map((next) => next.replace(/^\s*\* ?/, ''));
    return [{ place: `${file}:${at + 2}`, code: code.join('\n') }];
  });
}

/** The `ts` blocks of a Markdown page. What they import from the package is in scope already. */
export function pageExamples(file: string, text: string): Example[] {
  return [...text.matchAll(/^```ts\n([\s\S]*?)^```$/gm)].map((block) => ({
    place: `${file}:${text.slice(0, block.index).split('\n').length + 1}`,
    code: block[1],
  }));
}

/** Names that an example imports from the package. */
export function importedNames({ code }: Example): string[] {
  return parsed(code).statements.flatMap((statement) => {
    if (!ts.isImportDeclaration(statement)) return [];
    const names = statement.importClause?.namedBindings;
    return names && ts.isNamedImports(names) ? names.elements.map(({ name }) => name.text) : [];
  });
}

/**
 * Runs an example with names in scope.
 *
 * @throws whatever the example throws; Error if a statement neither says its value nor names one
 */
export function runExample(example: Example, scope: Readonly<Record<string, unknown>>): Check[] {
  const { place, code } = example;
  const source = parsed(code);
  const checks: Check[] = [];
  const body = source.statements
    .filter((statement) => !ts.isImportDeclaration(statement))
    .map((statement) => {
      const next = source.statements.find(({ pos }) => pos >= statement.end);
      const written = comments(code.slice(statement.end, next?.getStart(source)));
      if (!ts.isExpressionStatement(statement)) return statement.getText(source);
      if (written === '') throw new Error(`${place}: "${statement.getText(source)}" says no value`);
      const expression = statement.expression.getText(source);
      return `__tell((${expression}), ${JSON.stringify(written)});`;
    });
  if (body.length === 0) throw new Error(`${place}: expected an example, got none`);
  const tell = (actual: unknown, written: string) => checks.push({ place, actual, written });
  call(body.join('\n'), { ...scope, __tell: tell });
  if (checks.length === 0) throw new Error(`${place}: no line says what it comes to`);
  return checks;
}

/** What is written as the value of an example. */
export function literal(written: string): unknown {
  return call(`return (${written});`, {});
}

/** Whether a number rounds to what is written after `~`, to the digits shown. */
export function roundsTo(actual: unknown, written: string): boolean {
  const shown = /^~\s*(-?\d+(?:\.(\d+))?(?:e(-?\d+))?)$/.exec(written);
  if (shown === null || typeof actual !== 'number') return false;
  const [, number = '', digits = '', exponent = '0'] = shown;
  const unit = 10 ** (Number(exponent) - digits.length);
  // A trace more than half a unit: the last digit itself is a rounded binary number.
  return Math.abs(actual - Number(number)) <= 0.5 * unit * (1 + 1e-9);
}

function parsed(code: string): ts.SourceFile {
  return ts.createSourceFile('example.ts', code, ts.ScriptTarget.ES2023, true);
}

function comments(trivia: string): string {
  return [...trivia.matchAll(/\/\/ ?(.*)/g)].map(([, text]) => text.trim()).join(' ');
}

function call(body: string, scope: Readonly<Record<string, unknown>>): unknown {
  const compilerOptions = { target: ts.ScriptTarget.ES2023, module: ts.ModuleKind.ESNext };
  const { outputText } = ts.transpileModule(body, { compilerOptions });
  const run = compileFunction(`'use strict';\n${outputText}`, Object.keys(scope)) as (
    ...values: unknown[]
  ) => unknown;
  return run(...Object.values(scope));
}
