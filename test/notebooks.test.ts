// Every notebook is type-checked and run against the built package; its stored outputs must be what
// comes out. CONESHIFT_UPDATE_NOTEBOOKS=1 stores them anew: look at them.
import { readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { readNotebook, runNotebook, storeOutputs, typeFaults } from './support/notebook-runner.ts';

const ROOT = fileURLToPath(new URL('..', import.meta.url));
const UPDATE = process.env['CONESHIFT_UPDATE_NOTEBOOKS'] === '1';
const notebooks = readdirSync(`${ROOT}notebooks`).filter((name) => name.endsWith('.ipynb'));

it('there is a notebook', () => {
  expect(notebooks.length).toBeGreaterThan(0);
});

describe.each(notebooks)('%s', (name) => {
  const path = `${ROOT}notebooks/${name}`;

  it('has no type fault', () => {
    expect(typeFaults(path, ROOT)).toEqual([]);
  });

  it('prints and shows what is stored', async () => {
    const outputs = await runNotebook(path);
    if (UPDATE) storeOutputs(path, outputs);
    const stored = readNotebook(path).cells.flatMap((cell, i) =>
      cell.cell_type === 'code' ? [[i, cell.outputs]] : [],
    );
    const codeCells = stored.map(([i]) => i as number);
    expect(codeCells.map((i) => [i, outputs.get(i) ?? []])).toEqual(stored);
    expect(outputs.size).toBeGreaterThan(0);
  });
});
