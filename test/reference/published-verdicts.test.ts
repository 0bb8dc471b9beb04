// Real published verdicts as an archive: H. Seger 1886 (test cones and standard cones) and C. Lauth &
// G. Dutailly 1888, as printed in Dingler's Polytechnisches Journal 261 and 272 (status: verified; see
// datasets/published/README.md). `full` and `nearly` count as melted, the rest as underfired; rows
// with SiO2 up to 11. The cone of the test cones is an estimate (9, to be read as 8 to 10).
import { describe, expect, it } from 'vitest';
import { parseArchive } from '../../src/archive/read-archive.ts';
import { coneText } from '../../src/firing/cone.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { fitStages, fittedStages, isJudged, type JudgedTile } from '../../src/model/stages.ts';
import { averagedProbability } from '../../src/numeric/logistic-normal.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { quantile } from '../../src/numeric/summary.ts';
import { publishedTable } from './chemistry-tables.ts';
import { csvOf, filesOf } from '../support/builders.ts';

const OXIDE_COLUMNS = [
  ...['SiO2', 'Al2O3', 'B2O3', 'Li2O', 'Na2O', 'K2O', 'MgO', 'CaO', 'SrO', 'BaO', 'ZnO', 'PbO'],
] as const;

interface Scored {
  readonly source: string;
  readonly isMelted: boolean;
  readonly probability: number;
}

const rows = publishedTable('published-glazes.csv').filter(
  ({ id = '', SiO2 }) => /^(seger|lauth)/.test(id) && Number(SiO2) <= 11,
);

/** One burn is one load: all test cones, all of Lauth's; each standard cone stands alone. */
function publishedTiles(): JudgedTile[] {
  const head = ['tile', 'blend', 'firing', 'cone', 'surface', ...OXIDE_COLUMNS];
  const body = rows.map((row) => [
    row['id'],
    row['series'],
    row['series'] === 'segercone' ? '' : row['id'].split('-')[0],
    coneText(Number(row['cone_order'])),
    ['full', 'nearly'].includes(row['melt']) ? 'melted' : 'underfired',
    ...OXIDE_COLUMNS.map((oxide) => row[oxide] || '0'),
  ]);
  const archive = parseArchive(filesOf({ 'tiles.csv': csvOf([head, ...body]) }));
  return archive.tiles.filter(isJudged);
}

/** P(melted) of every tile from a fit that saw no tile of its series. */
function leftOutBySeries(tiles: readonly JudgedTile[]): Scored[] {
  const series = [...new Set(tiles.map(({ blend }) => blend))];
  return series.flatMap((left) => {
    const fit = fitStages(tiles.filter(({ blend }) => blend !== left));
    const { melt } = fittedStages(fit, new Set());
    return tiles
      .filter(({ blend }) => blend === left)
      .map(({ tile, unity, heat, verdict }) => {
        const { mean, sd } = stageLogOdds(melt, unity, heat.coneIndex);
        return {
          source: tile.split('-')[0],
          isMelted: verdict === 'melted',
          probability: averagedProbability(mean, sd),
        };
      });
  });
}

/** Share of pairs (melted, not melted) that are ranked rightly; ties count half. */
function areaUnderRoc(scored: readonly Scored[]): number {
  const melted = scored.filter(({ isMelted }) => isMelted);
  const others = scored.filter(({ isMelted }) => !isMelted);
  const won = melted.flatMap((a) =>
    others.map((b) =>
      a.probability === b.probability ? 0.5 : Number(a.probability > b.probability),
    ),
  );
  return won.reduce((sum, share) => sum + share, 0) / won.length;
}

/** 90 % interval by redrawing the melted and the others with replacement. */
function bootstrapInterval(scored: readonly Scored[], seed: number): [number, number] {
  const { uniform } = seededGenerator(seed);
  const redrawn = (from: readonly Scored[]) =>
    from.map(() => from[Math.floor(uniform() * from.length)]);
  const areas = Array.from({ length: 2000 }, () =>
    areaUnderRoc(
      [true, false].flatMap((side) => redrawn(scored.filter((s) => s.isMelted === side))),
    ),
  );
  return [quantile(areas, 0.05), quantile(areas, 0.95)];
}

describe('published verdicts, whole series left out', () => {
  const tiles = publishedTiles();
  const scored = leftOutBySeries(tiles);
  const of = (source: string) => scored.filter((s) => s.source === source);

  it('reads 63 of the rows: 24 test cones, 7 standard cones, 32 porcelain glazes', () => {
    const counts = ['seger39', 'segercone', 'lauth'].map((source) => of(source).length);
    expect(counts).toEqual([24, 7, 32]);
  });

  it.each([
    { source: 'seger39', what: 'test cones of Seger 1886', now: 0.763, interval: [0.58, 0.93] },
    {
      source: 'lauth',
      what: 'porcelain glazes of Lauth & Dutailly 1888',
      now: 0.839,
      interval: [0.72, 0.94],
    },
  ])('ranks the $what with an area of at least 0.75: $now', ({ source, now, interval }) => {
    const area = areaUnderRoc(of(source));
    const [low, high] = bootstrapInterval(of(source), 1);
    expect(area).toBeGreaterThanOrEqual(0.75);
    expect(Number(area.toFixed(3))).toBe(now);
    expect([low, high].map((end) => Number(end.toFixed(2)))).toEqual(interval);
  });
});
