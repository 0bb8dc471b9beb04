import { readFileSync, writeFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { textWidth } from '../../src/render/printable.ts';
import { demoFiles } from '../support/demo-archive.ts';
import { fakeIo } from '../support/fake-io.ts';

// Pages of the demo studio at 80 columns. CONESHIFT_UPDATE_GOLDEN=1 writes them anew: look at them.
const UPDATE = process.env['CONESHIFT_UPDATE_GOLDEN'] === '1';
const GLAZE = 'SiO2=3.4 Al2O3=0.42 B2O3=0.15 K2O=0.1 Na2O=0.15 CaO=0.75 CuO=0.03';

const PAGES: readonly (readonly [string, readonly string[]])[] = [
  ['check', ['check', 'demo']],
  ['fit', ['fit', 'demo']],
  ['shift', ['shift', 'model.json', '--recipe', 'Bellringer', 'Slate Hen', 'Ferryman']],
  ['predict', ['predict', 'model.json', '--cone', '5', '6', '8', '--glaze', GLAZE]],
  ['boundaries', ['boundaries', 'model.json']],
  ['unity', ['unity', 'demo', 'Bellringer', 'Slate Hen', 'Ferryman', 'Ebbwick blue']],
];

describe('pages of the demo studio', () => {
  const files: Record<string, string | Uint8Array> = demoFiles();

  beforeAll(async () => {
    const io = fakeIo({ files });
    expect(await run(['fit', 'demo', '--out', 'model.json'], io)).toBe(0);
    files['model.json'] = io.written.get('model.json') ?? '';
  });

  it.each(PAGES)('%s', async (name, argv) => {
    const io = fakeIo({ files });
    expect([await run(argv, io), io.stderr()]).toEqual([0, '']);
    const page = io.stdout();
    expect(page.split('\n').filter((line) => textWidth(line) > 80)).toEqual([]);
    const golden = new URL(`${name}.txt`, import.meta.url);
    if (UPDATE) writeFileSync(golden, page);
    expect(page).toBe(readFileSync(golden, 'utf8'));
  });
});
