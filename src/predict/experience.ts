import { OXIDES, type Oxide } from '../chemistry/oxides.ts';
import type { Unity } from '../chemistry/unity.ts';
import type { Tile } from '../archive/archive.ts';
import type { NearTile, Support } from './answers.ts';

/**
 * One step of each oxide, mol per mol flux: a change that a potter would fire a new tile for. Every
 * oxide counts, also those the model has no column for. Common practice, no source: colourants and
 * opacifiers act in small amounts, silica in large ones.
 */
const STEP: Readonly<Record<Oxide, number>> = {
  SiO2: 0.5,
  Al2O3: 0.08,
  B2O3: 0.08,
  Li2O: 0.05,
  Na2O: 0.08,
  K2O: 0.08,
  MgO: 0.08,
  CaO: 0.12,
  SrO: 0.08,
  BaO: 0.08,
  ZnO: 0.05,
  PbO: 0.05,
  MnO: 0.05,
  Fe2O3: 0.04,
  TiO2: 0.04,
  ZrO2: 0.04,
  P2O5: 0.03,
  SnO2: 0.03,
  CoO: 0.02,
  NiO: 0.02,
  CuO: 0.03,
  Cr2O3: 0.01,
  V2O5: 0.02,
  CeO2: 0.03,
};
/** Half a cone is a step: a tile one cone off then counts as at the edge, never as inside. */
const CONES_PER_STEP = 0.5;

/** So many tiles must stand within the radius: one could be mistaken, two could be one mistake. */
export const TILES_NEEDED = 3;
/** Radius of `inside` and of `edge`, in steps. */
export const INSIDE_STEPS = 1.5;
export const EDGE_STEPS = 3;
/** How many nearest tiles are named. */
const NAMED_TILES = 5;

/** The tiles that a point is compared with. */
export interface Experience {
  readonly tiles: readonly Tile[];
  /** The oxides that any tile holds, as places in the list of all. */
  readonly held: readonly number[];
  /** Those oxides in steps, [tiles][held]. */
  readonly steps: Float64Array;
  /** Cone of each tile, as a number. */
  readonly cones: Float64Array;
}

/**
 * The experience of an archive: its tiles, ready to be compared with points.
 *
 * @param tiles - tiles with a known heat
 * @returns the tiles and their compositions in steps
 */
export function experienceOf(tiles: readonly Tile[]): Experience {
  // By name: equally near tiles then stand in one order for any order of rows.
  const known = tiles
    .filter(({ heat }) => heat !== undefined)
    .sort((a, b) => (a.tile < b.tile ? -1 : 1));
  const rows = known.map(({ unity }) => stepsOf(unity));
  const held = OXIDES.flatMap((_, j) => (rows.some((row) => row[j] !== 0) ? [j] : []));
  return {
    tiles: known,
    held,
    steps: Float64Array.from(rows.flatMap((row) => held.map((j) => row[j]!))),
    cones: Float64Array.from(known, ({ heat }) => heat!.coneIndex),
  };
}

/**
 * Distance of every tile from a composition, heat left aside.
 *
 * @param experience - tiles
 * @param unity - unity formula
 * @returns sum of squares of steps, per tile
 */
export function squaredSteps({ tiles, held, steps }: Experience, unity: Unity): Float64Array {
  const all = stepsOf(unity);
  const point = Float64Array.from(held, (j) => all[j]!);
  // What no tile holds is equally far from all of them.
  const apart = all.reduce((sum, step, j) => (held.includes(j) ? sum : sum + step * step), 0);
  const squares = new Float64Array(tiles.length).fill(apart);
  const width = held.length;
  for (let i = 0, at = 0; i < squares.length; i++) {
    for (let j = 0; j < width; j++, at++) {
      const off = steps[at]! - point[j]!;
      squares[i]! += off * off;
    }
  }
  return squares;
}

/** How far inside the experience a point is. */
export interface Surroundings {
  readonly support: Support;
  /** Tiles within the radius of the edge. */
  readonly tilesWithinEdge: number;
  readonly nearest: readonly NearTile[];
}

/**
 * Whether a point at a cone lies inside the experience, and the tiles nearest to it.
 *
 * `inside`: at least 3 tiles within 1.5 steps; `edge`: at least 3 within 3 steps; else `outside`.
 * A step is a change of one oxide that would be fired anew, or half a cone; steps of different
 * oxides add as the sides of a right angle.
 *
 * @param experience - tiles
 * @param squares - from `squaredSteps` for the point
 * @param coneIndex - heat work asked about
 * @returns support, count and the nearest tiles
 */
export function surroundings(
  { tiles, cones }: Experience,
  squares: Float64Array,
  coneIndex: number,
): Surroundings {
  const distance = distances(cones, squares, coneIndex);
  const within = (radius: number) => {
    let count = 0;
    for (let i = 0; i < distance.length; i++) if (distance[i]! <= radius) count++;
    return count;
  };
  const tilesWithinEdge = within(EDGE_STEPS);
  const support =
    within(INSIDE_STEPS) >= TILES_NEEDED
      ? 'inside'
      : tilesWithinEdge >= TILES_NEEDED
        ? 'edge'
        : 'outside';
  const nearest = smallest(distance, NAMED_TILES).map((i) => nearTile(tiles[i]!, distance[i]!));
  return { support, tilesWithinEdge, nearest };
}

/**
 * All tiles within a radius of a point at a cone, nearest first.
 *
 * @param experience - tiles
 * @param squares - from `squaredSteps` for the point
 * @param coneIndex - heat work asked about
 * @param radius - steps
 * @returns the tiles with their distances
 */
export function tilesWithin(
  { tiles, cones }: Experience,
  squares: Float64Array,
  coneIndex: number,
  radius: number,
): NearTile[] {
  const distance = distances(cones, squares, coneIndex);
  return tiles
    .map((tile, i) => nearTile(tile, distance[i]!))
    .filter((_, i) => distance[i]! <= radius)
    .sort((a, b) => a.distance - b.distance);
}

function distances(cones: Float64Array, squares: Float64Array, coneIndex: number): Float64Array {
  const distance = new Float64Array(squares.length);
  for (let i = 0; i < distance.length; i++) {
    const heat = (cones[i]! - coneIndex) / CONES_PER_STEP;
    distance[i] = Math.sqrt(squares[i]! + heat * heat);
  }
  return distance;
}

function nearTile({ tile, verdict, heat }: Tile, distance: number): NearTile {
  const rounded = Math.round(distance * 1000) / 1000;
  return { tile, surface: verdict, cone: heat!.cone, distance: rounded };
}

/** Places of the smallest values, smallest first; equal ones by name of the tile. */
function smallest(values: Float64Array, count: number): number[] {
  const found: number[] = [];
  let most = Infinity;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (found.length === count && value >= most) continue;
    const at = found.findIndex((other) => values[other]! > value);
    found.splice(at < 0 ? found.length : at, 0, i);
    if (found.length > count) found.pop();
    most = values[found.at(-1)!]!;
  }
  return found;
}

function stepsOf(unity: Unity): number[] {
  return OXIDES.map((oxide) => (unity[oxide] ?? 0) / STEP[oxide]);
}
