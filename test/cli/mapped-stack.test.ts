import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import { afterAll, describe, expect, it } from 'vitest';
import { mappedStack } from '../../src/cli/mapped-stack.ts';

const folder = mkdtempSync(join(tmpdir(), 'coneshift-'));
afterAll(() => {
  rmSync(folder, { recursive: true });
});

describe('the stack of a bug in the bundled program', () => {
  it('names the lines of the sources', async () => {
    writeFileSync(
      join(folder, 'thrower.ts'),
      'export interface Kiln {\n  readonly hot: boolean;\n}\n\nexport function fire({ hot }: Kiln): never {\n' +
        "  throw new Error(hot ? 'hot' : 'cold');\n}\n",
    );
    writeFileSync(
      join(folder, 'main.ts'),
      "import { fire } from './thrower.ts';\nexport const run = () => fire({ hot: true });\n",
    );
    const outfile = join(folder, 'out/main.js');
    const options = { bundle: true, format: 'esm', sourcemap: true, outfile } as const;
    await build({ entryPoints: [join(folder, 'main.ts')], ...options, logLevel: 'error' });
    const url = pathToFileURL(outfile).href;
    // Where the bundle throws, as Node writes it.
    const stack = `Error: hot\n    at fire (${url}:3:9)\n    at run (${url}:7:19)`;
    const [, first, second] = mappedStack(stack).split('\n');
    expect(first).toBe(`    at fire (${join(folder, 'thrower.ts')}:6:9)`);
    expect(second).toContain(`${join(folder, 'main.ts')}:2:`);
  });

  it('stays as it is where there is no map', () => {
    const stack = 'Error: x\n    at f (file:///nowhere/a.js:1:2)\n    at node:internal/x:3:4';
    expect(mappedStack(stack)).toBe(stack);
  });
});
