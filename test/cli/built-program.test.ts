import { spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, describe, expect, it } from 'vitest';
import { checkPage, inventory, PLAIN_LOOK, readArchive } from '../../src/index.ts';

// The built file, as a user starts it. `npm test` builds it first.
const ROOT = fileURLToPath(new URL('../..', import.meta.url));
const MAIN = join(ROOT, 'dist/cli/main.js');
const DEMO = join(ROOT, 'datasets/demo-studio');
const folder = mkdtempSync(join(tmpdir(), 'coneshift-'));
afterAll(() => {
  rmSync(folder, { recursive: true });
});

function start(argv: readonly string[], given: { input?: string; env?: NodeJS.ProcessEnv } = {}) {
  const { input = '', env = {} } = given;
  const { PATH } = process.env;
  const options = { input, encoding: 'utf8', cwd: folder, env: { PATH, ...env } } as const;
  const { status, stdout, stderr } = spawnSync(process.execPath, [MAIN, ...argv], options);
  return { status, stdout, stderr };
}

describe('the built program', () => {
  it('goes from the archive to an answer', () => {
    const fit = start(['fit', DEMO, '--out', 'model.json', '--json']);
    expect([fit.status, fit.stderr]).toEqual([0, '']);
    expect(JSON.parse(fit.stdout)).toMatchObject({ counts: { read: 341, fitted: 329 } });
    // Written whole: nothing half-done stays beside it.
    expect(readdirSync(folder)).toEqual(['model.json']);
    const shift = start(['shift', 'model.json', '--recipe', 'Bellringer']);
    expect([shift.status, shift.stderr]).toEqual([0, '']);
    expect(shift.stdout).toContain('Bellringer');
    const points = 'point,SiO2,Al2O3,CaO\nP0,3,0.4,1\n';
    const piped = start(['predict', 'model.json', '--cone', '6', '--points', '-'], {
      input: points,
    });
    expect([piped.status, piped.stdout.includes('P0')]).toEqual([0, true]);
  });

  it('gives the same bytes twice', () => {
    const once = start(['fit', DEMO, '--out', 'once.json']);
    const first = readFileSync(join(folder, 'once.json'), 'utf8');
    const again = start(['fit', DEMO, '--out', 'once.json']);
    expect([once.status, again.status, again.stdout]).toEqual([0, 0, once.stdout]);
    expect(readFileSync(join(folder, 'once.json'), 'utf8')).toBe(first);
  });

  it('tells its version and its exit codes', () => {
    const { version } = JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8')) as {
      version: string;
    };
    expect(start(['--version'])).toEqual({ status: 0, stdout: `${version}\n`, stderr: '' });
    expect(start(['bogus']).status).toBe(2);
    expect(start(['check', 'nowhere']).status).toBe(3);
    expect(start(['check', join(ROOT, 'test/support/faulty-archive')]).status).toBe(3);
  });

  it('says in words what cannot be read or written', () => {
    const missing = start(['predict', 'none.json', '--cone', '6', '--glaze', 'SiO2=3']);
    expect(missing.status).toBe(3);
    expect(missing.stderr.replace(/\s+/g, ' ')).toContain('there is no such file or folder');
    const nowhere = start(['fit', DEMO, '--out', 'no/such/folder/m.json']);
    expect(nowhere.status).toBe(3);
    expect(nowhere.stderr.replace(/\s+/g, ' ')).toContain('"no/such/folder/m.json"');
    writeFileSync(join(folder, 'notes.md'), 'mine');
    expect(start(['fit', DEMO, '--out', 'notes.md']).status).toBe(2);
    expect(readFileSync(join(folder, 'notes.md'), 'utf8')).toBe('mine');
  });

  it('ends with 3 where a model cannot be written, and names the file whole', () => {
    // Short enough to be looked for, too long for the file that is written beside it first.
    const name = `${'m'.repeat(245)}.json`;
    const { status, stderr } = start(['fit', DEMO, '--out', name]);
    expect(status).toBe(3);
    expect(stderr).toContain(`"${name}"`);
    expect(readdirSync(folder)).not.toContain(name);
  });

  it('is as wide as COLUMNS says where there is no terminal', () => {
    const widest = (text: string) => Math.max(...text.split('\n').map((line) => line.length));
    expect(widest(start(['unity', DEMO], { env: { COLUMNS: '60' } }).stdout)).toBeLessThanOrEqual(
      60,
    );
    const odd = start(['unity', DEMO], { env: { COLUMNS: 'wide' } }).stdout;
    expect(odd).toBe(start(['unity', DEMO]).stdout);
  });

  it('measures names of other scripts as the library does', () => {
    const rows = ['5', '6', '6', '9'].map(
      (cone, i) => `釉薬 ${i + 1} 🔥,é窯,${cone},3,0.4,0.1,0.7,0.3,gloss`,
    );
    const csv = `tile,firing,cone,SiO2,Al2O3,B2O3,CaO,K2O,surface\n${rows.join('\n')}\n`;
    writeFileSync(join(folder, 'names.csv'), csv);
    const { status, stdout } = start(['check', 'names.csv']);
    const reading = readArchive(new Map([['names.csv', new TextEncoder().encode(csv)]]));
    expect(stdout).toBe(checkPage(reading, inventory(reading.archive), PLAIN_LOOK));
    expect(stdout).toMatch(/釉薬|窯/);
    expect(status).toBe(0);
  });

  it('writes no terminal codes into a pipe, and honours NO_COLOR', () => {
    expect(start(['check', DEMO]).stdout).not.toContain('\u001b');
    expect(start(['check', DEMO], { env: { NO_COLOR: '1' } }).stdout).not.toContain('\u001b');
    expect(start(['check', DEMO], { env: { FORCE_COLOR: '1' } }).stdout).toContain('\u001b[1m');
  });

  it('ends quietly with 0 when its reader has seen enough', async () => {
    const child = spawn(process.execPath, [MAIN, 'unity', DEMO, '--json']);
    let stderr = '';
    child.stderr.on('data', (chunk: Buffer) => {
      stderr += chunk.toString();
    });
    child.stdout.once('data', () => {
      child.stdout.destroy();
    });
    const status = await new Promise((resolve) => child.on('close', resolve));
    expect([status, stderr]).toEqual([0, '']);
  });
});
