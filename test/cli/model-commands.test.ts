import { beforeAll, describe, expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { fitModel } from '../../src/model/fit.ts';
import { modelText } from '../../src/model/model-file.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { fakeIo, type FakeWorld } from '../support/fake-io.ts';

const CLEAR = { SiO2: 3.4, Al2O3: 0.42, B2O3: 0.15, K2O: 0.25, CaO: 0.75 };
const CLEAR_TEXT = 'SiO2=3.4 Al2O3=0.42 B2O3=0.15 K2O=0.25 CaO=0.75';
const ARCHIVE = {
  's/tiles.csv': 'tile,recipe,cone,surface\nA,Local,six,gloss\n',
  's/recipes.csv': 'recipe,material,parts\nLocal,Albite,50\nLocal,Calcite,50\nClear,Albite,100\n',
  's/materials.csv': 'material,formula\nAlbite,NaAlSi3O8\nCalcite,CaCO3\n',
};

let files: Record<string, string>;
beforeAll(() => {
  const tiles = [
    aTile({ tile: 'A', unity: CLEAR, firing: 'F1' }),
    aTile({ tile: 'B', unity: CLEAR, firing: 'F2', heat: aHeat('5'), verdict: 'underfired' }),
    aTile({ tile: 'C', unity: { ...CLEAR, Al2O3: 0.8 }, firing: 'F1', verdict: 'matte' }),
  ];
  const recipes = [{ recipe: 'Clear', lines: [], unity: CLEAR }];
  const bare = fitModel(anArchive(tiles));
  files = {
    ...ARCHIVE,
    'm.json': modelText({ ...bare, archive: { ...bare.archive, recipes } }),
    'bare.json': modelText(bare),
    'points.csv': 'point,SiO2,Al2O3,B2O3,K2O,CaO\nP0,3,0.4,0,0,1\nP1,6,0.8,0,0,2\n',
  };
});

async function called(argv: readonly string[], world: FakeWorld = {}) {
  const io = fakeIo({ files, ...world });
  const exitCode = await run(argv, io);
  expect(io.written.size).toBe(0);
  return { exitCode, out: io.stdout(), err: io.stderr().replace(/\s+/g, ' ') };
}
interface Row {
  readonly point: string;
  readonly cone: string;
  readonly probability: Readonly<Record<string, number>>;
}
async function predictions(...argv: string[]): Promise<readonly Row[]> {
  const { exitCode, out, err } = await called(['predict', 'm.json', ...argv, '--json']);
  expect([exitCode, err]).toEqual([0, '']);
  return (JSON.parse(out) as { predictions: readonly Row[] }).predictions;
}

describe('coneshift predict', () => {
  it('answers in the order of the points, then of the cones', async () => {
    const rows = await predictions(
      '--cone',
      '6',
      '5',
      '--points',
      'points.csv',
      '--recipe',
      'Clear',
    );
    expect(rows.map(({ point, cone }) => `${point} ${cone}`)).toEqual(
      ['P0', 'P1', 'Clear'].flatMap((point) => [`${point} 6`, `${point} 5`]),
    );
    for (const { probability } of rows) {
      const sum = Object.values(probability).reduce((a, b) => a + b);
      expect(sum).toBeCloseTo(1, 12);
    }
  });

  it('gives the same answer for a recipe and for its composition, at any scale', async () => {
    const twice = 'SiO2=6.8,Al2O3=0.84,B2O3=0.3,K2O=0.5,CaO=1.5';
    const rows = await predictions('-c', '6', '--recipe', 'Clear', '--glaze', CLEAR_TEXT, twice);
    expect(rows.map(({ point }) => point)).toEqual(['glaze 1', 'glaze 2', 'Clear']);
    expect(rows[0].probability).toEqual(rows[2].probability);
    expect(rows[1].probability['gloss']).toBeCloseTo(rows[2].probability['gloss'], 12);
  });

  it('does not take 06 for 6, and takes cones by commas, each once', async () => {
    const rows = await predictions('--glaze', CLEAR_TEXT, '--cone', '06,6', '6');
    expect(rows.map(({ cone }) => cone)).toEqual(['06', '6']);
    expect(rows[0].probability['underfired']).toBeGreaterThan(rows[1].probability['underfired']);
  });

  it('reads points or the model from standard input, but not both', async () => {
    const stdin = files['points.csv'] ?? '';
    const points = await called(['predict', 'm.json', '-c', '6', '--points', '-'], { stdin });
    expect([points.exitCode, points.out.includes('\nP1\n')]).toEqual([0, true]);
    const model = await called(['predict', '-', '-c', '6', '--glaze', CLEAR_TEXT], {
      stdin: files['m.json'] ?? '',
    });
    expect(model.exitCode).toBe(0);
    const both = await called(['predict', '-', '-c', '6', '--points', '-'], {
      stdin: files['m.json'] ?? '',
    });
    expect(both.exitCode).toBe(2);
    expect(both.err).toContain('expected one input from standard input, got more than one -');
  });

  it('looks a recipe up in --archive, whose faulty tiles do not matter', async () => {
    const argv = ['--cone', '6', '--archive', 's', '--recipe'];
    const [local] = await predictions(...argv, 'Local');
    expect(local.point).toBe('Local');
    // The archive named goes before the model: its Clear is another glaze.
    const [theirs] = await predictions(...argv, 'Clear');
    const [ours] = await predictions('--cone', '6', '--recipe', 'Clear');
    expect(theirs.probability).not.toEqual(ours.probability);
  });

  it.each([
    [['m.json', '--glaze', CLEAR_TEXT], 2, "required option '-c, --cone"],
    [['m.json', '--cone', '6'], 2, 'expected a glaze to answer for, got none'],
    [['m.json', '--cone', 'six', '--glaze', CLEAR_TEXT], 2, 'expected a cone from 022 to 42'],
    [['m.json', '--cone', '-6', '--glaze', CLEAR_TEXT], 2, 'expected a cone from 022 to 42'],
    [['--cone', '6'], 2, "missing required argument 'model'"],
    [['m.json', '--cone', '6', '--glaze', 'SiO2=3 Al203=0.4'], 2, 'nearest known: "Al2O3"'],
    [['m.json', '--cone', '6', '--recipe', 'Claer'], 2, 'nearest known: "Clear"'],
    [['bare.json', '--cone', '6', '--recipe', 'Clear'], 2, 'expected recipes in the model'],
    [['none.json', '--cone', '6', '--recipe', 'Clear'], 3, 'none.json'],
    [['points.csv', '--cone', '6', '--recipe', 'Clear'], 3, 'expected a model file'],
    [['m.json', '--cone', '6', '--points', 'm.json'], 3, 'm.json'],
  ])('%j ends with %i: %s', async (argv, exitCode, message) => {
    const found = await called(['predict', ...argv]);
    expect([found.exitCode, found.out]).toEqual([exitCode, '']);
    expect(found.err).toContain(message);
  });
});

describe('coneshift shift', () => {
  it('answers for cones 5, 6 and 7 unless told otherwise', async () => {
    const { exitCode, out } = await called(['shift', 'm.json', '--recipe', 'Clear', '--json']);
    expect(exitCode).toBe(0);
    const { schema, points } = JSON.parse(out) as {
      schema: string;
      points: { point: string; cones: { cone: string }[]; turns: unknown[] }[];
    };
    expect(schema).toBe('coneshift.shift/1');
    expect(points.map(({ cones }) => cones.map(({ cone }) => cone))).toEqual([['5', '6', '7']]);
    const page = await called(['shift', 'm.json', '--recipe', 'Clear', '--cone', '8', '6']);
    expect(page.out).toMatch(/^ +6 .*\n(?:.*\n)*? +8 /m);
  });
});

describe('coneshift boundaries', () => {
  it('runs its lines through one glaze, or through the middle of the archive', async () => {
    const through = await called(['boundaries', 'm.json', '--recipe', 'Clear', '--cone', '6']);
    expect([through.exitCode, through.err]).toEqual([0, '']);
    expect(through.out).toMatch(/^Lines through Clear: silica 3\.40/);
    const middle = await called(['boundaries', 'm.json', '--json']);
    const { schema, boundaries } = JSON.parse(middle.out) as {
      schema: string;
      boundaries: { cone: string; kind: string }[];
    };
    expect(schema).toBe('coneshift.boundaries/1');
    expect([...new Set(boundaries.map(({ cone }) => cone))]).toEqual(['5', '6', '7']);
    expect([...new Set(boundaries.map(({ kind }) => kind))].sort()).toEqual(['gloss', 'melt']);
  });

  it('does not run them through two', async () => {
    const { exitCode, err } = await called(['boundaries', 'm.json', '--points', 'points.csv']);
    expect(exitCode).toBe(2);
    expect(err).toContain('expected one glaze to run the lines through, got 2');
  });
});
