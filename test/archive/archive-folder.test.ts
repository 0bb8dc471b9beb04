import { describe, expect, it } from 'vitest';
import { readArchive } from '../../src/archive/read-archive.ts';
import { faultLine } from '../../src/errors.ts';
import { filesOf } from '../support/builders.ts';

// Invented studio; the minerals are pure.
const FOLDER = {
  'tiles.csv': `tile,recipe,blend,firing,cone,shelf,surface,body
A,Clear,,F1,,top,gloss,Stoneware
B,Clear,line 1,F1,,middle,gloss,
C,Clear,,F1,5.5,top,matte,
D,Clear,,F2,,top,gloss,Stonware
E,Spotted,,F2,,,,
`,
  'firings.csv': `firing,date,kiln,set_cone,cone,peak_c,hold_min,cooling_c_per_h,atmosphere,log
F1,2024-03-01,North,6,6.5,1230,15,60,oxidation,f1.csv
F2,,South,6,,,,,,
`,
  'witness.csv': 'firing,shelf,cone,seen by\nF1,top,6,\nF1,bottom,7,K\n',
  'recipes.csv': `recipe,material,parts,over_100,supplier
Clear,Feldspar,1,,ours
Spotted,Iron,3,yes
Clear,Whiting,1,
Spotted,Feldspar,60,
Spotted,Whiting,30,
Spotted,Whiting,10,
Wash,Iron,100,
`,
  'materials.csv': `material,SiO2,Al2O3,K2O,Fe2O3,loi,basis,formula,soluble,price
Feldspar,64.8,18.3,16.9,,0,fired,,,12
Whiting,,,,,,,CaCO3,no,
Iron,,,,100,,,,,
`,
  'bodies.csv': 'body,cone,absorption_pct,expansion_per_k\nStoneware,6,2,6.5e-6\nPorcelain,,,\n',
};

describe('an archive folder', () => {
  const { archive, faults } = readArchive(filesOf(FOLDER));

  it('is sound', () => {
    expect(faults).toEqual([]);
    expect(archive.counts).toEqual({ read: 5, fitted: 4, unjudged: 1, setAside: 0, refused: 0 });
    expect(archive.files.map(({ file, rows }) => `${file} ${rows}`)).toEqual([
      'tiles.csv 5',
      'firings.csv 2',
      'witness.csv 2',
      'recipes.csv 7',
      'materials.csv 3',
      'bodies.csv 2',
    ]);
  });

  it('takes the heat of a tile from the surest source', () => {
    expect(archive.tiles.map(({ heat }) => [heat?.cone, heat?.source])).toEqual([
      ['6', 'witness cone'],
      ['6.5', 'firing'], // no witness cone on the middle shelf
      ['5.5', 'tile'],
      ['6', 'set cone'],
      ['6', 'set cone'],
    ]);
    expect(archive.tiles.map(({ load }) => load)).toEqual(['F1', 'F1', 'F1', 'F2', 'F2']);
  });

  it('computes the recipes, and what is weighed over the hundred with them', () => {
    const [clear, spotted] = archive.recipes;
    // By hand: 1 g of each; feldspar 16.9 / 94.195 mol K2O, whiting 100 / 100.086 mol CaO in 100 g.
    const kMoles = 16.9 / 94.195;
    const caMoles = 100 / 100.086;
    expect(clear.unity.CaO).toBeCloseTo(caMoles / (caMoles + kMoles), 4); // weights of 5 figures
    expect(archive.tiles[0].unity).toEqual(clear.unity);
    expect(spotted.unity.Fe2O3).toBeGreaterThan(0);
    expect(clear.lines[0]).toHaveProperty('other', { supplier: 'ours' });
    expect(spotted.lines).toEqual([
      { material: 'Iron', parts: 3, over100: true, line: 3 },
      { material: 'Feldspar', parts: 60, over100: false, line: 5 },
      { material: 'Whiting', parts: 30, over100: false, line: 6 },
      { material: 'Whiting', parts: 10, over100: false, line: 7 },
    ]);
  });

  it('keeps what later commands need', () => {
    expect(archive.firings[0]).toEqual({
      firing: 'F1',
      line: 2,
      date: '2024-03-01',
      kiln: 'North',
      setCone: '6',
      cone: '6.5',
      peakC: 1230,
      holdMin: 15,
      coolingCPerH: 60,
      atmosphere: 'oxidation',
      log: 'f1.csv',
    });
    expect(archive.firings[1]).toEqual({ firing: 'F2', line: 3, kiln: 'South', setCone: '6' });
    expect(archive.witness[1]).toEqual({
      firing: 'F1',
      line: 3,
      shelf: 'bottom',
      cone: '7',
      coneIndex: 7,
      other: { 'seen by': 'K' },
    });
    expect(archive.bodies).toEqual([
      {
        body: 'Stoneware',
        line: 2,
        maturesAtCone: '6',
        absorptionPercent: 2,
        expansionPerK: 6.5e-6,
      },
      { body: 'Porcelain', line: 3 },
    ]);
    const [feldspar, whiting] = archive.materials;
    expect(feldspar).toMatchObject({
      analysis: { SiO2: 64.8, Al2O3: 18.3, K2O: 16.9 },
      basis: 'fired',
      loiPercent: 0,
      soluble: false,
      other: { price: '12' },
    });
    expect(whiting).toMatchObject({ formula: 'CaCO3', soluble: false });
    expect(whiting).not.toHaveProperty('analysis');
  });

  it('notes what looks odd', () => {
    expect(archive.notes).toEqual([
      'witness.csv: column "seen by" not known, kept as written',
      'recipes.csv: column "supplier" not known, kept as written',
      'materials.csv: column "price" not known, kept as written',
      'recipes.csv: recipe "Spotted" lists "Whiting" in lines 6 and 7; all count',
      'recipes.csv:8 recipe "Wash": expected a flux, found none (oxides given: Fe2O3); ' +
        'left out, no tile uses it',
      '2 tiles with the cone that the kiln was set to: no witness cone was read for their shelf or firing',
      '1 tile not judged yet: kept, not fitted',
      'body "Stonware" of the tiles is not in bodies.csv; nearest known: "Stoneware"',
    ]);
  });

  const without = (...names: (keyof typeof FOLDER)[]) => {
    const left = Object.entries(FOLDER).filter(([name]) => !names.includes(name as never));
    const read = readArchive(filesOf(Object.fromEntries(left)));
    return { counts: read.archive.counts, faults: read.faults.map(faultLine) };
  };

  it('without materials.csv no recipe can be computed', () => {
    const { faults: found, counts } = without('materials.csv');
    expect(found).toHaveLength(6);
    expect(found[0]).toBe(
      'tiles.csv:2 recipe: expected a recipe without faults, got "Clear"; see recipes.csv:2',
    );
    expect(found[5]).toBe('materials.csv: expected this file beside recipes.csv, found none');
    expect(counts).toMatchObject({ read: 5, refused: 5 });
  });

  it('without recipes.csv no tile has a composition', () => {
    expect(without('recipes.csv').faults).toContain(
      'tiles.csv:2 recipe: expected a recipes.csv to look up the recipe, got "Clear"',
    );
  });

  it('without firings.csv the witness cones still tell the heat of their shelf', () => {
    const { faults: found, counts } = without('firings.csv');
    expect(found).toEqual([
      'tiles.csv:3 cone: expected a cone, since no firings.csv tells that of firing "F1"',
      'tiles.csv:5 cone: expected a cone, since no firings.csv tells that of firing "F2"',
    ]);
    expect(counts).toEqual({ read: 5, fitted: 2, unjudged: 1, setAside: 0, refused: 2 });
  });
});
