import { OXIDES, type Oxide } from '../chemistry/oxides.ts';
import { coneText } from '../firing/cone.ts';
import { median, quantile } from '../numeric/summary.ts';
import type { Archive, Tile, Verdict } from './archive.ts';
import { grouped } from './grouped.ts';
import { kilnAccounts, type KilnAccount } from './kiln-account.ts';
import { MEASURES, measureOf, type Measure } from './measures.ts';
import { byName, inNameOrder } from './name-order.ts';
import { oddities } from './oddities.ts';

/** How many tiles were taken for what. */
export type VerdictCounts = Readonly<Record<Verdict, number>> & { readonly all: number };

/** Tiles of one cone. */
export interface ConeTiles {
  /** The nearest whole cone; null for tiles whose heat is not known. */
  readonly cone: string | null;
  readonly coneIndex: number | null;
  readonly tiles: VerdictCounts;
}

/** Tiles of one load that has a name. */
export interface LoadTiles {
  readonly load: string;
  readonly tiles: VerdictCounts;
}

/** Where the tiles lie in one measure, mol per mol flux or a ratio. */
export interface MeasureRange {
  readonly measure: Measure;
  readonly lowest: number;
  readonly quantile05: number;
  readonly median: number;
  readonly quantile95: number;
  readonly highest: number;
}

/** An oxide that is not among the measures. */
export interface OxideUse {
  readonly oxide: Oxide;
  readonly tiles: number;
  /** mol per mol flux. */
  readonly highest: number;
}

/** How often a recipe was fired. */
export interface RecipeUse {
  readonly recipe: string;
  readonly tiles: number;
  readonly loads: number;
}

/** What an archive holds, counted. */
export interface Inventory {
  /** From cool to hot, tiles of unknown heat last. */
  readonly byCone: readonly ConeTiles[];
  /** By name. */
  readonly loads: readonly LoadTiles[];
  /** Tiles without a firing: each is a load of its own. */
  readonly tilesWithoutFiring: number;
  /** Empty where there is no tile. */
  readonly ranges: readonly MeasureRange[];
  readonly otherOxides: readonly OxideUse[];
  /** The most fired first; those fired equally often by name. */
  readonly recipes: readonly RecipeUse[];
  readonly kilns: readonly KilnAccount[];
  /** What looks odd, in sentences: worth a look, not wrong for certain. */
  readonly odd: readonly string[];
}

/**
 * An account of what an archive holds, and of what in it looks odd.
 *
 * @param archive - archive as read
 * @returns counts by cone and by load, composition, recipes, kilns, oddities
 * @example
 * const csv = 'tile,SiO2,Al2O3,CaO,cone,surface\nA,3,0.4,1,5,matte\nB,3,0.3,1,6,gloss\n';
 * const { archive } = readArchive(new Map([['a.csv', new TextEncoder().encode(csv)]]));
 * inventory(archive).byCone.map(({ cone, tiles }) => [cone, tiles.all]); // [['5', 1], ['6', 1]]
 */
export function inventory(archive: Archive): Inventory {
  const { tiles, recipes, firings, witness } = archive;
  const kilns = kilnAccounts(archive);
  const loads = loadTiles(tiles);
  return {
    byCone: tilesByCone(tiles),
    loads,
    tilesWithoutFiring: tiles.filter(({ firing }) => firing === undefined).length,
    ranges: tiles.length === 0 ? [] : MEASURES.map((measure) => measureRange(tiles, measure)),
    otherOxides: otherOxides(tiles),
    recipes: recipes
      .map(({ recipe }) => recipeUse(recipe, tiles))
      .sort((a, b) => b.tiles - a.tiles || byName(a.recipe, b.recipe)),
    kilns,
    odd: oddities({ tiles, recipes, kilns, loads, firings, witness }),
  };
}

function verdictCounts(tiles: readonly Tile[]): VerdictCounts {
  const count = (wanted: Verdict) => tiles.filter(({ verdict }) => verdict === wanted).length;
  return {
    underfired: count('underfired'),
    matte: count('matte'),
    gloss: count('gloss'),
    melted: count('melted'),
    overfired: count('overfired'),
    unjudged: count('unjudged'),
    all: tiles.length,
  };
}

function tilesByCone(tiles: readonly Tile[]): ConeTiles[] {
  const groups = grouped(tiles, ({ heat }) => (heat ? Math.round(heat.coneIndex) : null));
  return [...groups]
    .sort(([a], [b]) => (a ?? Infinity) - (b ?? Infinity))
    .map(([index, own]) => ({
      cone: index === null ? null : coneText(index),
      coneIndex: index,
      tiles: verdictCounts(own),
    }));
}

function loadTiles(tiles: readonly Tile[]): LoadTiles[] {
  const named = tiles.filter(({ firing }) => firing !== undefined);
  const loads = inNameOrder(
    grouped(named, ({ load }) => load),
    ([load]) => load,
  );
  return loads.map(([load, own]) => ({ load, tiles: verdictCounts(own) }));
}

function measureRange(tiles: readonly Tile[], measure: Measure): MeasureRange {
  const all = tiles.map(({ unity }) => measureOf(unity, measure)).filter(Number.isFinite);
  // A glaze without any alumina has no ratio; an archive of such glazes alone has none either.
  const values = all.length > 0 ? all : [0];
  return {
    measure,
    lowest: quantile(values, 0),
    quantile05: quantile(values, 0.05),
    median: median(values),
    quantile95: quantile(values, 0.95),
    highest: quantile(values, 1),
  };
}

const MEASURED_APART: readonly Oxide[] = ['SiO2', 'Al2O3', 'B2O3'];

function otherOxides(tiles: readonly Tile[]): OxideUse[] {
  return OXIDES.filter((oxide) => !MEASURED_APART.includes(oxide)).flatMap((oxide) => {
    const held = tiles.map(({ unity }) => unity[oxide] ?? 0).filter((amount) => amount > 0);
    if (held.length === 0) return [];
    return [{ oxide, tiles: held.length, highest: quantile(held, 1) }];
  });
}

function recipeUse(recipe: string, tiles: readonly Tile[]): RecipeUse {
  const own = tiles.filter((tile) => tile.recipe === recipe);
  return { recipe, tiles: own.length, loads: new Set(own.map(({ load }) => load)).size };
}
