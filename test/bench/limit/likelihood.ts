import type { Archive } from '../../../src/archive/archive.ts';
import type { Family, Glaze, Truth } from '../studios/truths/truth.ts';
import { glazeOf } from '../studios/truths/truth.ts';
import { scriptedChance } from './scripted-chance.ts';

/** An archive as numbers. */
export interface Tiles {
  readonly glazes: readonly Glaze[];
  readonly cones: Float64Array;
  /** 0 underfired, 1 matte, 2 gloss. */
  readonly written: Int8Array;
  readonly load: Int32Array;
  /** Tiles of each load. */
  readonly ofLoad: readonly (readonly number[])[];
  /** Share of each written surface. */
  readonly shares: readonly number[];
}

const WORDS = ['underfired', 'matte', 'gloss'];

/** Judged tiles of an invented studio. */
export function tilesOf({ tiles }: Archive): Tiles {
  const loads = [...new Set(tiles.map(({ load }) => load))];
  const number = new Map(loads.map((load, l) => [load, l]));
  const written = Int8Array.from(tiles, ({ verdict }) => WORDS.indexOf(verdict));
  return {
    glazes: tiles.map(({ unity }) => glazeOf(unity)),
    cones: Float64Array.from(tiles, ({ heat }) => heat!.coneIndex),
    written,
    load: Int32Array.from(tiles, ({ load }) => number.get(load)!),
    ofLoad: loads.map((load) => tiles.flatMap((tile, i) => (tile.load === load ? [i] : []))),
    shares: WORDS.map((_, s) => written.filter((w) => w === s).length / written.length),
  };
}

/** All that is not known of a studio, in standard scores. */
export interface Unknowns {
  /** Of the family's parameters. */
  readonly truth: Float64Array;
  /** Of the habits: spread of the loads' heat, of their cooling, share of wrong verdicts. */
  readonly habits: Float64Array;
  /** [loads][2]: heat and cooling of each load. */
  readonly loads: Float64Array;
}

/** The same as numbers that act. */
export interface Acting {
  readonly truth: Truth;
  readonly heatSd: number;
  readonly coolingSd: number;
  /** [true surface][written surface] */
  readonly wrong: readonly (readonly number[])[];
}

/** Ranges of the habits, as `studios/plan.ts` draws them. */
const HABITS = [
  [0.1, 0.25],
  [0, 0.5],
  [0, 0.05],
] as const;

/** What scores stand for. */
export function acting(family: Family, { truth, habits }: Unknowns, tiles: Tiles): Acting {
  const chance = scriptedChance(habits);
  const [heatSd, coolingSd, wrongShare] = HABITS.map(
    ([low, high]) => low + (high - low) * chance.uniform(),
  ) as [number, number, number];
  return {
    truth: family(scriptedChance(truth)),
    heatSd,
    coolingSd,
    wrong: wrongWords(wrongShare, tiles.shares),
  };
}

/** Confusions as `studios/verdicts.ts` writes them: half between matte and underfired, a fourth each way. */
const CONFUSIONS: readonly (readonly [truly: number, word: number, share: number])[] = [
  [1, 0, 0.25],
  [0, 1, 0.25],
  [2, 1, 0.125],
  [1, 2, 0.125],
  [2, 0, 0.125],
  [0, 2, 0.125],
];

function wrongWords(wrongShare: number, shares: readonly number[]): number[][] {
  const rates = [0, 1, 2].map((truly) => [0, 1, 2].map((word) => (truly === word ? 1 : 0)));
  for (const [truly, word, share] of CONFUSIONS) {
    const rate = Math.min(0.4, (wrongShare * share) / Math.max(shares[truly], 0.02));
    rates[truly][word] += rate;
    rates[truly][truly] -= rate;
  }
  return rates;
}

/** Log likelihood of the tiles of one load. */
export function loadLikelihood(
  { truth, heatSd, coolingSd, wrong }: Acting,
  loads: Float64Array,
  tiles: Tiles,
  l: number,
): number {
  const off = heatSd * loads[2 * l];
  const cooling = coolingSd * loads[2 * l + 1];
  let sum = 0;
  for (const i of tiles.ofLoad[l]) {
    const glaze = tiles.glazes[i];
    const melted = truth.melted(glaze, tiles.cones[i] + off);
    const glossy = truth.glossy(glaze, tiles.cones[i] + off, cooling);
    const word = tiles.written[i];
    const seen =
      (1 - melted) * wrong[0][word] +
      melted * (1 - glossy) * wrong[1][word] +
      melted * glossy * wrong[2][word];
    sum += Math.log(Math.max(seen, 1e-300));
  }
  return sum;
}
