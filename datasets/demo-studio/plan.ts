import { chosen, type Chance } from './chance.ts';
import { RECIPES, type StudioRecipe } from './recipes.ts';

/** What the studio meant to fire, and where it put witness cones. */
export interface PlannedLoad {
  readonly firing: string;
  /** ISO date. */
  readonly date: string;
  readonly kiln: 'Heron' | 'Dabchick';
  readonly setCone: 5 | 6 | 7;
  /** Witness cones: on three shelves, one beside the tiles, or none. */
  readonly witness: 'shelves' | 'one' | 'none';
  /** Blends fired whole, or every second tile of them: `even` or `odd` places. */
  readonly blends: readonly (readonly [blend: string, which: 'all' | 'even' | 'odd'])[];
  /** Its heat misses the paper by this much and no chance, in cones. */
  readonly errorCones?: number;
}

/** The load that fired cool though its paper says otherwise. */
export const COOL_FIRING = 'H07';
const COOL_ERROR_CONES = -0.6;

/** Ten loads of one kiln and eight of the other, in the order in which they were fired. */
export const LOADS: readonly PlannedLoad[] = [
  load('H01', '2023-02-11', 6, 'one', [['chalk grid', 'all']]),
  load('D01', '2023-03-04', 6, 'shelves', [['dolomite grid', 'all']]),
  load('H02', '2023-04-01', 6, 'one', [
    ['boron line', 'all'],
    ['silica line', 'all'],
  ]),
  load('D02', '2023-05-20', 6, 'shelves', [['frit grid', 'all']]),
  load('H03', '2023-06-17', 5, 'shelves', [['chalk grid', 'even']]),
  load('D03', '2023-07-15', 5, 'shelves', [['dolomite grid', 'all']]),
  load('H04', '2023-09-09', 6, 'one', [
    ['alumina line', 'all'],
    ['magnesia line', 'all'],
  ]),
  load('D04', '2023-10-07', 6, 'none', [
    ['alkali line', 'all'],
    ['zinc line', 'all'],
  ]),
  load('H05', '2023-11-04', 7, 'shelves', [['stony grid', 'all']]),
  load('D05', '2023-12-02', 6, 'shelves', [['stony grid', 'even']]),
  load('H06', '2024-01-27', 5, 'one', [
    ['frit grid', 'odd'],
    ['silica line', 'all'],
  ]),
  load(COOL_FIRING, '2024-02-24', 6, 'one', [['chalk grid', 'odd']], COOL_ERROR_CONES),
  load('D06', '2024-03-23', 7, 'shelves', [
    ['boron line', 'all'],
    ['alumina line', 'all'],
  ]),
  load('H08', '2024-04-20', 7, 'one', [['chalk grid', 'even']]),
  load('D07', '2024-05-18', 6, 'shelves', [['magnesia line', 'all']]),
  load('H09', '2024-06-15', 5, 'shelves', [
    ['alkali line', 'all'],
    ['boron line', 'even'],
  ]),
  load('H10', '2024-09-14', 6, 'none', [['stony grid', 'odd']]),
  load('D08', '2024-10-12', 6, 'shelves', [['zinc line', 'all']]),
];

/** Glazes in daily use: a tile of each goes in with many a load. */
const STANDING = ['Gullwater', 'Slate Hen', 'Bellringer', 'Ferryman', 'Drystone'];
const STANDING_LOADS = 4;
const SECOND_TILE_SHARE = 0.85;

/** Recipes in the order in which a load holds them: first its blends, then single glazes. */
export type LoadContents = ReadonlyMap<string, readonly StudioRecipe[]>;

/**
 * Which recipes go into which load: the blends as planned, the single glazes by chance.
 *
 * @param chance - decides where the single glazes go
 * @returns recipes by firing
 */
export function contents(chance: Chance): LoadContents {
  const singles = singlePlaces(chance);
  return new Map(
    LOADS.map(({ firing, blends }) => {
      const own = singles.filter(({ firings }) => firings.includes(firing));
      const blended = blends.flatMap(([blend, which]) => ofBlend(blend, which));
      return [firing, [...blended, ...own.map(({ recipe }) => recipe)]];
    }),
  );
}

function ofBlend(blend: string, which: 'all' | 'even' | 'odd'): readonly StudioRecipe[] {
  const whole = RECIPES.filter((recipe) => recipe.blend === blend);
  return whole.filter((_, place) => which === 'all' || (place % 2 === 0) === (which === 'even'));
}

/** A first tile at cone 6, where the studio works; then, for most, another in any load. */
function singlePlaces(chance: Chance) {
  const all = LOADS.map(({ firing }) => firing);
  // The first loads were full of grids.
  const roomy = all.slice(2);
  const atSix = LOADS.filter((planned) => planned.setCone === 6).map(({ firing }) => firing);
  return RECIPES.filter(({ blend }) => blend === undefined).map((recipe) => {
    const first = chosen(atSix.slice(2), 1, chance);
    const others = roomy.filter((firing) => !first.includes(firing));
    const isStanding = STANDING.includes(recipe.recipe);
    const more = isStanding ? STANDING_LOADS - 1 : chance.uniform() < SECOND_TILE_SHARE ? 1 : 0;
    return { recipe, firings: [...first, ...chosen(others, more, chance)] };
  });
}

function load(
  firing: string,
  date: string,
  setCone: PlannedLoad['setCone'],
  witness: PlannedLoad['witness'],
  blends: PlannedLoad['blends'],
  errorCones?: number,
): PlannedLoad {
  const kiln = firing.startsWith('H') ? 'Heron' : 'Dabchick';
  const planned = { firing, date, kiln, setCone, witness, blends } as const;
  return errorCones === undefined ? planned : { ...planned, errorCones };
}
