import { OXIDE_STEP } from '../chemistry/oxide-steps.ts';
import { OXIDES } from '../chemistry/oxides.ts';
import type { Unity } from '../chemistry/unity.ts';
import type { Tile } from '../archive/archive.ts';
import type { NearTile, Support } from './answers.ts';
import { tileTree, type TileTree } from './tile-tree.ts';
import { heatsInRadius, nearestTiles, tilesInRadius, type TreePlace } from './tree-search.ts';

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
  /** The same tiles, ready to be searched. */
  readonly tree: TileTree;
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
  const steps = Float64Array.from(rows.flatMap((row) => held.map((j) => row[j]!)));
  const cones = Float64Array.from(known, ({ heat }) => heat!.coneIndex);
  const inSteps = known.flatMap(({ heat }, i) => [
    ...held.map((j) => rows[i]![j]!),
    heat!.coneIndex / CONES_PER_STEP,
  ]);
  const tree = tileTree(Float64Array.from(inSteps), held.length + 1);
  return { tiles: known, held, steps, cones, tree };
}

/** A composition as an experience sees it. */
export interface PlaceInSteps {
  /** Of the oxides that tiles hold, in steps. */
  readonly steps: readonly number[];
  /** Sum of squares of the other oxides: equally far from all tiles. */
  readonly apart: number;
}

/**
 * A composition in the steps of an experience.
 *
 * @param experience - tiles
 * @param unity - unity formula
 * @returns its steps
 */
export function placeInSteps({ held }: Experience, unity: Unity): PlaceInSteps {
  const steps: number[] = [];
  let apart = 0;
  for (let j = 0; j < OXIDES.length; j++) {
    const oxide = OXIDES[j]!;
    const step = (unity[oxide] ?? 0) / OXIDE_STEP[oxide];
    if (held[steps.length] === j) steps.push(step);
    else apart += step * step;
  }
  return { steps, apart };
}

const placeAt = ({ steps, apart }: PlaceInSteps, coneIndex: number): TreePlace => ({
  steps: [...steps, coneIndex / CONES_PER_STEP],
  apart,
});

/**
 * Distance of every tile from a composition, heat left aside.
 *
 * @param experience - tiles
 * @param unity - unity formula
 * @returns sum of squares of steps, per tile
 */
export function squaredSteps(experience: Experience, unity: Unity): Float64Array {
  const { tiles, steps } = experience;
  const place = placeInSteps(experience, unity);
  const squares = new Float64Array(tiles.length).fill(place.apart);
  const width = place.steps.length;
  for (let i = 0, at = 0; i < squares.length; i++) {
    for (let j = 0; j < width; j++, at++) {
      const off = steps[at]! - place.steps[j]!;
      squares[i]! += off * off;
    }
  }
  return squares;
}

/** How far inside the experience a point is. */
export interface Surroundings {
  readonly support: Support;
  /** Counts the tiles within the radius of the edge; most answers do not ask. */
  readonly tilesWithinEdge: () => number;
  /** One of the nearest was fired at this very heat, within the radius of the edge. */
  readonly hasSuchHere: boolean;
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
 * @param place - from `placeInSteps`
 * @param coneIndex - heat work asked about
 * @returns support, count and the nearest tiles
 */
export function surroundings(
  { tiles, tree }: Experience,
  place: PlaceInSteps,
  coneIndex: number,
): Surroundings {
  const there = placeAt(place, coneIndex);
  const here = there.steps.at(-1);
  const found = nearestTiles(tree, there, NAMED_TILES);
  const support = supportBy(found[TILES_NEEDED - 1]?.distance);
  const nearest = found.map(({ tile, distance }) => nearTile(tiles[tile]!, distance));
  return {
    support,
    nearest,
    tilesWithinEdge: () => tilesInRadius(tree, there, EDGE_STEPS),
    hasSuchHere: found.some(({ distance, heat }) => heat === here && distance < EDGE_STEPS),
  };
}

/** From the distance of the last of the tiles needed. */
function supportBy(distance = Infinity): Support {
  if (distance <= INSIDE_STEPS) return 'inside';
  return distance <= EDGE_STEPS ? 'edge' : 'outside';
}

/** Cones at which tiles were judged. */
export interface JudgedCones {
  readonly coolest: number;
  readonly hottest: number;
  /** Whether these are the cones of such glazes; else of all tiles, since none is such. */
  readonly ofSuch: boolean;
}

/**
 * Cones at which glazes like this one were judged: within the radius of the edge, heat left aside.
 *
 * @param experience - tiles
 * @param place - from `placeInSteps`
 * @returns the range of cones; undefined where there is no tile at all
 */
export function judgedCones(
  { tiles, tree }: Experience,
  place: PlaceInSteps,
): JudgedCones | undefined {
  if (tiles.length === 0) return undefined;
  const near = heatsInRadius(tree, placeAt(place, 0), EDGE_STEPS);
  const [coolest, hottest] = near ?? [tree.low.at(-1)!, tree.high.at(-1)!];
  return {
    coolest: coolest * CONES_PER_STEP,
    hottest: hottest * CONES_PER_STEP,
    ofSuch: near !== undefined,
  };
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

function stepsOf(unity: Unity): number[] {
  return OXIDES.map((oxide) => (unity[oxide] ?? 0) / OXIDE_STEP[oxide]);
}
