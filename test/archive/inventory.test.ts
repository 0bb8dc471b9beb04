import { describe, expect, it } from 'vitest';
import type { Archive, Firing, Recipe, Tile, WitnessReading } from '../../src/archive/archive.ts';
import { inventory } from '../../src/archive/inventory.ts';
import { kilnAccounts } from '../../src/archive/kiln-account.ts';
import { coneIndex } from '../../src/firing/cone.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';

const aFiring = (firing: string, given: Partial<Firing> = {}): Firing => ({
  firing,
  line: 2,
  kiln: 'North',
  setCone: '6',
  ...given,
});
const aReading = (firing: string, shelf: string, cone: string): WitnessReading => ({
  firing,
  line: 2,
  shelf,
  cone,
  coneIndex: coneIndex(cone),
});
const aRecipe = (recipe: string, parts: number): Recipe => ({
  recipe,
  lines: [
    { material: 'Feldspar', parts, over100: false, line: 2 },
    { material: 'Iron', parts: 8, over100: true, line: 3 },
  ],
  unity: { SiO2: 3, CaO: 1 },
});
const oddOf = (archive: Archive) => inventory(archive).odd;

/** A tile not judged, of which nobody knows how hot it was. */
function withoutHeat(tile: string): Tile {
  const { line, unity, load, surfaceWritten } = aTile({ tile });
  return { tile, line, unity, load, surfaceWritten, verdict: 'unjudged' };
}

describe('the tiles by cone', () => {
  it('count to the nearest whole cone, cool to hot, unknown heat last', () => {
    const tiles = [
      aTile({ tile: 'A', heat: aHeat('6.25') }),
      aTile({ tile: 'B', heat: aHeat('06'), verdict: 'matte' }),
      aTile({ tile: 'C', heat: aHeat('5.75'), verdict: 'overfired' }),
    ];
    const { byCone } = inventory(anArchive([...tiles, withoutHeat('D')]));
    expect(byCone.map(({ cone }) => cone)).toEqual(['06', '6', null]);
    expect(byCone.map(({ tiles: counts }) => counts.all)).toEqual([1, 2, 1]);
    expect(byCone[1].tiles).toMatchObject({ gloss: 1, overfired: 1, matte: 0 });
    expect(byCone[2].tiles.unjudged).toBe(1);
  });
});

describe('the composition of the tiles', () => {
  it('gives the range of each measure, and the other oxides held', () => {
    const unities = [2, 3, 7].map((SiO2) => ({ SiO2, Al2O3: 0.5, K2O: 0.3, CaO: 0.7 }));
    const { ranges, otherOxides } = inventory(
      anArchive(unities.map((unity, i) => aTile({ tile: `T${i}`, unity }))),
    );
    expect(ranges.find(({ measure }) => measure === 'SiO2')).toMatchObject({
      lowest: 2,
      median: 3,
      highest: 7,
    });
    expect(ranges.find(({ measure }) => measure === 'SiO2:Al2O3')).toMatchObject({ lowest: 4 });
    expect(otherOxides.map(({ oxide, tiles }) => [oxide, tiles])).toEqual([
      ['K2O', 3],
      ['CaO', 3],
    ]);
  });

  it('bears no tiles, and glazes without alumina', () => {
    expect(inventory(anArchive()).ranges).toEqual([]);
    const { ranges } = inventory(anArchive([aTile({ unity: { SiO2: 3, CaO: 1 } })]));
    expect(ranges.every(({ highest }) => Number.isFinite(highest))).toBe(true);
  });
});

describe('the account of a kiln', () => {
  it('trends over all its firings in time, readings or not', () => {
    // By hand: 0.2 cone lost each firing; the third was not read, the rows are not in order of time.
    const firings = [
      aFiring('K4', { date: '2024-04-01' }),
      aFiring('K1', { date: '2024-01-01' }),
      aFiring('K3', { date: '2024-03-01' }),
      aFiring('K2', { date: '2024-02-01' }),
    ];
    const witness = [
      aReading('K1', 'top', '6'),
      aReading('K2', 'top', '5.8'),
      aReading('K4', 'top', '5.4'),
    ];
    const [north] = kilnAccounts(anArchive([], { firings, witness }));
    expect(north.firings.map(({ firing }) => firing)).toEqual(['K1', 'K2', 'K3', 'K4']);
    expect(north.trend?.conesPerFiring).toBeCloseTo(-0.2, 12);
    expect(north.trend).toMatchObject({ firings: 3, readings: 3 });
    expect(north.firings[2].lessSet).toBeNull();
  });

  it('takes firings by name where not all have a date, in whatever order the rows stand', () => {
    const cones = ['6', '5.9', '5.8', '5.7'];
    const firings = cones.map((cone, i) => aFiring(`K${i + 8}`, { cone }));
    const turned = [firings[2], firings[0], firings[3], firings[1]];
    const [north] = kilnAccounts(anArchive([], { firings: turned }));
    expect(north.firings.map(({ firing }) => firing)).toEqual(['K8', 'K9', 'K10', 'K11']);
    expect(north.isDated).toBe(false);
    expect(north.trend?.conesPerFiring).toBeCloseTo(-0.1, 12);
  });

  it('takes a shelf in other capitals for the same, the hottest shelf first', () => {
    const firings = [aFiring('K1'), aFiring('K2')];
    const witness = [
      aReading('K1', 'Low', '5.5'),
      aReading('K1', 'top', '6.5'),
      aReading('K2', 'low', '5.5'),
      aReading('K2', 'Top', '6.5'),
    ];
    const [north] = kilnAccounts(anArchive([], { firings, witness }));
    expect(north.shelves).toEqual([
      { shelf: 'Top', readings: 2, lessLoad: 0.5 },
      { shelf: 'Low', readings: 2, lessLoad: -0.5 },
    ]);
  });

  it('is not led astray by one wild reading', () => {
    const cones = ['6', '5.9', '5.8', '9', '5.6', '5.5', '5.4'];
    const firings = cones.map((cone, i) => aFiring(`K${i}`, { cone }));
    const [north] = kilnAccounts(anArchive([], { firings }));
    expect(north.trend?.conesPerFiring).toBeCloseTo(-0.1, 1);
  });

  it('takes shelves before the one cone of firings.csv, and compares shelves within a load', () => {
    const firings = [aFiring('K1', { cone: '7' })];
    const witness = [
      aReading('K1', 'top', '6.5'),
      aReading('K1', 'middle', '6'),
      aReading('K1', 'bottom', '5.5'),
    ];
    const [north] = kilnAccounts(anArchive([], { firings, witness }));
    expect(north.lessSet).toBe(0);
    expect(north.shelves.map(({ shelf, lessLoad }) => [shelf, lessLoad])).toEqual([
      ['top', 0.5],
      ['middle', 0],
      ['bottom', -0.5],
    ]);
    expect(north.trend).toBeNull();
  });

  it('makes no history of firings without a kiln, and puts them last', () => {
    const unnamed: Firing = { firing: 'U1', line: 2, setCone: '6', cone: '6' };
    const firings = [unnamed, aFiring('K1', { cone: '6' })];
    expect(kilnAccounts(anArchive([], { firings })).map(({ kiln }) => kiln)).toEqual([
      'North',
      null,
    ]);
  });
});

describe('what looks odd', () => {
  it('a kiln that drifts by more than cones are read to', () => {
    const drifting = ['6', '5.75', '5.5', '5.25'].map((cone, i) => aFiring(`K${i}`, { cone }));
    expect(oddOf(anArchive([], { firings: drifting }))).toContain(
      'North reads 0.25 cone cooler each firing (4 firings, taken by name for want of dates): elements may be ' +
        'wearing',
    );
    const steady = ['6', '6.25', '6', '6'].map((cone, i) => aFiring(`K${i}`, { cone }));
    expect(oddOf(anArchive([], { firings: steady }))).toEqual([]);
  });

  it('a load far from its set cone', () => {
    const firings = [aFiring('K1', { cone: '5' })];
    expect(oddOf(anArchive([], { firings }))).toEqual([
      'loads far from the cone they were set to: K1 (set to 6, reads 1.00 cone below)',
    ]);
  });

  it('a load of one surface', () => {
    const tiles = Array.from({ length: 8 }, (_, i) =>
      aTile({ tile: `T${i}`, firing: 'K1', verdict: 'underfired' }),
    );
    expect(oddOf(anArchive(tiles))).toContain('loads of one surface alone: K1 (all 8 underfired)');
    expect(oddOf(anArchive(tiles.slice(1)))).toEqual([]);
  });

  it('a recipe both underfired and gloss at one cone, and the load behind it', () => {
    const pair = (recipe: string) => [
      aTile({ tile: `${recipe} 1`, recipe, firing: 'K1', verdict: 'underfired' }),
      aTile({ tile: `${recipe} 2`, recipe, firing: 'K2' }),
    ];
    expect(oddOf(anArchive([...pair('Clear'), ...pair('Satin')]))).toEqual([
      'the same recipe at the same cone is underfired on one tile and gloss on another: Clear ' +
        '(Clear 1 against Clear 2) and Satin (Satin 1 against Satin 2); 2 of the 2 underfired ones ' +
        'are of load "K1"',
    ]);
    const other = aTile({ tile: 'x', recipe: 'Clear', heat: aHeat('5'), verdict: 'underfired' });
    expect(oddOf(anArchive([other, aTile({ recipe: 'Clear' })]))).toEqual([]);
  });

  it('a composition far from the others, such as a slip of the decimal point', () => {
    const tiles = Array.from({ length: 12 }, (_, i) =>
      aTile({ tile: `T${i}`, unity: { SiO2: 3 + i / 10, Al2O3: 0.4, CaO: 1 } }),
    );
    const slip = aTile({ tile: 'Slip', unity: { SiO2: 12, Al2O3: 0.4, CaO: 1 } });
    expect(oddOf(anArchive([...tiles, slip]))[0]).toBe(
      'silica far from that of the other tiles: Slip (12.00)',
    );
    const wild = aTile({ tile: 'Wild', unity: { SiO2: 32, Al2O3: 0.4, CaO: 1 } });
    expect(oddOf(anArchive([...tiles, wild])).join()).not.toContain('silica far');
    expect(oddOf(anArchive(tiles))).toEqual([]);
  });

  it('a recipe off the hundred where the others make it, what is over the hundred left aside', () => {
    const recipes = [aRecipe('A', 100), aRecipe('B', 100.2), aRecipe('C', 92)];
    expect(oddOf(anArchive([], { recipes }))).toEqual([
      'recipes usually make 100 parts, but not C (92.0)',
    ]);
    const byGrams = [aRecipe('A', 500), aRecipe('B', 250), aRecipe('C', 92)];
    expect(oddOf(anArchive([], { recipes: byGrams }))).toEqual([]);
  });

  it('neutralises names', () => {
    const firings = [aFiring('\u001b[2J', { cone: '5' })];
    expect(oddOf(anArchive([], { firings })).join()).not.toContain('\u001b');
  });
});
