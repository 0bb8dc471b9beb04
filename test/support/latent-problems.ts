import { Matrix } from 'ml-matrix';
import {
  rowLogOdds,
  weightCount,
  type Block,
  type LatentProblem,
  type Unknowns,
} from '../../src/model/latent.ts';
import { expectedLikelihood } from '../../src/model/label-noise.ts';
import { seededGenerator } from '../../src/numeric/random.ts';

/** Two questions of unlike size that share four loads, as the fit poses them, with invented numbers. */
export function twoBlockProblem(flipped: number, seed = 5): LatentProblem {
  const { normal, uniform } = seededGenerator(seed);
  const block = (count: number, size: number, second: number): Block => ({
    count,
    size,
    rows: Float64Array.from({ length: count * size }, () => 0.8 * normal()),
    offset: Float64Array.from({ length: count }, () => normal()),
    // A share of yes now and then.
    outcome: Float64Array.from({ length: count }, (_, i) =>
      i % 9 === 0 ? 0.4 : Number(uniform() < 0.6),
    ),
    weight: Float64Array.from({ length: count }, (_, i) => (i % 7 === 0 ? 2.5 : 1)),
    load: Int32Array.from({ length: count }, (_, i) => (i * i) % 4),
    effects: Float64Array.from({ length: 2 * count }, (_, k) =>
      k % 2 === 0 ? 0.6 + 0.3 * normal() : second,
    ),
    flipped,
  });
  return { blocks: [block(37, 5, 0), block(23, 3, 0.7)], loadCount: 4 };
}

/** The spread of each row's log-odds, invented: from 0.2 to 2. */
export function inventedSds({ blocks }: LatentProblem): Float64Array[] {
  return blocks.map(({ count }) =>
    Float64Array.from({ length: count }, (_, i) => 0.2 + (1.8 * ((7 * i) % count)) / count),
  );
}

/** All unknowns in one vector: weights, then loads. */
export function unknownsOf(
  problem: LatentProblem,
  vector: readonly number[],
  sds?: readonly Float64Array[],
): Unknowns {
  const size = weightCount(problem);
  return {
    theta: Float64Array.from(vector.slice(0, size)),
    loads: Float64Array.from(vector.slice(size)),
    ...(sds && { sds }),
  };
}

export interface DenseRow {
  /** What each unknown adds to the row's log-odds: weights, then loads. */
  readonly effects: readonly number[];
  readonly slope: number;
  /** Minus the second derivative; may be below 0. */
  readonly curvature: number;
}

/** Every row of all blocks against all unknowns, written out: no Schur complement, no lower triangle. */
export function denseRows(problem: LatentProblem, unknowns: Unknowns): DenseRow[] {
  const size = weightCount(problem);
  let first = 0;
  return problem.blocks.flatMap((block, b) => {
    const base = first;
    first += block.size;
    return Array.from({ length: block.count }, (_, i): DenseRow => {
      const effects = Array.from({ length: size + 2 * problem.loadCount }, () => 0);
      for (let j = 0; j < block.size; j++) {
        effects[base + j] = block.rows[i * block.size + j] * (block.scale?.[j] ?? 1);
      }
      effects[size + 2 * block.load[i]] = block.effects[2 * i];
      effects[size + 2 * block.load[i] + 1] = block.effects[2 * i + 1];
      const into = { value: 0, slope: 0, curvature: 0 };
      const logOdds = rowLogOdds(block, base, unknowns, i);
      const sd = unknowns.sds?.[b][i] ?? 0;
      expectedLikelihood(logOdds, sd, block.outcome[i], block.flipped, into);
      const weight = block.weight[i];
      return { effects, slope: weight * into.slope, curvature: weight * into.curvature };
    });
  });
}

/** Identity plus the rows' weighted cross products: the precision of all unknowns together. */
export function densePrecision(
  rows: readonly DenseRow[],
  curvatureOf: (row: DenseRow) => number = ({ curvature }) => Math.max(0, curvature),
): Matrix {
  const design = new Matrix(rows.map(({ effects }) => [...effects]));
  const weights = Matrix.diag(rows.map(curvatureOf));
  return Matrix.eye(design.columns).add(design.transpose().mmul(weights).mmul(design));
}
