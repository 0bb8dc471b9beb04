import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { beforeAll, describe, expect, it } from 'vitest';
import * as library from '../src/index.ts';
import {
  docExamples,
  importedNames,
  literal,
  pageExamples,
  roundsTo,
  runExample,
  type Example,
} from './support/examples.ts';

const ROOT = fileURLToPath(new URL('..', import.meta.url));
const FILES = readdirSync(join(ROOT, 'src'), { recursive: true, encoding: 'utf8' })
  // The program itself runs when it is imported.
  .filter((file) => file.endsWith('.ts') && !file.endsWith('.d.ts') && file !== 'cli/main.ts')
  .map((file) => ({ file, text: readFileSync(join(ROOT, 'src', file), 'utf8') }));
const DOCS = FILES.flatMap(({ file, text }) =>
  docExamples(`src/${file}`, text).map((example) => ({ ...example, file })),
);
const README = pageExamples('README.md', readFileSync(join(ROOT, 'README.md'), 'utf8'));

/** Public functions without an example: each needs a whole archive or a fitted model. */
const WITHOUT_EXAMPLE: Readonly<Record<string, string>> = {
  fitModel: 'needs an archive; test/model',
  modelText: 'needs a model; test/model',
  parseModel: 'needs a model; test/model',
  predict: 'needs a model; test/predict',
  predictEach: 'needs a model; test/predict',
  shift: 'needs a model; test/predict',
  boundaries: 'needs a model; test/predict',
  recipePoint: 'needs the recipes of an archive; test/predict',
  checkPage: 'needs an archive; test/render, test/golden',
  fitPage: 'needs a model; test/render, test/golden',
  predictionPage: 'needs answers of a model; test/render, test/golden',
  shiftPage: 'needs answers of a model; test/render, test/golden',
  boundaryPage: 'needs answers of a model; test/render, test/golden',
  checkAnswer: 'needs an archive; test/cli',
  fitAnswer: 'needs a model; test/cli',
};

type Scope = Readonly<Record<string, unknown>>;
const modules = new Map<string, Scope>();

beforeAll(async () => {
  for (const { file } of FILES) {
    modules.set(file, (await import(join(ROOT, 'src', file))) as Scope);
  }
});

/** Every export of src; of two of one name, that of the file itself. */
function scopeOf(file: string): Scope {
  return Object.assign({}, ...modules.values(), modules.get(file)) as Scope;
}

function expectTrue(example: Example, scope: Scope): void {
  for (const { place, actual, written } of runExample(example, scope)) {
    if (written.startsWith('~')) {
      expect([place, actual, written, roundsTo(actual, written)]).toEqual([
        place,
        actual,
        written,
        true,
      ]);
    } else {
      expect([place, actual]).toStrictEqual([place, literal(written)]);
    }
  }
}

describe('examples in docstrings', () => {
  it('are found', () => {
    expect(DOCS.length).toBeGreaterThan(60);
  });

  it.each(DOCS)('$place', ({ file, ...example }) => {
    expectTrue(example, scopeOf(file));
  });
});

describe('examples in the README', () => {
  it.each(README)('$place', (example) => {
    const names = importedNames(example);
    expect(names.filter((name) => !(name in library))).toEqual([]);
    const imported = Object.entries(library).filter(([name]) => names.includes(name));
    expectTrue(example, Object.fromEntries(imported));
  });
});

describe('every public function', () => {
  const functions = Object.entries(library)
    .filter(([, value]) => typeof value === 'function' && !/^class\b/.test(String(value)))
    .map(([name]) => name);
  const hasExample = (name: string) => {
    const doc = new RegExp(`/\\*\\*((?:(?!\\*/)[\\s\\S])*)\\*/\\nexport function\\*? ?${name}\\b`);
    return FILES.some(({ text }) => doc.exec(text)?.[1]?.includes('@example') === true);
  };

  it('has an example, or stands in the list of those that cannot', () => {
    expect(functions.length).toBeGreaterThan(20);
    const without = functions.filter((name) => !hasExample(name)).sort();
    expect(without).toEqual(Object.keys(WITHOUT_EXAMPLE).sort());
  });
});

describe('the runner of the examples', () => {
  const checksOf = (code: string, scope: Scope = {}) =>
    runExample({ place: 'here:1', code }, scope).map(({ actual, written }) => [actual, written]);

  it('reads values beside and below, and expressions over several lines', () => {
    const code =
      'const a = [1,\n  2];\na; // [1, 2]\nf({\n  x: a[1],\n});\n// 4\nf({ x: 1 }); // ~2.0';
    const f = ({ x }: { x: number }) => 2 * x;
    expect(checksOf(code, { f })).toEqual([
      [[1, 2], '[1, 2]'],
      [4, '4'],
      [2, '~2.0'],
    ]);
  });

  it('rounds to the digits shown', () => {
    expect(roundsTo(0.62254, '~0.6225')).toBe(true);
    expect(roundsTo(0.62256, '~0.6225')).toBe(false);
    expect(roundsTo(1.24e-7, '~1.2e-7')).toBe(true);
    expect(roundsTo(1.26e-7, '~1.2e-7')).toBe(false);
    expect(roundsTo('0.6225', '~0.6225')).toBe(false);
  });

  it('fails on a name that does not exist, and on a line that says nothing', () => {
    expect(() => checksOf('g(1); // 1')).toThrow('g is not defined');
    expect(() => checksOf('1 + 1;')).toThrow('here:1: "1 + 1;" says no value');
    expect(() => checksOf('const a = 1;')).toThrow('no line says what it comes to');
  });
});
