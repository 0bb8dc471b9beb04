import { normalCdf, normalDensity, normalTailFrom } from './normal.ts';

/**
 * Mean and variance of a normal variable of which is known that it is not below a bound.
 *
 * @param mean - of the variable before that is known
 * @param sd - of the variable before, > 0
 * @param least - the bound
 * @returns both, above the bound and not above sd^2
 * @example
 * truncatedBelow(0, 1, 0).mean; // ~0.797885
 * truncatedBelow(0, 1, 0).variance; // ~0.363380
 *
 * Source: N. L. Johnson, S. Kotz and N. Balakrishnan, Continuous Univariate Distributions 1, 2nd ed. 1994,
 * section 13.10.1.
 */
export function truncatedBelow(
  mean: number,
  sd: number,
  least: number,
): { readonly mean: number; readonly variance: number } {
  const score = (mean - least) / sd;
  const { ratio, left } = score > FAR_BELOW ? plainly(score) : farBelow(score);
  return { mean: least + sd * (score + ratio), variance: sd * sd * left };
}

/** Farther below, the difference of nearly equal numbers would lose its digits. */
const FAR_BELOW = -20;

/** Density over share, and the part of the variance that is left. */
function plainly(score: number) {
  // The density over the share of a tail needs neither by itself, which would vanish far out.
  const ratio =
    score > 0
      ? normalDensity(score) / normalCdf(score)
      : 1 / (Math.sqrt(2 * Math.PI) * normalTailFrom(-score, 1));
  return { ratio, left: 1 - ratio * (ratio + score) };
}

/** Asymptotic series: ratio = -score + 1 / z - 2 / z^3 + 10 / z^5, z = -score. */
function farBelow(score: number) {
  const z = -score;
  const beyond = 1 / z - 2 / z ** 3 + 10 / z ** 5;
  return { ratio: z + beyond, left: 1 / z ** 2 - 6 / z ** 4 + 50 / z ** 6 };
}
