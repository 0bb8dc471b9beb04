import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { parseArchive } from '../../../src/archive/read-archive.ts';
import { readPoints } from '../../../src/archive/read-points.ts';
import { mapPoints, speedArchive, speedPoints, TILES_A_LOAD } from './inputs.ts';
import { BARE, fitJobs, HELP_JOB, MAIN } from './plan.ts';
import { speedTable } from './table.ts';
import { timed } from './timing.ts';

const folder = mkdtempSync(join(tmpdir(), 'coneshift-'));
afterAll(() => {
  rmSync(folder, { recursive: true });
});
const bytes = (text: string) => new TextEncoder().encode(text);

describe('the inputs of the speed bench', () => {
  it.each([40, 300, 1003])('%i tiles are as many judged ones in loads of 25', (size) => {
    const archive = parseArchive(new Map([['tiles.csv', bytes(speedArchive(size))]]));
    expect(archive.counts).toMatchObject({ read: size, fitted: size, refused: 0 });
    const loads = new Set(archive.tiles.map(({ load }) => load));
    expect(loads.size).toBe(Math.ceil(size / TILES_A_LOAD));
    const verdicts = new Set(archive.tiles.map(({ verdict }) => verdict));
    expect([...verdicts].sort()).toEqual(['gloss', 'matte', 'underfired']);
  });

  it('are the same bytes each time', () => {
    expect(speedArchive(100)).toBe(speedArchive(100));
    expect(speedPoints(10)).toBe(speedPoints(10));
  });

  it('are points that can be read, a map among them', () => {
    expect(readPoints('points.csv', bytes(speedPoints(30))).points).toHaveLength(30);
    const { points } = readPoints('map.csv', bytes(mapPoints(4)));
    expect(points).toHaveLength(16);
    expect(points[0].unity.SiO2).toBeCloseTo(1.8, 3);
    expect(points[15].unity.Al2O3).toBeCloseTo(0.75, 3);
  });
});

describe('timing', () => {
  const main = join(folder, 'main.cjs');

  it('runs a command as often as asked, with its memory', () => {
    writeFileSync(main, "require('node:fs').appendFileSync('runs.txt', process.argv[2]);\n");
    const job = { name: 'x', args: [MAIN, 'a'] };
    const { seconds, mebibytes } = timed(job, { folder, main }, [2, 2]);
    expect(seconds).toHaveLength(2);
    expect(Math.min(...seconds)).toBeGreaterThan(0.005);
    expect(mebibytes).toBeGreaterThan(10);
  });

  it('says which command failed, and how', () => {
    writeFileSync(main, "console.error('no kiln'); process.exitCode = 3;\n");
    const job = { name: 'a failing job', args: [MAIN] };
    expect(() => timed(job, { folder, main }, [1, 1])).toThrow(
      /a failing job ended with 3: no kiln/,
    );
  });
});

describe('the table', () => {
  const timing = (job: (typeof BARE)[], seconds: number, mebibytes = 100) =>
    job.map((one) => ({ job: one, seconds: [seconds, seconds / 2, seconds * 2], mebibytes }));
  const bare = timing([BARE], 0.05);
  const said = (rows: ReturnType<typeof timing>) => speedTable([...bare, ...rows]).at(-1);

  it('tells medians, multiples and whether a bar is reached', () => {
    expect(said(timing([HELP_JOB], 0.07))).toMatch(/0\.070 +0\.035 +1\.40 +100 +pass: 1\.6 x bare/);
    expect(said(timing([HELP_JOB], 0.09))).toContain('SHORT');
    expect(said(timing(fitJobs([300]), 0.54))).toContain('pass');
    expect(said(timing(fitJobs([300]), 0.56))).toContain('SHORT');
    expect(said(timing(fitJobs([40]), 9))).not.toMatch(/pass|SHORT/);
  });

  it('holds the largest fit to time, memory and how it grows', () => {
    const large = (seconds: number, memory: number, tenth: number) =>
      said([...timing(fitJobs([10_000]), tenth), ...timing(fitJobs([100_000]), seconds, memory)]);
    expect(large(25, 900, 3)).toContain('pass');
    expect(large(31, 900, 3)).toContain('SHORT');
    expect(large(25, 1100, 3)).toContain('SHORT');
    expect(large(25, 900, 2)).toContain('SHORT');
  });
});
