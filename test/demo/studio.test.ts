import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readArchive } from '../../src/archive/read-archive.ts';
import { alkaliShare } from '../../src/chemistry/unity.ts';
import { coneIndex } from '../../src/firing/cone.ts';
import { theilSen } from '../../src/numeric/trend.ts';
import { drawStudio, drawStudioWithTruth } from '../../datasets/demo-studio/truth.ts';

const FOLDER = new URL('../../datasets/demo-studio/', import.meta.url);
const committed = (name: string) => readFileSync(new URL(name, FOLDER), 'utf8');

/** Rows of a file of the demo by column; none of its cells needs quotes. */
function rowsOf(text: string): Record<string, string>[] {
  const [header, ...lines] = text.trimEnd().split('\n');
  const names = header.split(',');
  return lines.map((line) =>
    Object.fromEntries(line.split(',').map((cell, i) => [names[i], cell])),
  );
}

const encoder = new TextEncoder();
const bytesOf = (files: ReadonlyMap<string, string>) =>
  new Map([...files].map(([name, text]) => [name, encoder.encode(text)]));

const studio = drawStudioWithTruth(1);
const { archive, faults } = readArchive(bytesOf(studio.files));
const tileRows = rowsOf(studio.files.get('tiles.csv')!);
const firingRows = rowsOf(studio.files.get('firings.csv')!);
const share = <T>(items: readonly T[], has: (item: T) => boolean) =>
  items.filter(has).length / items.length;

describe('the committed demo archive', () => {
  it('is what seed 1 draws, byte for byte', () => {
    expect([...studio.files.keys()].sort()).toEqual([
      'bodies.csv',
      'firings.csv',
      'materials.csv',
      'recipes.csv',
      'tiles.csv',
      'witness.csv',
    ]);
    for (const [name, text] of studio.files) expect(committed(name)).toBe(text);
    for (const [name, text] of studio.truthFiles) expect(committed(`truth/${name}`)).toBe(text);
  });

  it('is the same in every drawing, and another for another seed', () => {
    expect([...drawStudio(1)]).toEqual([...studio.files]);
    const other = drawStudio(2);
    expect(other.get('tiles.csv')).not.toBe(studio.files.get('tiles.csv'));
    expect(other.get('firings.csv')).not.toBe(studio.files.get('firings.csv'));
    expect(other.get('recipes.csv')).toBe(studio.files.get('recipes.csv'));
    expect(other.get('materials.csv')).toBe(studio.files.get('materials.csv'));
  });

  it('needs no quotes and says beside it that it is invented', () => {
    for (const text of studio.files.values()) expect(text).not.toContain('"');
    const readme = committed('README.md');
    expect(readme).toContain('Everything in this folder is invented');
    const { tiles, recipes, firings } = archive;
    const counts = `${tiles.length} tiles of ${recipes.length} recipes in ${firings.length} loads`;
    expect(readme).toContain(counts);
    expect(readme).toContain(`${studio.truth.wrongLabels.length} verdicts are wrong`);
  });

  it('is read without a fault', () => {
    expect(faults).toEqual([]);
    expect(archive.counts.refused).toBe(0);
  });
});

describe('the size of the demo archive', () => {
  it('holds at least 240 tiles in at least 14 loads of two kilns, mostly at cone 6', () => {
    expect(archive.counts.fitted).toBeGreaterThanOrEqual(240);
    expect(firingRows.length).toBeGreaterThanOrEqual(14);
    expect(new Set(firingRows.map((f) => f.kiln)).size).toBe(2);
    const setCone = new Map(firingRows.map((f) => [f.firing, f.set_cone]));
    const fired = tileRows.filter((t) => t.firing !== '');
    expect(share(fired, (t) => setCone.get(t.firing) === '6')).toBeGreaterThan(0.5);
    for (const cone of ['5', '7']) {
      expect(firingRows.filter((f) => f.set_cone === cone).length).toBeGreaterThanOrEqual(3);
      expect(fired.filter((t) => setCone.get(t.firing) === cone).length).toBeGreaterThanOrEqual(45);
    }
  });

  it('holds grids, lines and single glazes, some of them in several loads', () => {
    const blends = new Set(tileRows.map((t) => t.blend));
    expect([...blends].filter((b) => b.endsWith('grid')).length).toBe(4);
    expect([...blends].filter((b) => b.endsWith('line')).length).toBe(6);
    const loadsOf = (recipe: string) =>
      new Set(tileRows.filter((t) => t.recipe === recipe && t.firing !== '').map((t) => t.firing));
    for (const recipe of ['Gullwater', 'Slate Hen', 'Bellringer', 'Ferryman', 'Drystone']) {
      expect(loadsOf(recipe).size).toBe(4);
    }
  });

  it('covers the region that studios work in', () => {
    const unities = archive.tiles.map((t) => t.unity);
    const range = (of: (u: (typeof unities)[number]) => number) => {
      const values = unities.map(of).sort((a, b) => a - b);
      return [values[0], values.at(-1)!];
    };
    const inside = ([low, high]: number[], from: number, to: number) => low <= from && high >= to;
    expect(
      inside(
        range((u) => u.SiO2 ?? 0),
        2.05,
        5,
      ),
    ).toBe(true);
    expect(
      inside(
        range((u) => u.Al2O3 ?? 0),
        0.25,
        0.8,
      ),
    ).toBe(true);
    expect(
      inside(
        range((u) => u.B2O3 ?? 0),
        0,
        0.39,
      ),
    ).toBe(true);
    expect(inside(range(alkaliShare), 0.16, 0.42)).toBe(true);
  });

  it('can be weighed: tenths of a part, and a hundred of them but for colourants', () => {
    const lines = rowsOf(studio.files.get('recipes.csv')!);
    const hundred = new Map<string, number>();
    for (const { recipe, parts, over_100: over100 } of lines) {
      expect(parts).toMatch(/^\d+(\.\d)?$/);
      if (over100 !== 'yes') hundred.set(recipe, (hundred.get(recipe) ?? 0) + Number(parts));
    }
    for (const sum of hundred.values()) expect(sum).toBeCloseTo(100, 9);
    expect(lines.some((line) => line.over_100 === 'yes')).toBe(true);
  });
});

describe('the flaws of the demo archive', () => {
  it('has underfired and matte tiles about a quarter to a third each, the rest gloss', () => {
    const judged = archive.tiles.filter((t) =>
      ['underfired', 'matte', 'gloss'].includes(t.verdict),
    );
    for (const verdict of ['underfired', 'matte']) {
      const part = share(judged, (t) => t.verdict === verdict);
      expect(part).toBeGreaterThan(0.25);
      expect(part).toBeLessThan(0.35);
    }
  });

  it('has tiles not judged, overfired, semi-matte, half judged, and drips that overrule', () => {
    expect(archive.counts.unjudged).toBe(8);
    expect(archive.counts.setAside).toBe(4);
    const written = (word: string) => tileRows.filter((t) => t.surface === word).length;
    expect(written('melted')).toBe(4);
    expect(written('semi-matte')).toBeGreaterThan(10);
    const overruled = tileRows.filter((t) => t.drip === 'unmelted' && t.surface !== 'underfired');
    expect(overruled.length).toBeGreaterThan(10);
  });

  it('has about 2 % wrong verdicts, half of them between matte and underfired', () => {
    const wrong = studio.truth.wrongLabels;
    expect(wrong.length / archive.counts.fitted).toBeGreaterThan(0.015);
    expect(wrong.length / archive.counts.fitted).toBeLessThan(0.025);
    const confused = wrong.filter((w) => {
      return [w.trueSurface, w.written].sort().join() === 'matte,underfired';
    });
    expect(Math.abs(confused.length - wrong.length / 2)).toBeLessThanOrEqual(0.5);
  });

  it('has no other wrong verdict', () => {
    const truth = new Map(studio.truth.tiles.map((t) => [t.tile, t.surface]));
    const wrong = archive.tiles.filter((t) => {
      const isSaid = ['underfired', 'matte', 'gloss'].includes(t.verdict);
      return isSaid && t.verdict !== truth.get(t.tile);
    });
    expect(wrong.map((t) => t.tile)).toEqual(studio.truth.wrongLabels.map((w) => w.tile));
  });

  it('has one load that fired 0.6 cone cool with nothing on paper to show it', () => {
    const cool = studio.truth.loadErrors.filter((load) => load.errorCones <= -0.5);
    expect(cool).toEqual([{ firing: 'H07', errorCones: -0.6 }]);
    const onPaper = firingRows.find((f) => f.firing === 'H07')!;
    expect(onPaper.cone).toBe(onPaper.set_cone);
    expect(tileRows.filter((t) => t.firing === 'H07').length).toBeGreaterThanOrEqual(15);
  });

  it('has tiles whose heat is what the reader takes it for, plus the error of their load', () => {
    const truth = new Map(studio.truth.tiles.map((t) => [t.tile, t.coneIndex]));
    const error = new Map(studio.truth.loadErrors.map((l) => [l.firing, l.errorCones]));
    for (const { tile, heat, firing } of archive.tiles.filter((t) => t.firing !== undefined)) {
      expect(truth.get(tile)).toBeCloseTo(heat!.coneIndex + error.get(firing!)!, 9);
    }
  });

  it('has one kiln that drifts cooler from firing to firing, and one that does not', () => {
    const missed = (kiln: string) => {
      const own = firingRows.filter((f) => f.kiln === kiln);
      const readings = rowsOf(studio.files.get('witness.csv')!).flatMap(({ firing, cone }) => {
        const place = own.findIndex((f) => f.firing === firing);
        return place < 0
          ? []
          : [[place, coneIndex(cone) - coneIndex(own[place].set_cone)] as const];
      });
      return theilSen(
        readings.map(([place]) => place),
        readings.map(([, off]) => off),
      ).slope;
    };
    expect(missed('Dabchick')).toBeLessThan(-0.04);
    expect(Math.abs(missed('Heron'))).toBeLessThan(0.03);
  });
});

describe('redrawn studios', () => {
  const redrawn = Array.from({ length: 20 }, (_, i) => drawStudioWithTruth(i + 2));

  it('have load errors of 0.18 cone and the cool load again', () => {
    const errors = redrawn.flatMap(({ truth }) => truth.loadErrors);
    // D04 and H10 have no witness cone, H07 is the cool one.
    const plain = errors.filter(({ firing }) => !['D04', 'H10', 'H07'].includes(firing));
    const sd = Math.sqrt(
      plain.reduce((sum, { errorCones }) => sum + errorCones ** 2, 0) / plain.length,
    );
    // 300 draws: the standard error of the sd is 0.18 / sqrt(600), 0.007.
    expect(plain.length).toBe(300);
    expect(Math.abs(sd - 0.18)).toBeLessThan(0.022);
    expect(errors.filter(({ firing }) => firing === 'H07').map((l) => l.errorCones)).toEqual(
      redrawn.map(() => -0.6),
    );
  });

  it('are read without a fault and hold every surface at every set cone', () => {
    for (const { files } of redrawn.slice(0, 5)) {
      const reading = readArchive(bytesOf(files));
      expect(reading.faults).toEqual([]);
      const setCone = new Map(reading.archive.firings.map((f) => [f.firing, f.setCone]));
      for (const cone of ['5', '6', '7']) {
        const verdicts = reading.archive.tiles
          .filter((t) => setCone.get(t.firing ?? '') === cone)
          .map((t) => t.verdict);
        expect(verdicts).toEqual(expect.arrayContaining(['underfired', 'matte', 'gloss']));
      }
    }
  });
});
