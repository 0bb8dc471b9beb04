import { describe, expect, it } from 'vitest';
import { parseArchive, readArchive } from '../../src/archive/read-archive.ts';
import { ArchiveError, faultLine } from '../../src/errors.ts';
import { bytesOf, csvOf, filesOf } from '../support/builders.ts';

const HEADINGS = ['tile', 'SiO2', 'Al2O3', 'K2O', 'CaO', 'cone', 'surface'];
const GLAZE = ['3.2', '0.42', '0.2', '0.8'];
/** One CSV alone: one row a tile, `[tile, cone, surface]`. */
const loneCsv = (...tiles: [string, string, string][]) =>
  csvOf([HEADINGS, ...tiles.map(([tile, cone, surface]) => [tile, ...GLAZE, cone, surface])]);
const readTexts = (texts: Readonly<Record<string, string>>) => readArchive(filesOf(texts));
const faultsOf = (texts: Readonly<Record<string, string>>) =>
  readTexts(texts).faults.map((fault) => faultLine(fault));

describe('one CSV alone', () => {
  it('is read as tiles.csv under its own name', () => {
    const { archive, faults } = readTexts({
      'my tiles.csv': loneCsv(
        ['A', '6', 'gloss'],
        ['B', '06', 'Semi-matte'],
        ['C', '6.5', 'melted'],
        ['D', '6', ''],
        ['E', '6', 'overfired'],
        ['F', '', ''],
        ['G', '', 'matte'],
      ),
    });
    const place = 'my tiles.csv:8 cone';
    expect(faults.map(faultLine)).toEqual([`${place}: expected a cone or a firing, got neither`]);
    expect(archive.counts).toEqual({ read: 7, fitted: 3, unjudged: 2, setAside: 1, refused: 1 });
    expect(archive.files).toEqual([{ file: 'my tiles.csv', rows: 7 }]);
    expect(
      archive.tiles.map(({ tile, verdict, heat, load }) => [tile, verdict, heat, load]),
    ).toEqual([
      ['A', 'gloss', { cone: '6', coneIndex: 6, source: 'tile' }, 'tile A'],
      ['B', 'matte', { cone: '06', coneIndex: -5, source: 'tile' }, 'tile B'],
      ['C', 'melted', { cone: '6.5', coneIndex: 6.5, source: 'tile' }, 'tile C'],
      ['D', 'unjudged', { cone: '6', coneIndex: 6, source: 'tile' }, 'tile D'],
      ['E', 'overfired', { cone: '6', coneIndex: 6, source: 'tile' }, 'tile E'],
      ['F', 'unjudged', undefined, 'tile F'],
    ]);
    expect(archive.notes).toEqual([
      'my tiles.csv: no B2O3 column: read as 0 for all 7 tiles given by oxides',
      '1 semi-matte tile counted as matte',
      '6 tiles without a firing: each counts as a load of its own',
      '2 tiles not judged yet: kept, not fitted',
      '1 overfired tile set aside: kept, not fitted',
    ]);
  });

  it('a firing is a bare label where there is no firings.csv', () => {
    const { archive, faults } = readTexts({
      't.csv': csvOf([
        [...HEADINGS, 'firing'],
        ['A', ...GLAZE, '6', 'gloss', 'F1'],
        ['B', ...GLAZE, '', 'gloss', 'F1'],
        ['C', ...GLAZE, '6', 'gloss', ''],
        ['D', ...GLAZE, '6', 'gloss', 'tile C'],
      ]),
    });
    expect(faults.map(faultLine)).toEqual([
      't.csv:3 cone: expected a cone, since no firings.csv tells that of firing "F1"',
    ]);
    // C stands alone, and not in the load of D, whose firing has an unlucky name.
    expect(archive.tiles.map(({ load }) => load)).toEqual(['F1', 'tile C alone', 'tile C']);
  });

  it('an unmelted drip overrules the word, and the tiles are named', () => {
    const rows = ['gloss', 'matte', 'underfired', '', 'overfired', 'melted', 'gloss'].map(
      (surface, i) => [`T${i + 1}`, ...GLAZE, '6', surface, i === 6 ? 'melted' : 'unmelted'],
    );
    const { archive } = readTexts({ 't.csv': csvOf([[...HEADINGS, 'drip'], ...rows]) });
    expect(archive.tiles.map(({ verdict }) => verdict)).toEqual([
      ...Array.from({ length: 6 }, () => 'underfired'),
      'gloss',
    ]);
    expect(archive.notes[1]).toBe(
      '5 tiles counted as underfired for an unmelted drip: ' +
        '"T1" (gloss), "T2" (matte), "T4" (not judged), "T5" (overfired) and "T6" (melted)',
    );
  });
});

describe('shapes that spreadsheets write', () => {
  const plain = () => readTexts({ 't.csv': loneCsv(['A', '6.5', 'gloss'], ['B', '06', 'matte']) });
  const tilesOf = (bytes: Uint8Array) => {
    const { archive, faults } = readArchive(new Map([['t.csv', bytes]]));
    expect(faults).toEqual([]);
    return archive;
  };
  const rewritten = (separator: string, decimal: string) =>
    loneCsv(['A', '6.5', 'gloss'], ['B', '06', 'matte'])
      .replaceAll(',', separator)
      .replaceAll(/(\d)\.(\d)/g, `$1${decimal}$2`);

  it.each([
    [';', ',', 't.csv: separated by semicolons, decimal comma'],
    [';', '.', 't.csv: separated by semicolons, decimal point'],
    ['\t', ',', 't.csv: separated by tabs, decimal comma'],
    ['\t', '.', 't.csv: separated by tabs, decimal point'],
  ])('separator %j, decimal %j', (separator, decimal, note) => {
    const archive = tilesOf(bytesOf(rewritten(separator, decimal)));
    expect(archive.tiles).toEqual(plain().archive.tiles);
    expect(archive.notes).toContain(note);
  });

  it('UTF-16 with tabs', () => {
    const text = `\uFEFF${rewritten('\t', ',').replaceAll('\n', '\r\n')}`;
    const bytes = new Uint8Array(Buffer.from(text, 'utf16le'));
    const archive = tilesOf(bytes);
    expect(archive.tiles).toEqual(plain().archive.tiles);
    expect(archive.notes).toContain('t.csv: read as UTF-16');
  });

  it('Windows-1252 with a euro sign and curly quotes', () => {
    const csv = `${HEADINGS.join()},note\nA,3.2,0.42,0.2,0.8,6,gloss,`;
    const bytes = new Uint8Array([...bytesOf(csv), 0x93, 0x80, 0x20, 0x35, 0x94]);
    const archive = tilesOf(bytes);
    expect(archive.tiles[0]?.note).toBe('“€ 5”');
    expect(archive.notes).toContain('t.csv: read as Windows-1252');
  });

  it('trailing separators, blank lines, short rows, quoted line ends', () => {
    const csv =
      'tile,SiO2,Al2O3,CaO,cone,surface,note,,\n\nA,3.2,0.42,1,6,gloss,"two\nlines",,\n,,,,,,,,\n' +
      'B,3.2,0.42,1,6,gloss\nC,3.2,0.42,1,6\n';
    const archive = tilesOf(bytesOf(csv));
    expect(
      archive.tiles.map(({ tile, line, note, verdict }) => [tile, line, note, verdict]),
    ).toEqual([
      ['A', 3, 'two\nlines', 'gloss'],
      ['B', 6, undefined, 'gloss'],
      ['C', 7, undefined, 'unjudged'],
    ]);
  });

  it('one mark holds for the file: the rarer one is a fault', () => {
    const csv = 'tile;SiO2;Al2O3;CaO;cone;surface\nA;3,2;0,42;1;6;gloss\nB;3.2;0,42;1;6.5;gloss\n';
    expect(faultsOf({ 't.csv': csv })).toEqual([
      't.csv:3 SiO2: expected moles of SiO2: a number with a decimal comma, got "3.2"',
    ]);
  });

  it('names such as __proto__ are data, as column and as cell', () => {
    const csv = csvOf([
      [...HEADINGS, '__proto__', 'constructor', 'firing'],
      ['__proto__', ...GLAZE, '6', 'gloss', 'x', 'y', 'toString'],
      ['a\u0007b', ...GLAZE, '6', 'gloss', '', '', '__proto__'],
    ]);
    const archive = tilesOf(bytesOf(csv));
    expect(archive.tiles.map(({ tile, load }) => [tile, load])).toEqual([
      ['__proto__', 'toString'],
      ['a\u0007b', '__proto__'],
    ]);
    expect(Object.entries(archive.tiles[0]?.other ?? {})).toEqual([
      ['__proto__', 'x'],
      ['constructor', 'y'],
    ]);
    expect(archive.tiles[1]?.other).toBeUndefined();
    expect(Object.getPrototypeOf({})).not.toHaveProperty('x');
    expect(archive.notes).toContain(
      't.csv: columns "__proto__" and "constructor" not known, kept as written',
    );
  });
});

describe('what changes nothing', () => {
  const glazes = [
    ['A', 3.2, 0.42, 0.2, 0.8],
    ['B', 2.5, 0.3, 0.25, 0.75],
  ] as const;
  const csv = (scale: number, order: readonly number[]) => {
    const rows = glazes.map(([tile, ...moles]) => [
      tile,
      ...moles.map((m) => m * scale),
      6,
      'gloss',
    ]);
    return csvOf([HEADINGS, ...rows].map((row) => order.map((place) => row[place] ?? '')));
  };
  const inOrder = [0, 1, 2, 3, 4, 5, 6];
  const tiles = (text: string) => readTexts({ 't.csv': text }).archive.tiles;

  it('the order of the columns', () => {
    expect(tiles(csv(1, [6, 4, 3, 5, 2, 0, 1]))).toEqual(tiles(csv(1, inOrder)));
    expect(JSON.stringify(tiles(csv(1, [6, 4, 3, 5, 2, 0, 1])))).toBe(
      JSON.stringify(tiles(csv(1, inOrder))),
    );
  });

  it('the scale of the moles', () => {
    const scaled = tiles(csv(37.3, inOrder));
    for (const [i, tile] of tiles(csv(1, inOrder)).entries()) {
      for (const [oxide, amount] of Object.entries(tile.unity)) {
        // A few roundings of doubles.
        expect(scaled[i]?.unity).toHaveProperty(oxide);
        expect(Math.abs((scaled[i]?.unity as Record<string, number>)[oxide] - amount)).toBeLessThan(
          1e-14,
        );
      }
    }
  });

  it('a column of noughts or blanks beside the oxides', () => {
    const extra = 'tile,SiO2,Al2O3,CaO,MgO,ZnO,cone,surface\nA,3,0.4,1,0,,6,gloss\n';
    expect(tiles(extra)).toEqual(tiles('tile,SiO2,Al2O3,CaO,cone,surface\nA,3,0.4,1,6,gloss\n'));
  });
});

describe('faults of headings and files', () => {
  it('a fault of the headings refuses every row, and the rows are checked all the same', () => {
    const { archive, faults } = readTexts({
      't.csv': 'tile,SiO2,CaO,cone,surfce,CaO\nA,3,1,6,gloss,1\nB,x,1,six,gloss,1\nA,3,1,6,,1\n',
    });
    expect(faults.map(faultLine)).toEqual([
      't.csv:1 surfce: expected a known column, got "surfce"; nearest known: surface',
      't.csv:1 CaO: expected each column once, got it in columns 3 and 6',
      't.csv:1 Al2O3: expected this column beside the other oxides, found none',
      't.csv:2 tile: expected each tile once, got "A" in line 4 as well',
      't.csv:3 SiO2: expected moles of SiO2: a number, got "x"',
      't.csv:3 cone: expected a cone from 022 to 42 such as 6, 06 or 6.5, got "six"',
      't.csv:4 tile: expected each tile once, got "A" in line 2 as well',
    ]);
    expect(archive.counts).toEqual({ read: 3, fitted: 0, unjudged: 0, setAside: 0, refused: 3 });
  });

  it('says which columns are missing', () => {
    expect(faultsOf({ 't.csv': 'CaO,colour\n1,red\n' })).toEqual([
      't.csv:1 tile: expected this column, found none',
      't.csv:1 surface: expected this column, found none',
      't.csv:1 SiO2: expected this column beside the other oxides, found none',
      't.csv:1 Al2O3: expected this column beside the other oxides, found none',
      't.csv:1 cone: expected a column firing or cone, found neither',
    ]);
    expect(faultsOf({ 't.csv': 'tile,cone,surface\nA,6,gloss\n' })).toEqual([
      't.csv:1 recipe: expected a column recipe or oxides in moles, found neither',
    ]);
  });

  it('says so where tiles.csv is missing, empty or a workbook', () => {
    expect(faultsOf({})).toEqual(['tiles.csv: expected this file in the archive, found none']);
    expect(faultsOf({ 'tiles.csv': '' })).toEqual([
      'tiles.csv: expected a line of headings, got an empty file',
    ]);
    expect(faultsOf({ 'tiles.csv': 'PK\u0003\u0004' })).toEqual([
      'tiles.csv: expected a CSV file, got a workbook or another zipped file: save the sheet as CSV',
    ]);
  });

  it('headings without a tile are an archive of none', () => {
    const { archive, faults } = readTexts({ 't.csv': csvOf([HEADINGS]) });
    expect(faults).toEqual([]);
    expect(archive.counts).toEqual({ read: 0, fitted: 0, unjudged: 0, setAside: 0, refused: 0 });
  });

  it('a file name that is nearly known is a fault, another CSV a note', () => {
    const { archive, faults } = readTexts({
      'Tiles.csv': loneCsv(['A', '6', 'gloss']),
      'firing.csv': 'firing,cone\n',
      'costs.csv': 'a,b\n',
      'README.md': 'ours',
    });
    expect(faults.map(faultLine)).toEqual([
      'firing.csv: expected a known file name; nearest known: firings.csv',
    ]);
    expect(archive.notes).toContain('"costs.csv" is no file of an archive: not read');
    expect(
      faultsOf({ 'Tiles.csv': loneCsv(['A', '6', 'gloss']), 'tiles.csv': loneCsv() }),
    ).toContain('tiles.csv: expected one tiles.csv, found "Tiles.csv" as well');
  });

  it('a faulty heading of another file refuses the tiles that rely on it', () => {
    const { archive, faults } = readTexts({
      'tiles.csv': csvOf([
        [...HEADINGS, 'firing'],
        ['A', ...GLAZE, '', 'gloss', 'F1'],
        ['B', ...GLAZE, '6', 'gloss', ''],
      ]),
      'firings.csv': 'firing,cone,klin\nF1,6,North\n',
    });
    expect(faults.map(faultLine)).toEqual([
      'tiles.csv:2 firing: expected a readable firings.csv to look up the firing, got "F1"',
      'firings.csv:1 klin: expected a known column, got "klin"; nearest known: kiln',
    ]);
    expect(archive.counts).toMatchObject({ read: 2, fitted: 1, refused: 1 });
    expect(archive.firings).toEqual([]);
  });
});

describe('parseArchive', () => {
  const faulty = () => filesOf({ 't.csv': loneCsv(['A', '6', 'gloss'], ['B', 'six', 'gloss']) });

  it('throws every fault at once', () => {
    expect(() => parseArchive(faulty())).toThrow(ArchiveError);
    expect(() => parseArchive(faulty())).toThrow(
      '1 fault in the input\n  t.csv:3 cone: expected a cone from 022 to 42 such as 6, 06 or 6.5, got "six"',
    );
  });

  it('goes on without the faulty rows if told to, and counts them', () => {
    const archive = parseArchive(faulty(), { leaveOutFaulty: true });
    expect(archive.tiles.map(({ tile }) => tile)).toEqual(['A']);
    expect(archive.counts).toMatchObject({ read: 2, fitted: 1, refused: 1 });
  });

  it('does not go on where no tile is left', () => {
    const files = filesOf({ 't.csv': loneCsv(['B', 'six', 'gloss']) });
    expect(() => parseArchive(files, { leaveOutFaulty: true })).toThrow(ArchiveError);
  });

  it('the fingerprint changes with a byte and a name, not with the order of the files', () => {
    const tiles = loneCsv(['A', '6', 'gloss']);
    const print = (texts: Record<string, string>) => readTexts(texts).archive.fingerprint;
    const both = print({ 'tiles.csv': tiles, 'bodies.csv': 'body\nX\n' });
    expect(both).toMatch(/^sha256:[0-9a-f]{64}$/);
    expect(print({ 'bodies.csv': 'body\nX\n', 'tiles.csv': tiles })).toBe(both);
    expect(print({ 'tiles.csv': tiles, 'bodies.csv': 'body\nY\n' })).not.toBe(both);
    expect(print({ 'tiles.csv': tiles })).not.toBe(print({ 'others.csv': tiles }));
  });
});
