// Every `console` block of README.md is run, in order, and must print what stands there. A line of
// three dots stands for lines that are left out.
import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { run } from '../src/cli/run.ts';
import { demoFiles } from './support/demo-archive.ts';
import { fakeIo } from './support/fake-io.ts';

const readme = readFileSync(new URL('../README.md', import.meta.url), 'utf8');
const blocks = [...readme.matchAll(/```console\n\$ coneshift ([^\n]*)\n([\s\S]*?)```/g)].map(
  ([, call = '', expected = '']) => ({ call, expected }),
);

/** Words of a call; double quotes hold words together. */
function wordsOf(call: string): string[] {
  return [...call.matchAll(/"([^"]*)"|(\S+)/g)].map(([, quoted, bare]) => quoted || bare || '');
}

/** Whether the pieces between the left-out lines stand in the text, in order, from start to end. */
function expectPieces(text: string, expected: string): void {
  const pieces = expected.split(/^\.\.\.\n/m);
  let from = 0;
  for (const [i, piece] of pieces.entries()) {
    const at = text.indexOf(piece, from);
    if (at < 0 || (i === 0 && at !== 0)) expect(text.slice(from)).toBe(piece);
    from = at + piece.length;
  }
  if (pieces.at(-1) !== '') expect(text.slice(from)).toBe('');
}

const files: Record<string, string | Uint8Array> = Object.fromEntries(
  Object.entries(demoFiles()).map(([path, bytes]) => [
    path.replace('demo/', 'datasets/demo-studio/'),
    bytes,
  ]),
);

it('has a tour', () => {
  expect(blocks.length).toBeGreaterThanOrEqual(5);
});

it.each(blocks)('prints what README shows for: coneshift $call', async ({ call, expected }) => {
  const io = fakeIo({ files });
  expect(await run(wordsOf(call), io)).toBe(0);
  for (const [path, text] of io.written) files[path] = text;
  expectPieces(io.stdout(), expected);
});

it('opens with the job in one paragraph', () => {
  const [title, paragraph = ''] = readme.split('\n\n');
  expect(title).toBe('# coneshift');
  expect(paragraph).toMatch(/^A studio that makes glazed ware/);
});
