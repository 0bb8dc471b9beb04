const SQRT_2_PI = Math.sqrt(2 * Math.PI);

/**
 * Density of the standard normal distribution.
 *
 * @param z - standard score
 * @returns density per unit of z
 * @example
 * normalDensity(0); // ~0.398942
 */
export function normalDensity(z: number): number {
  return Math.exp(-0.5 * z * z) / SQRT_2_PI;
}

/**
 * Share of the standard normal distribution below z.
 *
 * @param z - standard score
 * @returns probability in [0, 1]; absolute error below 1e-14
 * @example
 * normalCdf(1.959963984540054); // ~0.975000
 *
 * Source: J. F. Hart and others, Computer Approximations, Wiley 1968, no. 5666, in the form of
 * G. West, Better approximations to cumulative normal functions, Wilmott Magazine, May 2005.
 */
export function normalCdf(z: number): number {
  return normalCdfFrom(z, Math.exp(-0.5 * z * z));
}

/**
 * The same where exp(-z^2 / 2) is known already: it takes most of the time.
 *
 * @param z - standard score
 * @param kernel - exp(-z^2 / 2)
 * @returns probability in [0, 1]
 * @example
 * normalCdfFrom(1, Math.exp(-0.5)); // ~0.841345
 */
export function normalCdfFrom(z: number, kernel: number): number {
  const size = Math.abs(z);
  if (size > 37) return z > 0 ? 1 : 0;
  const tail = normalTailFrom(size, kernel);
  return z > 0 ? 1 - tail : tail;
}

/**
 * Share of the standard normal distribution above z, where exp(-z^2 / 2) is known already.
 *
 * @param z - standard score, >= 0
 * @param kernel - exp(-z^2 / 2); a multiple of it gives the same multiple of the share
 * @returns probability in [0, 1/2], times what the kernel was multiplied by
 * @example
 * normalTailFrom(1, Math.exp(-0.5)); // ~0.158655
 *
 * Source: as for `normalCdf`; the polynomials are written out because a loop takes twice the time.
 */
export function normalTailFrom(z: number, kernel: number): number {
  if (z < 5 * Math.SQRT2) {
    let above = 3.52624965998911e-2 * z + 0.700383064443688;
    above = (above * z + 6.37396220353165) * z + 33.912866078383;
    above = (above * z + 112.079291497871) * z + 221.213596169931;
    above = above * z + 220.206867912376;
    let below = 8.83883476483184e-2 * z + 1.75566716318264;
    below = (below * z + 16.064177579207) * z + 86.7807322029461;
    below = (below * z + 296.564248779674) * z + 637.333633378831;
    below = (below * z + 793.826512519948) * z + 440.413735824752;
    return (kernel * above) / below;
  }
  // Continued fraction of the Mills ratio; the last term stands in for the rest of it.
  const fraction = z + 1 / (z + 2 / (z + 3 / (z + 4 / (z + 0.65))));
  return kernel / fraction / SQRT_2_PI;
}

const AS241_CENTRE = {
  numerator: [
    2.5090809287301226727e3, 3.3430575583588128105e4, 6.7265770927008700853e4,
    4.5921953931549871457e4, 1.3731693765509461125e4, 1.9715909503065514427e3,
    1.3314166789178437745e2, 3.387132872796366608,
  ],
  denominator: [
    5.226495278852854561e3, 2.8729085735721942674e4, 3.930789580009271061e4,
    2.1213794301586595867e4, 5.3941960214247511077e3, 6.871870074920579083e2,
    4.2313330701600911252e1, 1,
  ],
};
const AS241_MIDDLE = {
  numerator: [
    7.7454501427834140764e-4, 2.27238449892691845833e-2, 2.4178072517745061177e-1,
    1.27045825245236838258, 3.64784832476320460504, 5.7694972214606914055, 4.6303378461565452959,
    1.42343711074968357734,
  ],
  denominator: [
    1.05075007164441684324e-9, 5.475938084995344946e-4, 1.51986665636164571966e-2,
    1.4810397642748007459e-1, 6.8976733498510000455e-1, 1.6763848301838038494,
    2.05319162663775882187, 1,
  ],
};
const AS241_TAIL = {
  numerator: [
    2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.2426609473880784386e-3,
    2.6532189526576123093e-2, 2.9656057182850489123e-1, 1.7848265399172913358,
    5.4637849111641143699, 6.6579046435011037772,
  ],
  denominator: [
    2.04426310338993978564e-15, 1.4215117583164458887e-7, 1.8463183175100546818e-5,
    7.868691311456132591e-4, 1.48753612908506148525e-2, 1.3692988092273580531e-1,
    5.9983220655588793769e-1, 1,
  ],
};

/**
 * Standard score below which a share p of the normal distribution lies.
 *
 * @param p - probability in [0, 1]
 * @returns z; relative error about 1e-15; -Infinity at 0, Infinity at 1
 * @throws {RangeError} if p lies outside [0, 1]
 * @example
 * normalQuantile(0.975); // ~1.959964
 * normalQuantile(0.5); // 0
 *
 * Source: M. J. Wichura, Algorithm AS 241, Applied Statistics 37 (1988) 477-484, PPND16.
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`p must be from 0 to 1, got ${p}`);
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  const fromMiddle = p - 0.5;
  if (Math.abs(fromMiddle) <= 0.425) {
    return fromMiddle * rational(AS241_CENTRE, 0.180625 - fromMiddle * fromMiddle);
  }
  const r = Math.sqrt(-Math.log(Math.min(p, 1 - p)));
  const size = r <= 5 ? rational(AS241_MIDDLE, r - 1.6) : rational(AS241_TAIL, r - 5);
  return fromMiddle < 0 ? -size : size;
}

interface Rational {
  readonly numerator: readonly number[];
  readonly denominator: readonly number[];
}

function rational({ numerator, denominator }: Rational, x: number): number {
  return polynomial(numerator, x) / polynomial(denominator, x);
}

/** Horner's rule, highest power first. */
function polynomial(coefficients: readonly number[], x: number): number {
  let value = 0;
  for (const coefficient of coefficients) value = value * x + coefficient;
  return value;
}
