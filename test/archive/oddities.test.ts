import { describe, expect, it } from 'vitest';
import type { Archive, Firing, Tile, WitnessReading } from '../../src/archive/archive.ts';
import { inventory } from '../../src/archive/inventory.ts';
import { readArchive } from '../../src/archive/read-archive.ts';
import { faultLine } from '../../src/errors.ts';
import { coneIndex } from '../../src/firing/cone.ts';
import { aHeat, anArchive, aTile, csvOf, filesOf } from '../support/builders.ts';

const aFiring = (firing: string, given: Partial<Firing> = {}): Firing => ({
  firing,
  line: 2,
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
const some = (count: number, given: (i: number) => Partial<Tile>) =>
  Array.from({ length: count }, (_, i) => aTile({ tile: `T${i + 1}`, ...given(i) }));
const oddOf = (archive: Archive) => inventory(archive).odd;
const oddIn = (texts: Readonly<Record<string, string>>) => {
  const { archive, faults } = readArchive(filesOf(texts));
  expect(faults).toEqual([]);
  return oddOf(archive);
};

describe('a shelf without a witness cone in a load that has others', () => {
  const firings = 'firing,set_cone,cone\nL1,6,5\nL2,6,\n';
  const witness = 'firing,shelf,cone\nL1,top,5\nL2,top,6\n';
  const tiles = (...rows: [string, string, string][]) =>
    csvOf([
      ['tile', 'firing', 'shelf', 'surface', 'SiO2', 'Al2O3', 'CaO', 'K2O', 'B2O3'],
      ...rows.map((row) => [...row, 'gloss', 3, 0.4, 0.7, 0.3, 0.1]),
    ]);

  it('is told by load, shelf and tiles, with the heat that was taken', () => {
    const rows: [string, string, string][] = [
      ...['A10', 'A2', 'A1', 'A3'].map((t): [string, string, string] => [t, 'L1', 'Attic']),
      ['B1', 'L2', 'attic'],
      ['B2', 'L2', 'Top'],
      ['C1', 'L2', ''],
    ];
    const odd = oddIn({
      'tiles.csv': tiles(...rows),
      'firings.csv': firings,
      'witness.csv': witness,
    });
    expect(odd.filter((one) => one.includes('witness'))).toEqual([
      "no witness cone was read on shelf Attic of load L1 (A1, A2, A3 and 1 more took the firing's " +
        'cone 5) and shelf attic of load L2 (B1 took the set cone 6): a reading there, or a cone on ' +
        'the tile, would be surer',
    ]);
  });

  it('is none where no shelf of the load was read', () => {
    const odd = oddIn({
      'tiles.csv': tiles(['A', 'L1', 'attic']),
      'firings.csv': firings,
      'witness.csv': 'firing,shelf,cone\nL2,top,6\n',
    });
    expect(odd.join()).not.toContain('witness');
  });
});

describe('names that differ only by capitals, spaces or accents', () => {
  it('are pointed out for kilns, loads and recipes', () => {
    const firings = [
      aFiring('K 1', { kiln: 'Big' }),
      aFiring('K1', { kiln: 'big' }),
      aFiring('K2', { kiln: 'Big' }),
    ];
    const recipes = ['Celadon', 'Céladon', 'Ash', 'cela don'].map((recipe) => ({
      recipe,
      lines: [],
      unity: { SiO2: 3, CaO: 1 },
    }));
    const tail = 'alike but for capitals, spaces or accents, so probably one';
    expect(oddOf(anArchive([], { firings, recipes }))).toEqual([
      `kilns "Big" and "big" are taken as two: ${tail}`,
      `loads "K1" and "K 1" are taken as two: ${tail}`,
      `recipes "Celadon", "Céladon" and "cela don" are taken as three: ${tail}`,
    ]);
  });

  it('are pointed out for bare labels on the tiles', () => {
    const tiles = [aTile({ firing: 'June' }), aTile({ tile: 'B', firing: 'june ' })];
    expect(oddOf(anArchive(tiles))[0]).toContain('loads "June" and "june " are taken as two');
  });
});

describe('a peak that does not fit the cone', () => {
  it('is told with the usual peak and the cone that it would suit, farthest first', () => {
    const firings = [
      aFiring('K1', { cone: '6', peakC: 1150 }),
      aFiring('K2', { cone: '06', setCone: '06', peakC: 1222 }),
      aFiring('K3', { peakC: 1300 }),
      aFiring('K4', { cone: '6', peakC: 1222 }),
      aFiring('K5', { cone: '6' }),
    ];
    expect(oddOf(anArchive([], { firings }))).toEqual([
      'peaks that do not fit the cone: K2 (cone 06, usually near 998 °C; 1222 °C suits 6), K3 (set to ' +
        'cone 6, usually near 1222 °C; 1300 °C suits 11) and K1 (cone 6, usually near 1222 °C; 1150 °C ' +
        'suits 3); look at cone, peak_c and thermocouple',
    ]);
  });

  const alone = (...rows: [string, string, string][]) =>
    csvOf([
      ['tile', 'SiO2', 'Al2O3', 'B2O3', 'K2O', 'CaO', 'surface', 'cone', 'peak_c', 'remark'],
      ...rows.map(([tile, cone, peak]) => [
        ...[tile, 3, 0.4, 0.1, 0.3, 0.7, 'gloss', cone, peak],
        'x',
      ]),
    ]);

  it('of an archive of one file, too: a lost zero is a fault', () => {
    const csv = alone(['A', '6', '998'], ['B', '06', '998'], ['C', '6', '1222']);
    const { archive, faults } = readArchive(filesOf({ 't.csv': csv }));
    expect(faults.map(faultLine)).toEqual([
      't.csv:2 cone: expected a cone that fits peak_c 998, got "6" (about 1222 °C); 06 (about 998 °C) ' +
        'fits better: spreadsheets turn 06 into 6',
    ]);
    expect(archive.notes).toContain(
      'peak_c of 2 tiles compared with the cone, used for nothing else',
    );
    expect(archive.tiles.map(({ other }) => other)).toEqual([
      { peak_c: '998', remark: 'x' },
      { peak_c: '1222', remark: 'x' },
    ]);
  });

  it('of an archive of one file, too: any other misfit is worth a look', () => {
    const rows = ['A', 'B', 'C', 'D'].map((t): [string, string, string] => [t, '6', '1150']);
    expect(oddIn({ 't.csv': alone(...rows, ['E', '6', '1222'], ['F', '6', 'hot']) })[0]).toBe(
      'peaks that do not fit the cone: A, B, C and 1 more (cone 6, usually near 1222 °C; 1150 °C ' +
        'suits 3); look at cone, peak_c and thermocouple',
    );
  });
});

describe('witness cones that cannot all be right', () => {
  const read = (cones: readonly string[], given: Partial<Firing> = {}) => {
    const witness = cones.map((cone, i) => aReading('K1', `shelf ${i + 1}`, cone));
    return oddOf(anArchive([], { firings: [aFiring('K1', { kiln: 'N', ...given })], witness }));
  };

  it('shelves 7, 6 and 06 of one load', () => {
    expect(read(['7', '6', '06'])).toEqual([
      'witness cones unlike the others of their load: K1 (shelf 3 06 against shelf 1 7 and shelf 2 6)',
    ]);
  });

  it('also where no firings.csv tells a set cone, and then of two either', () => {
    const witness = [aReading('L', 'top', '7'), aReading('L', 'low', '06')];
    expect(oddOf(anArchive([], { witness }))).toEqual([
      'witness cones unlike the others of their load: L (low 06 and top 7)',
    ]);
  });

  it('not those of an uneven kiln, and a load all far from its set cone is said once', () => {
    expect(read(['7', '6', '5.5'])).toEqual([]);
    expect(read(['4', '4', '4.25'])).toEqual([
      'loads far from the cone they were set to: K1 (set to 6, reads 2.00 cone below)',
    ]);
    expect(read(['06'])).toEqual([
      'loads far from the cone they were set to: K1 (set to 6, reads 11.00 cone below)',
    ]);
  });
});

describe('cones far from the rest of the archive', () => {
  const usual = some(20, (i) => ({ heat: aHeat(['5', '6', '7'][i % 3]), firing: 'K1' }));

  it('tiles at 06 and 42 among 5 to 7, whole loads as such', () => {
    const far = some(5, (i) => ({ tile: `F${i}`, heat: aHeat('06'), firing: 'K2' }));
    const one = aTile({ tile: 'Z', heat: aHeat('42') });
    const firings = [
      aFiring('K1'),
      aFiring('K2', { setCone: '06' }),
      aFiring('K3', { setCone: '20' }),
    ];
    const odd = oddOf(anArchive([...usual, ...far, one], { firings }));
    expect(odd.filter((text) => text.startsWith('cones far'))).toEqual([
      'cones far from those of the other tiles (middle half: 5 to 6.75): Z (42), load K3 (20, no ' +
        'tile) and load K2 (06, 5 tiles)',
    ]);
  });

  it('not the cones of a studio that fires at two', () => {
    const low = some(10, (i) => ({ tile: `L${i}`, heat: aHeat('06'), firing: 'K2' }));
    expect(oddOf(anArchive([...usual, ...low])).join()).not.toContain('cones far');
  });

  it.each(['-11.00', '023', '43', '0'])('and "%s" is no cone at all: a fault', (cone) => {
    const { faults } = readArchive(
      filesOf({
        'tiles.csv': `tile,firing,cone,surface,SiO2,Al2O3,CaO\nA,K1,${cone},gloss,3,0.4,1\n`,
        'firings.csv': `firing,set_cone,cone\nK1,6,${cone}\nK2,${cone},\n`,
        'witness.csv': `firing,shelf,cone\nK1,top,${cone}\n`,
      }),
    );
    const text = `expected a cone from 022 to 42 such as 6, 06 or 6.5, got "${cone}"`;
    expect(faults.filter(({ message }) => message === text)).toHaveLength(4);
  });
});

describe('a cone on the tile', () => {
  it('that is not that of its firing, and said once', () => {
    const firings = [aFiring('K1', { cone: '04' }), aFiring('K2')];
    const tiles = [
      ...some(4, () => ({ firing: 'K1', heat: aHeat('6') })),
      aTile({ tile: 'N', firing: 'K2', heat: aHeat('7') }),
    ];
    expect(oddOf(anArchive(tiles, { firings })).filter((one) => one.includes('cone'))).toEqual([
      'the cone on the tile is not that of its firing: T1, T2, T3 and 1 more (6 against 04 of load K1)',
      'loads far from the cone they were set to: K1 (set to 6, reads 9.00 cone below)',
    ]);
  });
});

describe('a drip and a word that contradict each other', () => {
  it('are told by tile', () => {
    const tiles = [
      aTile({ tile: 'B', surfaceWritten: 'underfired', verdict: 'underfired', drip: 'melted' }),
      aTile({ tile: 'A', surfaceWritten: 'underfired', verdict: 'underfired', drip: 'melted' }),
      aTile({ tile: 'C', surfaceWritten: 'overfired', verdict: 'underfired', drip: 'unmelted' }),
      aTile({ tile: 'D', surfaceWritten: 'matte', verdict: 'underfired', drip: 'unmelted' }),
      aTile({ tile: 'E', surfaceWritten: 'overfired', verdict: 'overfired', drip: 'melted' }),
    ];
    expect(oddOf(anArchive(tiles))).toEqual([
      'drip and surface contradict each other: C (overfired, yet the drip is unmelted); A and B ' +
        '(underfired, yet the drip is melted)',
    ]);
  });
});
