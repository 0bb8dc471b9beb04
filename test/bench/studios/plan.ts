import type { Generator } from '../../../src/numeric/random.ts';
import { around, between, chanceOf, happens, oneOf } from './chance.ts';

/** One load as planned: what it is set to and how it is read. */
export interface PlannedLoad {
  readonly firing: string;
  /** On paper: what the tiles' `cone` column says. */
  readonly coneIndex: number;
  readonly tiles: number;
}

/** How a studio works, drawn once for each. */
export interface StudioHabits {
  readonly loads: readonly PlannedLoad[];
  /** Shares of tiles in grids and in lines; the rest are loose recipes. */
  readonly gridShare: number;
  readonly lineShare: number;
  /** Of wrong verdicts. */
  readonly wrongShare: number;
  /** Cones by which a load's heat differs from its paper. */
  readonly loadErrorSdCones: number;
  /** Log-odds by which a load's cooling moves gloss. */
  readonly coolingSd: number;
  /** Relative error of each oxide as weighed. */
  readonly weighingSd: number;
}

const MOST_LOADS = 40;

/**
 * How a studio works: its loads, its blends, its errors.
 *
 * Mostly cone 6; a quarter of the studios never set cone 5, a quarter never cone 7.
 *
 * @param seed - which studio
 * @param size - judged tiles
 * @param wrongShare - of wrong verdicts, where it is not to be drawn from 0 to 5 %
 * @returns habits; the loads hold `size` tiles
 */
export function studioHabits(seed: number, size: number, wrongShare?: number): StudioHabits {
  const chance = chanceOf(seed, 'plan', size);
  const drawnShare = between(chance, 0, 0.05);
  const gridShare = between(chance, 0.25, 0.65);
  return {
    gridShare,
    lineShare: between(chance, 0.1, 0.3),
    wrongShare: wrongShare ?? drawnShare,
    loadErrorSdCones: between(chance, 0.1, 0.25),
    coolingSd: between(chance, 0, 0.5),
    weighingSd: between(chance, 0.01, 0.02),
    loads: plannedLoads(chance, size),
  };
}

function plannedLoads(chance: Generator, size: number): PlannedLoad[] {
  const wanted = Math.round(Math.sqrt(size) * between(chance, 0.2, 0.9));
  const count = Math.min(MOST_LOADS, Math.max(1, wanted));
  const tilesOf = sharedOut(chance, size, count);
  const setCone = setCones(chance);
  const witness = witnessReading(chance);
  return tilesOf.map((tiles, i) => ({
    firing: `L${String(i + 1).padStart(2, '0')}`,
    coneIndex: witness(i === 0 ? 6 : setCone()),
    tiles,
  }));
}

/** A studio's way of choosing the cone of a load. */
function setCones(chance: Generator): () => number {
  const atFive = happens(chance, 0.25) ? 0 : between(chance, 0.1, 0.3);
  const atSeven = happens(chance, 0.25) ? 0 : between(chance, 0.1, 0.3);
  return () => {
    const ticket = chance.uniform();
    if (ticket < atFive) return 5;
    return ticket < atFive + atSeven ? 7 : 6;
  };
}

/** Witness cones read to a quarter or a half, or none: then the paper says what was set. */
function witnessReading(chance: Generator): (setCone: number) => number {
  const witnessed = oneOf(chance, [0, 0.5, 1]);
  const parts = oneOf(chance, [2, 4]);
  return (setCone) => {
    const isRead = happens(chance, witnessed);
    const reached = around(chance, setCone, 0.2);
    return isRead ? Math.round(reached * parts) / parts : setCone;
  };
}

/** Tiles of each load: uneven, at least 1 each, in sum `size`. */
function sharedOut(chance: Generator, size: number, count: number): number[] {
  const weights = Array.from({ length: count }, () => between(chance, 0.4, 1.6));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  let before = 0;
  let given = 0;
  return weights.map((weight, i) => {
    before += weight;
    const upTo = i === count - 1 ? size : Math.round((size * before) / total);
    const own = upTo - given;
    given = upTo;
    return own;
  });
}
