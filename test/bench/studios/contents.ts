import type { Generator } from '../../../src/numeric/random.ts';
import { chanceOf, happens, oneOf } from './chance.ts';
import type { StudioHabits } from './plan.ts';
import { drawGrid, drawLine, drawLoose, type RecipeSet } from './recipes.ts';
import type { Glaze } from './truths/truth.ts';

/** One tile of a load before it is mixed. */
export interface PlannedTile {
  readonly recipe: Glaze;
  readonly blend?: string;
  /** Tiles with the same mixing come out of one bucket and share its weighing error. */
  readonly mixing: string;
}

const LEAST_GRID = 9;
const LEAST_LINE = 3;

/**
 * What goes into each load: new grids and lines, known ones fired again, loose recipes.
 *
 * @param habits - how the studio works
 * @param seed - which studio
 * @param size - judged tiles
 * @returns planned tiles, load by load
 */
export function loadContents(habits: StudioHabits, seed: number, size: number): PlannedTile[][] {
  const chance = chanceOf(seed, 'recipes', size);
  const known: RecipeSet[] = [];
  return habits.loads.map(({ firing, tiles }) => {
    const planned: PlannedTile[] = [];
    const here = new Set<RecipeSet>();
    while (planned.length < tiles) {
      const room = tiles - planned.length;
      const set = nextSet(chance, habits, known, room, here);
      here.add(set);
      const tilesOfSet = set.recipes.map((recipe, i) => ({
        recipe,
        ...(set.blend === undefined ? {} : { blend: set.blend }),
        mixing: set.blend === undefined ? `${firing}-${planned.length + i}` : `${set.blend}-${i}`,
      }));
      planned.push(...refired(chance, tilesOfSet, room));
    }
    return planned;
  });
}

/** What a set is by its size. */
function kindOf({ recipes }: RecipeSet): 'grid' | 'line' | 'loose' {
  if (recipes.length === 1) return 'loose';
  return recipes.length >= LEAST_GRID ? 'grid' : 'line';
}

/** A known set that is not in this load yet, or a new one, which becomes known. */
function nextSet(
  chance: Generator,
  { gridShare, lineShare }: StudioHabits,
  known: RecipeSet[],
  room: number,
  here: ReadonlySet<RecipeSet>,
): RecipeSet {
  const ticket = chance.uniform();
  // A grid has some 20 tiles and a line 6, so that these make about the shares wanted.
  const gridsTo = gridShare / 8;
  const kind = ticket < gridsTo ? 'grid' : ticket < gridsTo + lineShare / 4 ? 'line' : 'loose';
  const isAgain = known.length > 0 && happens(chance, 0.35);
  if (isAgain) {
    const again = known.filter((set) => !here.has(set) && kindOf(set) === kind);
    if (again.length > 0) return oneOf(chance, again);
  }
  const name = `B${known.length + 1}`;
  const set =
    kind === 'grid' && room >= LEAST_GRID
      ? drawGrid(chance, name, room)
      : kind !== 'loose' && room >= LEAST_LINE
        ? drawLine(chance, name, room)
        : drawLoose(chance);
  known.push(set);
  return set;
}

/** All tiles of a set, or every second where there is no room for all. */
function refired<T>(chance: Generator, tiles: readonly T[], room: number): readonly T[] {
  if (tiles.length <= room) return tiles;
  const parity = happens(chance, 0.5) ? 0 : 1;
  return tiles.filter((_, i) => i % 2 === parity).slice(0, room);
}
