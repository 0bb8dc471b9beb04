import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readArchive } from '../../src/archive/read-archive.ts';
import { faultLine } from '../../src/errors.ts';

const folder = new URL('../support/faulty-archive/', import.meta.url);
const files = new Map(
  readdirSync(folder).map((file) => [file, new Uint8Array(readFileSync(new URL(file, folder)))]),
);

// The archive is invented (its README says so); every line was checked by eye against its files.
const EXPECTED = `
tiles.csv:3 SiO2: expected moles of SiO2, got a blank cell
tiles.csv:3 tile: expected each tile once, got "A2" in line 17 as well
tiles.csv:4 Al2O3: expected moles of Al2O3, got a blank cell
tiles.csv:5 B2O3: expected moles of B2O3, 0 if there is none, got a blank cell
tiles.csv:6: expected a flux, found none (oxides given: SiO2, Al2O3, B2O3)
tiles.csv:7 Al2O3: expected moles of Al2O3: a number with a decimal point, got "0,42"
tiles.csv:8 SiO2: expected moles of SiO2: a number without a thousands mark, got "3,200.5"
tiles.csv:9 SiO2: expected moles of SiO2 from 0 to 1000000, got "-3.2"
tiles.csv:10 Al2O3: expected moles of Al2O3: a number, got "x"
tiles.csv:11 recipe: expected a recipe of recipes.csv, got "Clera"; nearest known: "Clear"
tiles.csv:12 recipe: expected a recipe or oxides in moles, got both
tiles.csv:13 recipe: expected a recipe or oxides in moles, got neither
tiles.csv:14 recipe: expected a recipe without faults, got "Satin"; see recipes.csv:7
tiles.csv:15 firing: expected a firing of firings.csv, got "F11"; nearest known: "F1" or "F10"
tiles.csv:16 firing: expected a firing without faults, got "F2"; see firings.csv:3
tiles.csv:17 tile: expected each tile once, got "A2" in line 3 as well
tiles.csv:18 cone: expected a cone from 022 to 42 such as 6, 06 or 6.5, got "six"
tiles.csv:19 surface: expected gloss, matte, semi-matte, underfired, melted, overfired or a blank cell, got "glosy"; nearest known: gloss
tiles.csv:20 cone: expected a cone or a firing, got neither
tiles.csv:21 drip: expected melted, unmelted or a blank cell, got "unmolten"; nearest known: unmelted
tiles.csv:22 crazing: expected none, wide, fine or a blank cell, got "coarse"; nearest known: none
tiles.csv:23 shivering: expected yes, no or a blank cell, got "maybe"
tiles.csv:24 thickness_mm: expected a thickness in mm from 0 to 20 (a coat of glaze), got "80"
tiles.csv:25 gloss_units: expected gloss units at 60 degrees from 0 to 300 (ISO 2813), got "900"
tiles.csv:26 firing: expected a firing without faults, got "F3"; see firings.csv:4
tiles.csv:27 shelf: expected a witness cone without faults for shelf "top"; see witness.csv:2
tiles.csv:28 column 18: expected a heading above this cell, got "a cell too many"
tiles.csv:29 tile: expected a tile name, got a blank cell
tiles.csv:30 SiO2: expected silica in a glaze, found none
tiles.csv:31 note: expected quotes only around a whole cell, got ""never closed"
tiles.csv:32 cone: expected a cone that fits peak_c 998, got "6" (about 1222 °C); 06 (about 998 °C) fits better: spreadsheets turn 06 into 6
tiles.csv:33 recipe: expected a recipe without faults, got "Wash"; see recipes.csv:12
firings.csv:3 cone: expected a cone reached or a set_cone, got neither
firings.csv:4 cone: expected a cone that fits peak_c 998, got "6" (about 1222 °C); 06 (about 998 °C) fits better: spreadsheets turn 06 into 6
firings.csv:6 date: expected a date such as 2024-03-31, got "2023-02-29"
firings.csv:7 peak_c: expected a peak in °C from 600 to 1400 (where glazes are fired), got "1500"
firings.csv:8 hold_min: expected a hold in minutes from 0 to 2880 (up to two days), got "-5"
firings.csv:9 cooling_c_per_h: expected a cooling rate in °C per hour above 0, at most 2000 (a kiln cools, and no faster than that), got "0"
firings.csv:10 atmosphere: expected oxidation, reduction or a blank cell, got "oxidising"; nearest known: oxidation
firings.csv:11 log: expected the name of a file in the archive, without a folder, got "../f10.csv"
firings.csv:11 firing: expected each firing once, got "F10" in line 12 as well
firings.csv:12 firing: expected each firing once, got "F10" in line 11 as well
witness.csv:2 cone: expected a cone from 022 to 42 such as 6, 06 or 6.5, got "43"
witness.csv:3 shelf: expected each shelf once, got "bottom" in line 4 as well
witness.csv:4 shelf: expected each shelf once, got "bottom" in line 3 as well
witness.csv:5 firing: expected a firing of firings.csv, got "F12"; nearest known: "F1", "F2" or "F10"
witness.csv:6 cone: expected a cone that fits peak_c 998, got "6" (about 1222 °C); 06 (about 998 °C) fits better: spreadsheets turn 06 into 6
witness.csv:7 shelf: expected a shelf, got a blank cell
recipes.csv:7 material: expected a material of materials.csv, got "Talq"; nearest known: "Talc"
recipes.csv:8 parts: expected parts: a number, got "ten"
recipes.csv:9 parts: expected parts above 0, at most 1000000, got "0"
recipes.csv:10 over_100: expected yes, no or a blank cell, got "perhaps"
recipes.csv:11 material: expected each material of "Pale" once, got "Boron frit" in line 13 as well: an exact repeat
recipes.csv:11 material: expected a material without faults, got "Boron frit"; see materials.csv:7
recipes.csv:12 recipe: "Wash": expected a flux, found none (oxides given: SiO2)
recipes.csv:13 material: expected each material of "Pale" once, got "Boron frit" in line 11 as well: an exact repeat
recipes.csv:13 material: expected a material without faults, got "Boron frit"; see materials.csv:7
materials.csv:7: expected oxides and loi that sum to 97 to 103, found 90 (oxides 90, loi 0)
materials.csv:8 basis: expected raw or fired, found a blank: the oxides sum to 100 beside a loi of 9, as if of the fired material
materials.csv:9 basis: expected raw, fired or a blank cell, got "dry"; nearest known: raw
materials.csv:10 formula: expected a known element, found "Xx" at character 3 of "CaXxO3"
bodies.csv:3 expansion_per_k: expected an expansion per kelvin from 1e-7 to 0.00003 (6.5e-6 is usual: give it per K, not in millionths), got "6.5"
bodies.csv:3 body: expected each body once, got "Porcelain" in line 4 as well
bodies.csv:4 body: expected each body once, got "Porcelain" in line 3 as well
`;

describe('an archive full of faults', () => {
  const { archive, faults } = readArchive(files);

  it('is told every one of them at once, each at its line and column', () => {
    expect(faults.map(faultLine)).toEqual(EXPECTED.trim().split('\n'));
  });

  it('counts what became of every tile', () => {
    expect(archive.counts).toEqual({ read: 33, fitted: 1, unjudged: 1, setAside: 0, refused: 31 });
    expect(archive.tiles.map(({ tile }) => tile)).toEqual(['A1', 'A33']);
  });

  it('holds only what is sound', () => {
    expect(archive.firings.map(({ firing }) => firing)).toEqual(['F1', 'F4']);
    expect(archive.recipes.map(({ recipe }) => recipe)).toEqual(['Clear']);
    expect(archive.witness.map(({ line }) => line)).toEqual([8]);
    expect(archive.bodies.map(({ body }) => body)).toEqual(['Stoneware']);
  });
});

describe('whatever is done to an archive', () => {
  const texts = [...files].filter(([file]) => file.endsWith('.csv'));
  const junk = fc.constantFrom(
    '"',
    ',',
    ';',
    '\n',
    '\t',
    '',
    '0',
    'é',
    '\u0000',
    'F1',
    '__proto__',
  );
  const change = fc.record({
    at: fc.double({ min: 0, max: 1, noNaN: true }),
    removed: fc.nat(6),
    junk,
  });
  const mutated = fc.array(fc.array(change, { maxLength: 4 }), {
    minLength: texts.length,
    maxLength: texts.length,
  });
  const kept = fc.subarray(texts.map((_, index) => index));

  it('read = fitted + unjudged + set aside + refused, and no refused row goes without a fault', () => {
    fc.assert(
      fc.property(mutated, kept, (changes, keptFiles) => {
        const damaged = keptFiles.map((index): [string, Uint8Array] => {
          const [file, bytes] = texts[index];
          const text = changes[index].reduce((whole, { at, removed, junk: put }) => {
            const place = Math.floor(at * whole.length);
            return whole.slice(0, place) + put + whole.slice(place + removed);
          }, Buffer.from(bytes).toString('utf8'));
          return [file, new TextEncoder().encode(text)];
        });
        const { archive, faults } = readArchive(new Map(damaged));
        const { read, fitted, unjudged, setAside, refused } = archive.counts;
        expect(read).toBe(fitted + unjudged + setAside + refused);
        expect(archive.tiles).toHaveLength(read - refused);
        expect(archive.files[0]?.rows ?? 0).toBeGreaterThanOrEqual(0);
        const names = new Set(archive.tiles.map(({ tile }) => tile));
        expect(names.size).toBe(archive.tiles.length);
        const [file] = archive.files.map((found) => found.file);
        const faultyRows = new Set(faults.filter((f) => f.file === file).map(({ line }) => line));
        const sound = archive.tiles.filter(({ line }) => faultyRows.has(line));
        expect(sound).toEqual([]);
        if (refused > 0) expect(faultyRows.size).toBeGreaterThan(0);
        for (const { heat, verdict } of archive.tiles) {
          if (verdict !== 'unjudged') expect(heat?.coneIndex).toBeTypeOf('number');
        }
      }),
      { seed: 1, numRuns: 300 },
    );
  });
});
