import { blockLogOdds, type LatentProblem, type Unknowns } from './latent.ts';

/** A verdict, and by how many sds its log-odds move. */
export interface ModeShift {
  readonly sds: number;
  /** Block and row of the problem. */
  readonly stage: number;
  readonly row: number;
}

/**
 * The verdict whose log-odds move farthest from the mode to the centre.
 *
 * @param problem - the questions
 * @param mode - where the density is greatest
 * @param centre - middle of the Gaussian nearest to it
 * @param sds - per block, sd of each row's log-odds
 * @returns the move and the verdict
 */
export function largestShift(
  { blocks }: LatentProblem,
  mode: Unknowns,
  centre: Unknowns,
  sds: readonly Float64Array[],
): ModeShift {
  let first = 0;
  let most: ModeShift = { sds: 0, stage: 0, row: 0 };
  blocks.forEach((block, b) => {
    const [before, after] = [mode, centre].map((at) => blockLogOdds(block, first, at));
    for (let i = 0; i < block.count - (block.assumed ?? 0); i++) {
      const moved = Math.abs(after![i]! - before![i]!) / sds[b]![i]!;
      if (moved > most.sds) most = { sds: moved, stage: b, row: i };
    }
    first += block.size;
  });
  return most;
}
