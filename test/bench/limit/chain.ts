import { choleskyFactor, lowerIndex } from '../../../src/numeric/linalg.ts';
import type { Generator } from '../../../src/numeric/random.ts';
import type { Family } from '../studios/truths/truth.ts';
import { acting, loadLikelihood, type Acting, type Tiles, type Unknowns } from './likelihood.ts';

/** How long a chain walks. */
export interface ChainLength {
  /** Sweeps that learn the steps, not counted. */
  readonly learning: number;
  readonly sweeps: number;
  /** Every so many sweeps one is kept. */
  readonly every: number;
}

/** Joint proposals a sweep. */
const JOINT_MOVES = 3;
/** Share of accepted joint moves that serves best (G. O. Roberts and others, Ann. Appl. Probab. 7 (1997) 110-120). */
const BEST_JOINT = 0.234;
const BEST_SINGLE = 0.44;

/**
 * A Markov chain over all that is not known of a studio of a known family. Random-walk Metropolis: the
 * family's parameters and the habits one by one while it learns, then jointly with the covariance that it learnt;
 * each load's heat and cooling by themselves.
 *
 * Where it begins at the true parameters it begins with a draw from the posterior: studios are drawn as the prior says.
 *
 * @param family - known
 * @param tiles - the archive
 * @param start - scores to begin with
 * @param chance - of the walk
 * @param length - how long
 * @param keep - is given what is kept
 * @returns shares of accepted moves: joint, loads
 *
 * Source: H. Haario, E. Saksman and J. Tamminen, Bernoulli 7 (2001) 223-242.
 */
export function walk(
  family: Family,
  tiles: Tiles,
  start: Unknowns,
  chance: Generator,
  { learning, sweeps, every }: ChainLength,
  keep: (acting: Acting) => void,
): { readonly joint: number; readonly loads: number } {
  const own = new Float64Array([...start.truth, ...start.habits]);
  const size = own.length;
  const loads = Float64Array.from(start.loads);
  const split = (scores: Float64Array): Unknowns => ({
    truth: scores.subarray(0, start.truth.length),
    habits: scores.subarray(start.truth.length),
    loads,
  });
  let now = acting(family, split(own), tiles);
  let likelihoods = tiles.ofLoad.map((_, l) => loadLikelihood(now, loads, tiles, l));
  const steps = new Float64Array(size).fill(0.3);
  const loadStep = new Float64Array(tiles.ofLoad.length).fill(0.7);
  const history = new Covariance(size);
  let factor: Float64Array | undefined;
  let jointScale = 2.4 / Math.sqrt(size);
  const accepted = { joint: 0, jointTried: 0, loads: 0, loadsTried: 0 };

  const tryScores = (proposed: Float64Array): boolean => {
    const next = acting(family, split(proposed), tiles);
    const nextLikelihoods = tiles.ofLoad.map((_, l) => loadLikelihood(next, loads, tiles, l));
    const gain =
      total(nextLikelihoods) - total(likelihoods) - 0.5 * (squares(proposed) - squares(own));
    if (!(Math.log(chance.uniform()) < gain)) return false;
    own.set(proposed);
    now = next;
    likelihoods = nextLikelihoods;
    return true;
  };

  for (let sweep = 0; sweep < learning + sweeps; sweep++) {
    const isLearning = sweep < learning;
    const rate = 1 / Math.sqrt(1 + sweep / 20);
    if (isLearning && sweep < 0.6 * learning) {
      for (let j = 0; j < size; j++) {
        const proposed = Float64Array.from(own);
        proposed[j] += steps[j] * chance.normal();
        const taken = tryScores(proposed);
        steps[j] *= Math.exp(rate * ((taken ? 1 : 0) - BEST_SINGLE));
      }
    } else {
      factor ??= history.factor();
      for (let move = 0; move < JOINT_MOVES; move++) {
        const taken = tryScores(jointly(own, factor, jointScale, chance));
        if (isLearning) jointScale *= Math.exp(rate * ((taken ? 1 : 0) - BEST_JOINT));
        else {
          accepted.jointTried++;
          if (taken) accepted.joint++;
        }
      }
      if (isLearning && sweep % 50 === 49) factor = history.factor();
    }
    if (sweep > 0.1 * learning && isLearning) history.add(own);
    for (let l = 0; l < tiles.ofLoad.length; l++) {
      const before = loads.slice(2 * l, 2 * l + 2);
      loads[2 * l] += loadStep[l] * chance.normal();
      loads[2 * l + 1] += loadStep[l] * chance.normal();
      const next = loadLikelihood(now, loads, tiles, l);
      const after = loads.subarray(2 * l, 2 * l + 2);
      const gain = next - likelihoods[l] - 0.5 * (squares(after) - squares(before));
      const taken = Math.log(chance.uniform()) < gain;
      if (taken) likelihoods[l] = next;
      else loads.set(before, 2 * l);
      if (isLearning) loadStep[l] *= Math.exp(rate * ((taken ? 1 : 0) - BEST_SINGLE));
      else {
        accepted.loadsTried++;
        if (taken) accepted.loads++;
      }
    }
    if (!isLearning && sweep % every === 0) keep(now);
  }
  return {
    joint: accepted.joint / accepted.jointTried,
    loads: accepted.loads / accepted.loadsTried,
  };
}

const total = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0);

function squares(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

function jointly(
  from: Float64Array,
  factor: Float64Array,
  scale: number,
  chance: Generator,
): Float64Array {
  const z = Float64Array.from(from, () => chance.normal());
  return from.map((value, i) => {
    let move = 0;
    for (let j = 0; j <= i; j++) move += factor[lowerIndex(i, j)] * z[j];
    return value + scale * move;
  });
}

/** Running covariance of what a chain passes through. */
class Covariance {
  readonly #size: number;
  readonly #mean: Float64Array;
  readonly #sums: Float64Array;
  #count = 0;

  constructor(size: number) {
    this.#size = size;
    this.#mean = new Float64Array(size);
    this.#sums = new Float64Array(lowerIndex(size, 0));
  }

  add(point: Float64Array): void {
    this.#count++;
    const off = point.map((value, j) => value - this.#mean[j]);
    off.forEach((value, j) => (this.#mean[j] += value / this.#count));
    for (let i = 0; i < this.#size; i++) {
      const now = point[i] - this.#mean[i];
      for (let j = 0; j <= i; j++) this.#sums[lowerIndex(i, j)] += now * off[j];
    }
  }

  /** Cholesky factor, a little of the prior's added so that it exists. */
  factor(): Float64Array {
    const covariance = this.#sums.map((sum) => sum / Math.max(1, this.#count - 1));
    for (let j = 0; j < this.#size; j++) covariance[lowerIndex(j, j)] += 1e-4;
    return choleskyFactor(covariance, this.#size);
  }
}
