import { normalCdf } from '../../src/numeric/normal.ts';
import type { Generator } from '../../src/numeric/random.ts';

/** Exponential with mean 1. */
export function drawnExponential({ uniform }: Generator): number {
  return -Math.log(1 - uniform());
}

/**
 * Gamma with scale 1.
 *
 * Source: G. Marsaglia and W. W. Tsang, ACM Transactions on Mathematical Software 26 (2000) 363-372.
 */
export function drawnGamma(source: Generator, shape: number): number {
  if (shape < 1) return drawnGamma(source, shape + 1) * source.uniform() ** (1 / shape);
  const d = shape - 1 / 3;
  const c = 1 / Math.sqrt(9 * d);
  for (;;) {
    const x = source.normal();
    const v = (1 + c * x) ** 3;
    if (v > 0 && Math.log(1 - source.uniform()) < 0.5 * x * x + d - d * v + d * Math.log(v)) {
      return d * v;
    }
  }
}

/** Variance with density v^(-shape - 1) exp(-scale / v). */
export function drawnInverseGamma(source: Generator, shape: number, scale: number): number {
  return scale / drawnGamma(source, shape);
}

/** Share with density x^(a - 1) (1 - x)^(b - 1). */
export function drawnBeta(source: Generator, a: number, b: number): number {
  const yes = drawnGamma(source, a);
  return yes / (yes + drawnGamma(source, b));
}

/** Where the two series that bound the density of `drawnPolyaGamma` change over. */
const CHANGE = 0.64;

/**
 * Polya-Gamma with parameters 1 and z: given it, a logistic likelihood is Gaussian in its log-odds z.
 *
 * Source: N. G. Polson, J. G. Scott and J. Windle, Journal of the American Statistical Association 108
 * (2013) 1339-1349, section 4 and algorithm 1 of the supplement (after L. Devroye's series method).
 */
export function drawnPolyaGamma(source: Generator, logOdds: number): number {
  const z = Math.abs(logOdds) / 2;
  const rate = Math.PI ** 2 / 8 + z ** 2 / 2;
  const tail = (Math.PI / (2 * rate)) * Math.exp(-rate * CHANGE);
  const tailShare = tail / (tail + 2 * Math.exp(-z) * inverseGaussianCdf(z));
  for (;;) {
    const x =
      source.uniform() < tailShare
        ? CHANGE + drawnExponential(source) / rate
        : truncatedInverseGaussian(source, z);
    if (isAccepted(source, x)) return x / 4;
  }
}

function isAccepted(source: Generator, x: number): boolean {
  let sum = seriesTerm(0, x);
  const y = source.uniform() * sum;
  for (let n = 1; ; n++) {
    if (n % 2 === 1) {
      sum -= seriesTerm(n, x);
      if (y <= sum) return true;
    } else {
      sum += seriesTerm(n, x);
      if (y > sum) return false;
    }
  }
}

function seriesTerm(n: number, x: number): number {
  const half = n + 0.5;
  return x > CHANGE
    ? Math.PI * half * Math.exp((-(half ** 2) * Math.PI ** 2 * x) / 2)
    : Math.PI * half * (2 / (Math.PI * x)) ** 1.5 * Math.exp((-2 * half ** 2) / x);
}

/** Share of the inverse Gaussian with mean 1/z and shape 1 that lies below the change. */
function inverseGaussianCdf(z: number): number {
  const root = Math.sqrt(1 / CHANGE);
  return normalCdf(root * (CHANGE * z - 1)) + Math.exp(2 * z) * normalCdf(-root * (CHANGE * z + 1));
}

/** Inverse Gaussian with mean 1/z and shape 1, of those below the change. */
function truncatedInverseGaussian(source: Generator, z: number): number {
  if (z * CHANGE < 1) {
    for (;;) {
      const [a, b] = [drawnExponential(source), drawnExponential(source)];
      if (a * a > (2 * b) / CHANGE) continue;
      const x = CHANGE / (1 + CHANGE * a) ** 2;
      if (source.uniform() < Math.exp(-0.5 * z * z * x)) return x;
    }
  }
  const mean = 1 / z;
  for (;;) {
    const y = source.normal() ** 2;
    const lower = mean + 0.5 * mean * (mean * y - Math.sqrt(4 * mean * y + (mean * y) ** 2));
    const x = source.uniform() > mean / (mean + lower) ? (mean * mean) / lower : lower;
    if (x < CHANGE) return x;
  }
}
