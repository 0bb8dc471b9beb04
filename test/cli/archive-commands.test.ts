import { describe, expect, it } from 'vitest';
import { run } from '../../src/cli/run.ts';
import { parseModel } from '../../src/model/model-file.ts';
import { csvOf } from '../support/builders.ts';
import { fakeIo, type FakeWorld } from '../support/fake-io.ts';

// Invented studio; the minerals are pure.
const TILES = csvOf([
  ['tile', 'recipe', 'firing', 'surface'],
  ['A', 'Clear', 'F1', 'gloss'],
  ['B', 'Stiff', 'F1', 'underfired'],
  ['C', 'Clear', 'F2', 'gloss'],
  ['D', 'Stiff', 'F2', ''],
]);
const STUDIO = {
  's/tiles.csv': TILES,
  's/firings.csv': 'firing,kiln,set_cone,cone\nF1,North,6,6\nF2,North,5,5\n',
  's/recipes.csv':
    'recipe,material,parts\nClear,Albite,50\nClear,Calcite,20\nClear,Quartz,30\n' +
    'Stiff,Albite,40\nStiff,Kaolinite,60\n',
  's/materials.csv':
    'material,formula\nAlbite,NaAlSi3O8\nCalcite,CaCO3\nQuartz,SiO2\nKaolinite,Al2Si2O5(OH)4\n',
};
const FAULTY = { ...STUDIO, 's/tiles.csv': `${TILES}E,Clear,F9,gloss\nF,Clear,F1,glosy\n` };

async function called(argv: readonly string[], world: FakeWorld) {
  const io = fakeIo(world);
  const exitCode = await run(argv, io);
  return { exitCode, io, out: io.stdout(), err: io.stderr() };
}
const json = (text: string) => JSON.parse(text) as Record<string, unknown>;

describe('coneshift check', () => {
  it('ends with 0 on a sound archive, and writes nothing', async () => {
    const { exitCode, io, out, err } = await called(['check', 's'], { files: STUDIO });
    expect([exitCode, err, io.written.size]).toEqual([0, '', 0]);
    expect(out).toMatch(/^4 tiles read = 3 fitted \+ 1 unjudged \+ 0 set aside \+ 0 refused\n/);
  });

  it('lists every fault and ends with 3', async () => {
    const { exitCode, out, err } = await called(['check', 's/'], { files: FAULTY });
    expect(exitCode).toBe(3);
    expect(out).toContain('tiles.csv:6 firing: expected a firing of firings.csv, got "F9"');
    expect(out).toContain('tiles.csv:7 surface: expected gloss');
    expect(err).toBe('coneshift: 2 faults in the archive\n');
  });

  it('gives the same as JSON', async () => {
    const { exitCode, out } = await called(['check', 's', '--json'], { files: FAULTY });
    const answer = json(out);
    expect(exitCode).toBe(3);
    expect(answer).toMatchObject({
      schema: 'coneshift.check/1',
      counts: { read: 6, fitted: 3, unjudged: 1, setAside: 0, refused: 2 },
      kilns: [{ kiln: 'North' }],
    });
    expect(answer['faults']).toHaveLength(2);
  });

  it('opens only the files of an archive, and notes other CSV files', async () => {
    const files = {
      ...STUDIO,
      's/prices.csv': 'secret',
      's/notes.txt': 'secret',
      's/old/tiles.csv': 'secret',
    };
    const { exitCode, io, out } = await called(['check', 's'], { files });
    expect(exitCode).toBe(0);
    expect([...io.opened].sort()).toEqual(Object.keys(STUDIO).sort());
    expect(out).toContain('"prices.csv" is no file of an archive: not read');
  });

  const ALONE = 'tile,SiO2,Al2O3,CaO,cone,surface\nA,3,0.4,1,6,gloss\nB,3,0.4,1,six,gloss\n';

  it.each([
    ['a CSV file by its own name', ['check', 'my/Test tiles.csv'], 'Test tiles.csv:3 cone'],
    ['a folder with one CSV file', ['check', 'my'], 'Test tiles.csv:3 cone'],
    ['standard input', ['check', '-'], 'standard input:3 cone'],
  ])('reads %s', async (_, argv, place) => {
    const world = { files: { 'my/Test tiles.csv': ALONE }, stdin: ALONE };
    const { exitCode, out } = await called(argv, world);
    expect(exitCode).toBe(3);
    expect(out).toContain(place);
  });

  it('ends with 3 where there is nothing', async () => {
    const { exitCode, out, err } = await called(['check', 'nowhere'], {});
    expect([exitCode, out]).toEqual([3, '']);
    expect(err.replace(/\s+/g, ' ')).toContain(
      '(a folder or a CSV file) at "nowhere", found nothing',
    );
  });
});

describe('coneshift fit', () => {
  it('writes a model that can be read back, and says where', async () => {
    const { exitCode, io, out } = await called(['fit', 's', '--out', 'm.json'], { files: STUDIO });
    expect(exitCode).toBe(0);
    expect([...io.written.keys()]).toEqual(['m.json']);
    const model = parseModel(io.written.get('m.json') ?? '');
    expect(model.archive.counts.fitted).toBe(3);
    expect(model.madeBy).toBe('coneshift 0.0.0-test');
    expect(out).toContain('Model written to m.json');
  });

  it('gives its account as JSON, and writes nothing without --out', async () => {
    const { exitCode, io, out } = await called(['fit', 's', '--json'], { files: STUDIO });
    expect([exitCode, io.written.size]).toEqual([0, 0]);
    const answer = json(out);
    expect(answer).toMatchObject({
      schema: 'coneshift.fit/1',
      counts: { read: 4, fitted: 3, unjudged: 1, setAside: 0, refused: 0 },
      melt: { tiles: { no: 1, yes: 2 } },
      writtenTo: null,
    });
    for (const account of ['byCone', 'byLoad', 'byGlaze']) {
      expect(answer).toHaveProperty(`validation.${account}.logScore`);
      expect(answer).toHaveProperty(`validation.${account}.baseRateLogScore`);
      expect(answer).toHaveProperty(`validation.${account}.folds`);
    }
  });

  it('stops at faulty rows with 3, leaving an older model as it is', async () => {
    const { exitCode, io, out, err } = await called(['fit', 's', '-o', 'm.json'], {
      files: FAULTY,
    });
    expect([exitCode, out, io.written.size]).toEqual([3, '', 0]);
    expect(err).toContain('2 faults in the input');
    expect(err).toContain('tiles.csv:7 surface');
    expect(err).toContain('--leave-out-faulty');
  });

  it('tells the same faults as JSON, where JSON was asked for', async () => {
    const { exitCode, out, err } = await called(['fit', 's', '--json'], { files: FAULTY });
    expect(exitCode).toBe(3);
    expect(err).toContain('2 faults in the input');
    expect(json(out)).toMatchObject({
      schema: 'coneshift.fit/1',
      counts: { read: 6, fitted: 3, unjudged: 1, setAside: 0, refused: 2 },
      faults: [
        { line: 6, column: 'firing' },
        { line: 7, column: 'surface' },
      ],
    });
    expect(json(out)).not.toHaveProperty('validation');
  });

  it('says what puts the compositions in doubt, on the page and in the JSON', async () => {
    const files = { 'x.csv': 'tile,SiO2,Al2O3,K2O,CaO,cone,surface\nB,3,0.4,0.2,0.8,6,gloss\n' };
    const note = 'x.csv: no B2O3 column: read as 0 for the 1 tile given by oxides';
    const page = await called(['fit', 'x.csv'], { files });
    expect(page.out.replace(/\s+/g, ' ')).toContain(note);
    const { out } = await called(['fit', 'x.csv', '--json'], { files });
    expect(json(out)['notes']).toContain(note);
    const check = await called(['check', 'x.csv'], { files });
    expect(check.out.replace(/\s+/g, ' ')).toContain(note);
  });

  it('needs no judged tile at all, so that it does not end with 4', async () => {
    const files = { 'x.csv': 'tile,SiO2,Al2O3,K2O,CaO,cone,surface\n' };
    expect((await called(['fit', 'x.csv'], { files })).exitCode).toBe(0);
  });

  it('looks for the folder of the model before the work, and tells its whole path', async () => {
    const argv = ['fit', 's', '--out', 'no/such/m.json'];
    const { exitCode, err } = await called(argv, { files: STUDIO });
    expect(exitCode).toBe(3);
    expect(err.replace(/\s+/g, ' ')).toContain('"no/such/m.json" in, found none at "no/such"');
  });

  it('goes on without them when told to, counts them and names them', async () => {
    const argv = ['fit', 's', '--leave-out-faulty'];
    const { exitCode, out, err } = await called(argv, { files: FAULTY });
    expect(exitCode).toBe(0);
    expect(out).toContain('6 tiles read = 3 fitted + 1 unjudged + 0 set aside + 2 refused');
    expect(out).toContain('rows with faults were left out (2 faults');
    expect(err).toContain('tiles.csv:6 firing');
  });

  it('does not go on with nothing', async () => {
    const files = { 'x.csv': 'tile,SiO2,Al2O3,CaO,cone,surface\nB,3,0.4,1,six,gloss\n' };
    const { exitCode, err } = await called(['fit', 'x.csv', '--leave-out-faulty'], { files });
    expect(exitCode).toBe(3);
    expect(err).toContain('No sound tile is left');
  });

  it.each([
    ['a file that is no model', 'README.md', 'the file there is no coneshift model'],
    ['other JSON', 'package.json', 'the file there is no coneshift model'],
    ['a file of the archive', 's/tiles.csv', 'a model is no CSV file'],
    ['a new file that would become one of the archive', 's/bodies.csv', 'a model is no CSV file'],
    ['a folder', 's', 'that is a folder'],
    ['standard output', '-', 'a model goes to a file'],
  ])('does not write over %s', async (_, out, why) => {
    const files = { ...STUDIO, 'README.md': '# Notes', 'package.json': '{"name":"x"}' };
    const { exitCode, io, err } = await called(['fit', 's', '--out', out], { files });
    expect([exitCode, io.written.size]).toEqual([2, 0]);
    expect(err.replace(/\s+/g, ' ')).toContain(why);
  });

  it('writes over an older model', async () => {
    const files = { ...STUDIO, 'm.json': '{"schema":"coneshift.model/0"}' };
    const { exitCode, io } = await called(['fit', 's', '--out', 'm.json'], { files });
    expect([exitCode, io.written.size]).toEqual([0, 1]);
  });
});

describe('coneshift unity', () => {
  it('does not depend on the order of the rows', async () => {
    const [head = '', ...rows] = STUDIO['s/recipes.csv'].trimEnd().split('\n');
    const turned = [head, ...rows.reverse(), ''].join('\n');
    const once = await called(['unity', 's'], { files: STUDIO });
    const again = await called(['unity', 's'], { files: { ...STUDIO, 's/recipes.csv': turned } });
    expect(once.out).toMatch(/Clear[^]*Stiff/);
    expect(again.out).toBe(once.out);
  });

  it('gives all recipes, or the named ones in the order asked', async () => {
    const all = json((await called(['unity', 's', '--json'], { files: STUDIO })).out);
    expect(all['schema']).toBe('coneshift.unity/1');
    expect((all['recipes'] as { recipe: string }[]).map(({ recipe }) => recipe)).toEqual([
      'Clear',
      'Stiff',
    ]);
    const { out } = await called(['unity', 's', 'Stiff', '--json'], { files: STUDIO });
    const [stiff] = json(out)['recipes'] as { unity: Record<string, number> }[];
    // By hand: the flux is Na2O alone, from 40 g albite; it brings as many moles of Al2O3.
    expect(stiff.unity['Na2O']).toBe(1);
    // 60 g kaolinite (258.156 g/mol, one Al2O3) against 40 g albite (262.219 g/mol, half a Na2O).
    expect(stiff.unity['Al2O3']).toBeCloseTo(1 + 60 / 258.156 / (40 / 262.219 / 2), 3);
  });

  it('does not mind faulty tiles, but names the faults of recipes', async () => {
    expect((await called(['unity', 's', 'Clear'], { files: FAULTY })).exitCode).toBe(0);
    const files = { ...STUDIO, 's/recipes.csv': `${STUDIO['s/recipes.csv']}Odd,Talq,100\n` };
    const { exitCode, err } = await called(['unity', 's'], { files });
    expect(exitCode).toBe(3);
    expect(err).toContain('recipes.csv:7 material: expected a material of materials.csv');
    expect((await called(['unity', 's', 'Clear'], { files })).exitCode).toBe(0);
    expect((await called(['unity', 's', 'Odd'], { files })).exitCode).toBe(3);
  });

  it('advises on a misspelt name, and on an archive without recipes', async () => {
    const { exitCode, err } = await called(['unity', 's', 'Claer'], { files: STUDIO });
    expect([exitCode, err]).toEqual([
      2,
      'coneshift: expected a recipe, got "Claer"; nearest known: "Clear"\n',
    ]);
    const files = { 'x.csv': 'tile,SiO2,Al2O3,CaO,cone,surface\nB,3,0.4,1,6,gloss\n' };
    const none = await called(['unity', 'x.csv'], { files });
    expect(none.exitCode).toBe(3);
    expect(none.err).toContain('recipes.csv: expected recipes beside tiles.csv, found none');
  });
});
