import { recipeUnity } from '../../src/chemistry/recipe.ts';
import type { Moles, Unity } from '../../src/chemistry/unity.ts';
import { molesPer100g } from './materials.ts';

/** One material of a recipe; `over100` for colourants weighed on top of the hundred. */
export interface BatchLine {
  readonly material: string;
  readonly parts: number;
  readonly over100: boolean;
}

/** The composition a potter aims at, mol per mol flux; lime is what the other fluxes leave. */
export interface Aim {
  readonly silica: number;
  readonly alumina: number;
  readonly boric: number;
  readonly alkali: number;
  readonly magnesia?: number;
  readonly zinc?: number;
  readonly strontia?: number;
}

/** What is matched, in the order of `Aim`, and how close a miss counts as one, mol. */
const MATCHED = [
  { of: (m: Moles) => m.SiO2 ?? 0, miss: 0.05 },
  { of: (m: Moles) => m.Al2O3 ?? 0, miss: 0.01 },
  { of: (m: Moles) => m.B2O3 ?? 0, miss: 0.01 },
  { of: (m: Moles) => (m.K2O ?? 0) + (m.Na2O ?? 0) + (m.Li2O ?? 0), miss: 0.01 },
  { of: (m: Moles) => m.MgO ?? 0, miss: 0.01 },
  { of: (m: Moles) => m.ZnO ?? 0, miss: 0.01 },
  { of: (m: Moles) => m.SrO ?? 0, miss: 0.01 },
  { of: (m: Moles) => m.CaO ?? 0, miss: 0.01 },
] as const;

const SWEEPS = 4000;
/**
 * Kaolin and quartz do what alumina hydrate would; hydrate is for glazes that have no room for the
 * silica of so much kaolin, and those need no quartz.
 */
const DISPENSABLE = ['alumina hydrate', 'quartz'] as const;
const GOOD_MISFIT = 1;
/** A recipe line of less than this many tenths of a part is not worth weighing. */
const SMALLEST_TENTHS = 3;

function wanted(aim: Aim): readonly number[] {
  const { silica, alumina, boric, alkali, magnesia = 0, zinc = 0, strontia = 0 } = aim;
  const lime = 1 - alkali - magnesia - zinc - strontia;
  return [silica, alumina, boric, alkali, magnesia, zinc, strontia, lime];
}

interface Match {
  /** Amount of each material, mol per mol flux in units of 100 g. */
  readonly amounts: readonly number[];
  /** Sum of squares, in units of a miss. */
  readonly misfit: number;
}

/**
 * The batch that comes nearest to an aim: least squares without negative amounts, one material
 * after the other until nothing moves.
 */
function nearest(aim: Aim, palette: readonly string[]): Match {
  const columns = palette.map((name) =>
    MATCHED.map((row) => row.of(molesPer100g(name)) / row.miss),
  );
  const rest = wanted(aim).map((value, row) => value / MATCHED[row].miss);
  const amounts = palette.map(() => 0);
  for (let sweep = 0; sweep < SWEEPS; sweep += 1) {
    columns.forEach((column, place) => {
      const length = column.reduce((sum, x) => sum + x * x, 0);
      const along = column.reduce((sum, x, row) => sum + x * rest[row], 0) / length;
      const step = Math.max(along, -amounts[place]);
      amounts[place] += step;
      column.forEach((x, row) => (rest[row] -= step * x));
    });
  }
  return { amounts, misfit: rest.reduce((sum, x) => sum + x * x, 0) };
}

/**
 * A recipe for an aim, as a potter would write it: parts in tenths that make a hundred.
 *
 * @param aim - composition wanted
 * @param palette - materials to use, by name
 * @param additions - colourants and the like on top of the hundred, material and parts
 * @returns the lines of the recipe, in the order of the palette; the aim is met as nearly as the
 *   palette allows
 */
export function batchFor(
  aim: Aim,
  palette: readonly string[],
  additions: Readonly<Record<string, number>> = {},
): readonly BatchLine[] {
  const plain = DISPENSABLE.map((spared) => palette.filter((material) => material !== spared));
  const matches = [...plain, palette].map((names) => ({ names, ...nearest(aim, names) }));
  const { names, amounts } = matches.find(({ misfit }) => misfit < GOOD_MISFIT) ?? matches.at(-1)!;
  return [...hundred(names, amounts), ...onTop(additions)];
}

/** Colourants and opacifiers as recipe lines. */
export function onTop(additions: Readonly<Record<string, number>>): readonly BatchLine[] {
  return Object.entries(additions).map(([material, parts]) => ({ material, parts, over100: true }));
}

/** Amounts at any scale as parts in tenths that make a hundred; the largest takes up the rest. */
function hundred(palette: readonly string[], held: readonly number[]): readonly BatchLine[] {
  const total = held.reduce((sum, x) => sum + x, 0);
  const rough = held.map((x) => Math.round((1000 * x) / total));
  const tenths = rough.map((x) => (x < SMALLEST_TENTHS ? 0 : x));
  const largest = tenths.indexOf(Math.max(...tenths));
  tenths[largest] += 1000 - tenths.reduce((sum, x) => sum + x, 0);
  return palette
    .map((material, place) => ({ material, parts: tenths[place] / 10, over100: false }))
    .filter(({ parts }) => parts > 0);
}

/**
 * The composition of a batch as weighed.
 *
 * @param lines - recipe lines; parts at any scale
 * @returns unity formula
 */
export function unityOf(lines: readonly BatchLine[]): Unity {
  return recipeUnity(
    lines.map(({ material, parts }) => ({ parts, molesPer100g: molesPer100g(material) })),
  );
}
