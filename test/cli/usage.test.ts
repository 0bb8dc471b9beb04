import { describe, expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { fakeIo } from '../support/fake-io.ts';

const COMMANDS = ['check', 'fit', 'predict', 'shift', 'boundaries', 'unity'];
const ARCHIVE = { 'a.csv': 'tile,SiO2,Al2O3,CaO,cone,surface\nA,3,0.4,1,6,gloss\n' };

async function called(argv: readonly string[], io = fakeIo({ files: ARCHIVE })) {
  return { exitCode: await run(argv, io), out: io.stdout(), err: io.stderr() };
}

describe('help', () => {
  it('of the program names every command and an example', async () => {
    const { exitCode, out, err } = await called(['--help']);
    expect([exitCode, err]).toEqual([0, '']);
    for (const command of COMMANDS) expect(out).toMatch(new RegExp(`^ {2}${command} `, 'm'));
    expect(out).toMatch(/Example:\n {2}coneshift check /);
  });

  it.each(COMMANDS)('of %s has one example of itself and fits 80 columns', async (command) => {
    const { exitCode, out } = await called([command, '--help']);
    expect(exitCode).toBe(0);
    expect(out.match(/^ {2}coneshift /gm)).toHaveLength(1);
    expect(out).toContain(`Example:\n  coneshift ${command} `);
    expect(out).toContain('--json');
    expect(out.split('\n').filter((line) => line.length > 80)).toEqual([]);
  });

  it('says what each exit code means, and what fit ends with', async () => {
    const all = (await called(['--help'])).out.replace(/\s+/g, ' ');
    expect(all).toContain('0 done; 1 a bug; 2 usage');
    expect(all).toContain(
      '3 a file or folder that cannot be read or written, or has faults; 4 cannot be',
    );
    const fit = (await called(['fit', '--help'])).out.replace(/\s+/g, ' ');
    expect(fit).toContain('4 is kept for what cannot be fitted');
  });

  it('tells the version', async () => {
    expect(await called(['--version'])).toEqual({ exitCode: 0, out: '0.0.0-test\n', err: '' });
  });
});

describe('a call that cannot be understood', () => {
  it.each([
    [[]],
    [['bogus']],
    [['check']],
    [['check', 'a.csv', 'b.csv']],
    [['check', 'a.csv', '--bogus']],
    [['fit', 'a.csv', '--out']],
  ])('%j ends with 2, tells so on stderr and nothing on stdout', async (argv) => {
    const { exitCode, out, err } = await called(argv);
    expect([exitCode, out]).toEqual([2, '']);
    expect(err).not.toBe('');
  });

  it('is told without the terminal codes in it', async () => {
    const { err } = await called(['check', 'a.csv', '--\u001b[2Jx']);
    expect(err).toContain("unknown option '--\\x1b[2Jx'");
    expect(err).not.toContain('\u001b');
  });
});

describe('a bug', () => {
  it('ends with 1, keeps its stack and asks to be reported', async () => {
    const io = fakeIo({ files: ARCHIVE });
    const broken = {
      ...io,
      kindOf: () => Promise.reject(new TypeError('x is \u001b[2J undefined')),
    };
    expect(await run(['check', 'a.csv'], broken)).toBe(1);
    expect(io.stdout()).toBe('');
    expect(io.stderr()).toContain('Please report it');
    expect(io.stderr()).toMatch(/TypeError: x is \\x1b\[2J undefined\n +at /);
  });
});

describe('the look', () => {
  it('is plain unless the terminal bears codes; then headings only are marked', async () => {
    const plain = await called(['check', 'a.csv']);
    expect(plain.out).not.toContain('\u001b');
    const marked = await called(['check', 'a.csv'], fakeIo({ files: ARCHIVE, colour: true }));
    expect(marked.out).toContain('\u001b[1mFiles\u001b[22m\n');
    expect(marked.out.replace(/\u001b\[\d+m/g, '')).toBe(plain.out);
  });

  it('follows the width of the terminal, not below 40 columns', async () => {
    const narrow = await called(['predict', 'none'], fakeIo({ columns: 20 }));
    expect(narrow.exitCode).toBe(2);
    const missing = await called(['check', 'nowhere'], fakeIo({ columns: 20 }));
    expect(missing.err.split('\n').every((line) => line.length <= 40)).toBe(true);
  });
});
