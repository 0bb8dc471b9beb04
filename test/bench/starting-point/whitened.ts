// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import { dot } from '../../../src/numeric/linalg.ts';

/** Observations of a yes-or-no outcome. */
export interface LogisticData {
  /** Shape [tiles][columns]; an intercept is a column of ones. */
  readonly rows: readonly (readonly number[])[];
  /** 1 yes, 0 no; a fraction is the share of yes among `weight` trials. */
  readonly outcome: readonly number[];
  /** How often each row counts; 1 where absent. */
  readonly weight?: readonly number[];
  /** Load of each tile, numbered from 0; each load has an intercept of its own. */
  readonly load?: readonly number[];
}

/** Independent Gaussian priors of the weights, and of the loads' intercepts about 0. */
export interface LogisticPrior {
  /** Per column. */
  readonly mean: readonly number[];
  /** Per column, > 0. */
  readonly sd: readonly number[];
  /** Sd of the loads' intercepts, > 0; needed where loads are given. */
  readonly loadSd?: number;
}

/**
 * The problem in units of the prior: weight = prior mean + sd * theta, theta ~ N(0, 1). The prior's
 * precision is then the identity, so the Hessian is never worse than that.
 */
export interface Whitened {
  readonly count: number;
  readonly size: number;
  readonly loadCount: number;
  /** [tiles][columns], each column times its prior sd. */
  readonly rows: Float64Array;
  /** Log-odds at theta = 0. */
  readonly offset: Float64Array;
  readonly outcome: Float64Array;
  readonly weight: Float64Array;
  readonly load: Int32Array;
  readonly loadSd: number;
}

/**
 * A logistic regression in units of its prior.
 *
 * @param data - rows, outcomes, weights, loads
 * @param prior - means and sds
 * @returns the whitened problem
 * @throws {RangeError} if the shapes differ, a prior sd is not above 0 or an entry is not finite
 */
export function whitened(data: LogisticData, prior: LogisticPrior): Whitened {
  const count = data.rows.length;
  const size = prior.mean.length;
  checkShapes(data, prior);
  const loadCount = data.load === undefined ? 0 : Math.max(-1, ...new Set(data.load)) + 1;
  const rows = new Float64Array(count * size);
  const offset = new Float64Array(count);
  data.rows.forEach((row, i) => {
    offset[i] = dot(row, prior.mean);
    for (let j = 0; j < size; j++) rows[i * size + j] = row[j] * prior.sd[j];
  });
  return {
    count,
    size,
    loadCount,
    rows,
    offset,
    outcome: Float64Array.from(data.outcome),
    weight: data.weight ? Float64Array.from(data.weight) : new Float64Array(count).fill(1),
    load: Int32Array.from(data.load ?? []),
    loadSd: prior.loadSd ?? 0,
  };
}

function checkShapes({ rows, outcome, weight, load }: LogisticData, prior: LogisticPrior): void {
  const size = prior.mean.length;
  const same = (what: string, length: number, wanted: number) => {
    if (length !== wanted)
      throw new RangeError(`${what} must have length ${wanted}, got ${length}`);
  };
  same('prior.sd', prior.sd.length, size);
  same('outcome', outcome.length, rows.length);
  if (weight) same('weight', weight.length, rows.length);
  if (load) same('load', load.length, rows.length);
  if (load && !load.every((l) => Number.isInteger(l) && l >= 0)) {
    throw new RangeError('load must hold whole numbers from 0');
  }
  rows.forEach((row, i) => {
    same(`rows[${i}]`, row.length, size);
    if (!row.every(Number.isFinite)) throw new RangeError(`rows[${i}] must be finite`);
  });
  for (const sd of load ? [...prior.sd, prior.loadSd ?? 0] : prior.sd) {
    if (!(sd > 0 && sd < Infinity))
      throw new RangeError(`prior sd must be > 0 and finite, got ${sd}`);
  }
  if (!prior.mean.every(Number.isFinite)) throw new RangeError('prior.mean must be finite');
  if (!outcome.every((y) => y >= 0 && y <= 1)) throw new RangeError('outcome must be from 0 to 1');
  if (weight && !weight.every((w) => w >= 0 && w < Infinity)) {
    throw new RangeError('weight must be >= 0 and finite');
  }
}
